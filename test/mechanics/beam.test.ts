import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type BeamLoad,
  planeLoads,
  solveUniformBeam,
  type UniformSolution,
  uniformBeamAt,
} from '../../src/mechanics/beam.ts';

const RIGID = Number.POSITIVE_INFINITY;

function solved(stationA: number, stationB: number, EI: number, loads: readonly BeamLoad[]): UniformSolution {
  const solution = solveUniformBeam({ stationA, stationB, EI, stiffnessA: RIGID, stiffnessB: RIGID }, loads);
  if ('unassessed' in solution) throw new Error(solution.unassessed);
  return solution;
}

const near = (value: number, expected: number, relative: number) =>
  expect(Math.abs(value - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));

describe('uniform shaft on two supports: published examples', () => {
  it('overhung tip load (Hibbeler, Mechanics of Materials, ex. 12.12; verified)', () => {
    const [F, span, a, EI] = [22241.11, 3.6576, 3.6576, 199948000000.0 * 5.202893e-5];
    const solution = solved(0, span, EI, [{ station: span + a, force: -F, couple: 0 }]);
    near(solution.reactionA, -22241.11, 0.002);
    near(solution.reactionB, 44482.22, 0.002);
    near(uniformBeamAt(solution, span + a).deflection, -0.0697416, 0.002);
    near(uniformBeamAt(solution, 0).slope, 0.004766897, 0.002);
    near(uniformBeamAt(solution, span).slope, -0.009533793, 0.002);
    near(uniformBeamAt(solution, span + a).slope, -0.02383448, 0.002);
    // printed: -2.75 in
    near(uniformBeamAt(solution, span + a).deflection / 0.0254, -2.75, 0.002);
  });

  it('load between the supports (Hibbeler, ex. 12.10; verified)', () => {
    const solution = solved(0, 8, 200e9 * 1.7e-5, [{ station: 6, force: -16000, couple: 0 }]);
    near(solution.reactionA, 4000, 0.002);
    near(solution.reactionB, 12000, 0.002);
    near(uniformBeamAt(solution, 2).slope, -0.009411765, 0.002);
    near(uniformBeamAt(solution, 0).slope, -0.01176471, 0.002);
    near(uniformBeamAt(solution, 8).slope, 0.01647059, 0.002);
  });

  const [M, D, EI] = [50, 0.08, (205e9 * Math.PI * 0.012 ** 4) / 64];
  it.each([0.08, 0.11])('couple at or beyond the right support, at %f m (Shigley Table A-9; recomputed)', (station) => {
    const solution = solved(0, D, EI, [{ station, force: 0, couple: M }]);
    near(solution.reactionA, 625, 1e-6);
    near(solution.reactionB, -625, 1e-6);
    near(uniformBeamAt(solution, 0).slope, -0.00319492, 2e-6);
    near(uniformBeamAt(solution, D).slope, 0.00638984, 2e-6);
  });

  it('couple at mid span (statics; recomputed)', () => {
    const solution = solved(0, D, EI, [{ station: D / 2, force: 0, couple: M }]);
    near(solution.reactionA, 625, 1e-6);
    near(solution.reactionB, -625, 1e-6);
    // The reference figure carries five digits.
    near(uniformBeamAt(solution, 0).slope, -0.00079873, 1e-5);
    near(uniformBeamAt(solution, D / 2).slope, 0.00159746, 1e-5);
    near(uniformBeamAt(solution, D).slope, -0.00079873, 1e-5);
    near(uniformBeamAt(solution, D / 2).slope, (M * D) / (12 * EI), 1e-12);
    near(uniformBeamAt(solution, D / 2).momentBefore, M / 2, 1e-12);
    near(uniformBeamAt(solution, D / 2).momentAfter, -M / 2, 1e-12);
  });

  it('force and couple in space: the load on each support (statics; recomputed)', () => {
    // Force (120, -200, 40) N at z = 0.11 m, couple (3, -2, 1.5) N·m, supports at 0 and 0.05 m.
    const loads = [{ station: 0.11, fx: 120, fy: -200, mx: 3, my: -2 }];
    const x = solved(0, 0.05, 1, planeLoads(loads, 'x'));
    const y = solved(0, 0.05, 1, planeLoads(loads, 'y'));
    near(-x.reactionB, 224, 1e-9);
    near(-y.reactionB, -500, 1e-9);
    near(-x.reactionA, -104, 1e-9);
    near(-y.reactionA, 300, 1e-9);
    near(Math.hypot(x.reactionA, y.reactionA), 317.5154, 1e-6);
    near(Math.hypot(x.reactionB, y.reactionB), 547.8832, 1e-6);
  });

  it('gear at mid span (Wentzell, Machine Design, ex. 17.1; verified): reactions and moment', () => {
    const pull = 20.33727 / 0.0508 / Math.cos((20 * Math.PI) / 180);
    near(pull, 426.0329, 0.005);
    const solution = solved(0, 0.381, 1, [{ station: 0.1905, force: pull, couple: 0 }]);
    near(Math.abs(uniformBeamAt(solution, 0.1905).momentBefore), 40.57963, 0.005);
  });
});

describe('uniform shaft: formula sets (Shigley Table A-9, from memory)', () => {
  it('overhung load: F(1 + a/D), -F a/D, and the deflections', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 2, noNaN: true }),
        fc.double({ min: 0.01, max: 2, noNaN: true }),
        fc.double({ min: 1, max: 1e5, noNaN: true }),
        (span, a, F) => {
          const EI = 321;
          const solution = solved(0, span, EI, [{ station: span + a, force: -F, couple: 0 }]);
          near(solution.reactionB, F * (1 + a / span), 1e-12);
          near(solution.reactionA, (-F * a) / span, 1e-12);
          near(uniformBeamAt(solution, span + a).deflection, (-F * a * a * (span + a)) / (3 * EI), 1e-9);
          near(uniformBeamAt(solution, 0).slope, (F * a * span) / (6 * EI), 1e-9);
          near(uniformBeamAt(solution, span).slope, (-F * a * span) / (3 * EI), 1e-9);
          near(uniformBeamAt(solution, span + a).slope, (-F * a * (2 * span + 3 * a)) / (6 * EI), 1e-9);
        },
      ),
      { seed: 41, numRuns: 200 },
    );
  });

  it('mid-span load: F/2 each, F L³/48EI; off-centre: F b x (x² + b² - L²)/6EIL', () => {
    const [L, F, EI] = [0.3, 700, 45];
    const middle = solved(0, L, EI, [{ station: L / 2, force: -F, couple: 0 }]);
    near(middle.reactionA, F / 2, 1e-12);
    near(middle.reactionB, F / 2, 1e-12);
    near(uniformBeamAt(middle, L / 2).deflection, (-F * L ** 3) / (48 * EI), 1e-12);
    const [a, x] = [0.22, 0.1];
    const b = L - a;
    const off = solved(0, L, EI, [{ station: a, force: -F, couple: 0 }]);
    near(uniformBeamAt(off, x).deflection, (F * b * x * (x * x + b * b - L * L)) / (6 * EI * L), 1e-12);
  });
});

describe('uniform shaft: properties', () => {
  const station = fc.double({ min: -1, max: 1, noNaN: true });
  const size = fc.double({ min: -1e4, max: 1e4, noNaN: true });
  const loadsOf = fc.array(fc.record({ station, force: size, couple: size }), { minLength: 1, maxLength: 5 });

  it('closes: no force or moment is left beyond the last action, supports do not give', () => {
    fc.assert(
      fc.property(loadsOf, fc.double({ min: 0.05, max: 1, noNaN: true }), (loads, span) => {
        const solution = solved(-0.1, -0.1 + span, 77, loads);
        const scale = loads.reduce((sum, load) => sum + Math.abs(load.force) + Math.abs(load.couple), 0) / span + 1e-9;
        const end = uniformBeamAt(solution, 3);
        expect(Math.abs(end.shearAfter)).toBeLessThan(1e-10 * scale);
        expect(Math.abs(end.momentAfter)).toBeLessThan(1e-9 * scale);
        expect(Math.abs(uniformBeamAt(solution, -0.1).deflection)).toBeLessThan(1e-9 * scale);
        expect(Math.abs(uniformBeamAt(solution, -0.1 + span).deflection)).toBeLessThan(1e-9 * scale);
      }),
      { seed: 42, numRuns: 300 },
    );
  });

  it('a longer span never raises the reaction to a pure moment; it is M/D wherever the couple stands', () => {
    fc.assert(
      fc.property(
        size.filter((M) => M !== 0),
        station,
        fc.double({ min: 0.01, max: 1, noNaN: true }),
        fc.double({ min: 1, max: 10, noNaN: true }),
        (M, at, span, longer) => {
          const short = solved(0, span, 1, [{ station: at, force: 0, couple: M }]);
          const long = solved(0, span * longer, 1, [{ station: at, force: 0, couple: M }]);
          near(short.reactionA, M / span, 1e-12);
          expect(Math.abs(long.reactionA)).toBeLessThanOrEqual(Math.abs(short.reactionA));
          expect(Math.abs(long.reactionB)).toBeLessThanOrEqual(Math.abs(short.reactionB));
        },
      ),
      { seed: 43, numRuns: 300 },
    );
  });

  it('trade facts: a load between shares as the opposite arms and exceeds itself nowhere; moments peak at F a and F b c/D', () => {
    const length = fc.double({ min: 0.01, max: 1, noNaN: true });
    fc.assert(
      fc.property(length, length, fc.double({ min: 1, max: 1e4, noNaN: true }), (b, c, F) => {
        const D = b + c;
        const between = solved(0, D, 1, [{ station: b, force: -F, couple: 0 }]);
        near(between.reactionA, (F * c) / D, 1e-9);
        near(between.reactionB, (F * b) / D, 1e-9);
        expect(Math.max(between.reactionA, between.reactionB)).toBeLessThanOrEqual(F);
        near(uniformBeamAt(between, b).momentBefore, (F * b * c) / D, 1e-9);
        const overhung = solved(0, b, 1, [{ station: b + c, force: -F, couple: 0 }]);
        near(uniformBeamAt(overhung, b).momentBefore, -F * c, 1e-9);
        // The further apart, the lower the reactions, and the near one never falls below the load itself.
        const wider = solved(0, 2 * b, 1, [{ station: 2 * b + c, force: -F, couple: 0 }]);
        expect(wider.reactionB).toBeLessThan(overhung.reactionB);
        expect(wider.reactionB).toBeGreaterThanOrEqual(F);
        expect(Math.abs(wider.reactionA)).toBeLessThan(Math.abs(overhung.reactionA));
      }),
      { seed: 44, numRuns: 200 },
    );
  });

  it('elastic supports give R/k, leave the reactions alone, and tend to the rigid ones', () => {
    const loads = [
      { station: 0.13, force: -900, couple: 4 },
      { station: 0.02, force: 250, couple: 0 },
    ];
    const rigid = solved(0, 0.08, 210, loads);
    let last = Number.POSITIVE_INFINITY;
    for (const k of [1e6, 1e8, 1e10, 1e12]) {
      const beam = { stationA: 0, stationB: 0.08, EI: 210, stiffnessA: k, stiffnessB: 2 * k };
      const soft = solveUniformBeam(beam, loads);
      if ('unassessed' in soft) throw new Error(soft.unassessed);
      expect(soft.reactionA).toBe(rigid.reactionA);
      near(uniformBeamAt(soft, 0).deflection, -soft.reactionA / k, 1e-9);
      near(uniformBeamAt(soft, 0.08).deflection, -soft.reactionB / (2 * k), 1e-9);
      const difference = Math.abs(uniformBeamAt(soft, 0.13).deflection - uniformBeamAt(rigid, 0.13).deflection);
      expect(difference).toBeLessThan(last / 50);
      last = difference;
    }
  });

  it.each([
    ['zero span', { stationB: 0 }, [], 'span'],
    ['no stiffness', { EI: 0 }, [], 'EI'],
    ['EI not a number', { EI: Number.NaN }, [], 'EI'],
    ['support of negative stiffness', { stiffnessA: -1 }, [], 'support stiffness'],
    ['support stiffness not a number', { stiffnessB: Number.NaN }, [], 'support stiffness'],
    ['station not a number', { stationA: Number.NaN }, [], 'station'],
    ['load not a number', {}, [{ station: 0, force: Number.NaN, couple: 0 }], 'load'],
    ['endless load', {}, [{ station: 0, force: Number.POSITIVE_INFINITY, couple: 0 }], 'load'],
  ])('refuses %s', (_name, change, loads, reason) => {
    const beam = { stationA: 0, stationB: 0.1, EI: 10, stiffnessA: RIGID, stiffnessB: RIGID, ...change };
    expect(solveUniformBeam(beam, loads)).toEqual({ unassessed: expect.stringContaining(reason) });
  });
});
