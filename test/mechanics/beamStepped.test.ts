import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { type BeamLoad, solveUniformBeam, uniformBeamAt } from '../../src/mechanics/beam.ts';
import {
  type BeamPart,
  type BeamSolution,
  type BeamSupport,
  beamInfluence,
  beamStateAt,
  prepareBeam,
  type SteppedBeam,
  solveBeam,
  solveShaft,
} from '../../src/mechanics/beamStepped.ts';

const RIGID = Number.POSITIVE_INFINITY;
const BENDS_ONLY = Number.POSITIVE_INFINITY;

function prepared(
  parts: readonly BeamPart[],
  supports: readonly BeamSupport[],
  stations: readonly number[],
): SteppedBeam {
  const beam = prepareBeam(parts, supports, stations);
  if ('unassessed' in beam) throw new Error(beam.unassessed);
  return beam;
}

function solved(beam: SteppedBeam, loads: readonly BeamLoad[]): BeamSolution {
  const solution = solveBeam(beam, loads);
  if ('unassessed' in solution) throw new Error(solution.unassessed);
  return solution;
}

const pin = (station: number, stiffness = RIGID): BeamSupport => ({ station, stiffness, tiltStiffness: 0 });

/** Second route: the stiffness matrix of (Timoshenko) beam elements, dense, rigid supports as very stiff springs. */
function byStiffnessMatrix(beam: SteppedBeam, loads: readonly BeamLoad[], stiff: number) {
  const n = beam.nodes.length;
  const size = 2 * n;
  const K = Array.from({ length: size }, () => new Array<number>(size + 1).fill(0));
  for (let i = 0; i < n - 1; i++) {
    const L = beam.nodes[i + 1]! - beam.nodes[i]!;
    const phi = (12 * beam.EI[i]!) / (beam.GA[i]! * L * L);
    const k = beam.EI[i]! / ((1 + phi) * L ** 3);
    const element = [
      [12, 6 * L, -12, 6 * L],
      [6 * L, (4 + phi) * L * L, -6 * L, (2 - phi) * L * L],
      [-12, -6 * L, 12, -6 * L],
      [6 * L, (2 - phi) * L * L, -6 * L, (4 + phi) * L * L],
    ];
    element.forEach((row, r) => {
      row.forEach((value, c) => {
        K[2 * i + r]![2 * i + c]! += k * value;
      });
    });
  }
  beam.supports.forEach((support, s) => {
    const node = beam.supportNodes[s]!;
    K[2 * node]![2 * node]! += Math.min(support.stiffness, stiff);
    K[2 * node + 1]![2 * node + 1]! += Math.min(support.tiltStiffness, stiff);
  });
  for (const load of loads) {
    const node = beam.nodes.findIndex((station) => Math.abs(station - load.station) < 1e-9);
    K[2 * node]![size]! += load.force;
    K[2 * node + 1]![size]! += load.couple;
  }
  for (let k = 0; k < size; k++) {
    for (let i = k + 1; i < size; i++) {
      const factor = K[i]![k]! / K[k]![k]!;
      for (let j = k; j <= size; j++) K[i]![j]! -= factor * K[k]![j]!;
    }
  }
  const u = new Array<number>(size).fill(0);
  for (let i = size - 1; i >= 0; i--) {
    let sum = K[i]![size]!;
    for (let j = i + 1; j < size; j++) sum -= K[i]![j]! * u[j]!;
    u[i] = sum / K[i]![i]!;
  }
  return { deflection: u.filter((_, i) => i % 2 === 0), slope: u.filter((_, i) => i % 2 === 1) };
}

const largest = (values: ArrayLike<number>) => Array.from(values).reduce((most, v) => Math.max(most, Math.abs(v)), 0);

describe('stepped shaft against the closed form', () => {
  it('equals the uniform shaft at every station, whatever steps of equal section it is cut in (seed 51)', () => {
    const random = seededRandom(51);
    for (let trial = 0; trial < 200; trial++) {
      const EI = 10 ** random.between(-1, 5);
      const cuts = [-0.4, random.between(-0.3, 0), random.between(0, 0.2), 0.6];
      const parts = cuts.slice(1).map((to, i) => ({ from: cuts[i]!, to, EI, GA: BENDS_ONLY }));
      const stationA = random.between(-0.2, 0);
      const stationB = stationA + random.between(0.02, 0.4);
      const stiffnessA = random.next() < 0.5 ? RIGID : 10 ** random.between(5, 9);
      const stiffnessB = random.next() < 0.5 ? RIGID : 10 ** random.between(5, 9);
      const loads = [0, 1, 2].map(() => ({
        station: random.between(-0.4, 0.6),
        force: random.between(-1e3, 1e3),
        couple: random.between(-50, 50),
      }));
      const beam = prepared(
        parts,
        [pin(stationA, stiffnessA), pin(stationB, stiffnessB)],
        loads.map((l) => l.station),
      );
      const solution = solved(beam, loads);
      const closed = solveUniformBeam({ stationA, stationB, EI, stiffnessA, stiffnessB }, loads);
      if ('unassessed' in closed) throw new Error(closed.unassessed);
      const force = Math.abs(closed.reactionA) + Math.abs(closed.reactionB) + 1;
      expect(Math.abs(solution.reactions[0]!.force - closed.reactionA)).toBeLessThan(1e-10 * force);
      expect(Math.abs(solution.reactions[1]!.force - closed.reactionB)).toBeLessThan(1e-10 * force);
      const bend = largest(solution.deflection);
      const turn = largest(solution.slope);
      for (let k = 0; k < 8; k++) {
        const station = random.between(-0.4, 0.6);
        const a = beamStateAt(solution, station);
        const b = uniformBeamAt(closed, station);
        expect(Math.abs(a.deflection - b.deflection)).toBeLessThan(1e-9 * bend);
        expect(Math.abs(a.slope - b.slope)).toBeLessThan(1e-9 * turn);
        expect(Math.abs(a.momentAfter - b.momentAfter)).toBeLessThan(1e-9 * force);
        expect(Math.abs(a.shearAfter - b.shearAfter)).toBeLessThan(1e-9 * force);
      }
    }
  });
});

describe('stepped shaft against other routes', () => {
  const parts: BeamPart[] = [
    { from: 0, to: 0.03, EI: 900, GA: 4e6 },
    { from: 0.03, to: 0.09, EI: 4200, GA: 9e6 },
    { from: 0.09, to: 0.1, EI: 300, GA: 2e6 },
    { from: 0.1, to: 0.18, EI: 1500, GA: BENDS_ONLY },
  ];
  const loads: BeamLoad[] = [
    { station: 0.18, force: -800, couple: 12 },
    { station: 0.06, force: 400, couple: -30 },
    { station: 0, force: 90, couple: 0 },
  ];
  const sets: [string, BeamSupport[]][] = [
    ['two springs', [pin(0.02, 3e7), pin(0.1, 8e7)]],
    ['two rigid', [pin(0.02), pin(0.1)]],
    ['three, indeterminate', [pin(0.02), pin(0.07, 5e7), pin(0.1)]],
    ['one that resists tilt', [{ station: 0.05, stiffness: 1e8, tiltStiffness: 2e5 }]],
    ['clamped and propped', [{ station: 0.02, stiffness: RIGID, tiltStiffness: RIGID }, pin(0.15)]],
  ];

  it.each(sets)('stiffness matrix: %s', (_name, supports) => {
    const beam = prepared(parts, supports, [0, 0.06, 0.18]);
    const solution = solved(beam, loads);
    const matrix = byStiffnessMatrix(beam, loads, 1e15);
    const [bend, turn] = [largest(solution.deflection), largest(solution.slope)];
    beam.nodes.forEach((_station, i) => {
      expect(Math.abs(solution.deflection[i]! - matrix.deflection[i]!)).toBeLessThan(2e-6 * bend);
      expect(Math.abs(solution.slope[i]! - matrix.slope[i]!)).toBeLessThan(2e-6 * turn);
    });
    const sum = solution.reactions.reduce((total, r) => total + r.force, 0);
    expect(sum).toBeCloseTo(800 - 400 - 90, 8);
    expect(Math.abs(solution.momentAfter[solution.momentAfter.length - 1]!)).toBeLessThan(1e-8);
  });

  it('unit-load integral (virtual work), bending and shear, of the stepped shaft', () => {
    const supports = [pin(0.02, 3e7), pin(0.1, 8e7)];
    const beam = prepared(parts, supports, [0, 0.06, 0.18]);
    const real = solved(beam, loads);
    const unit = solved(beam, [{ station: 0.18, force: 1, couple: 0 }]);
    let sum = 0;
    for (let i = 0; i < beam.EI.length; i++) {
      const h = beam.nodes[i + 1]! - beam.nodes[i]!;
      const [M0, M1] = [real.momentAfter[i]!, real.momentBefore[i + 1]!];
      const [m0, m1] = [unit.momentAfter[i]!, unit.momentBefore[i + 1]!];
      // Simpson is exact for the product of two straight lines.
      sum += ((h / 6) * (M0 * m0 + (M0 + M1) * (m0 + m1) + M1 * m1)) / beam.EI[i]!;
      sum += (h * real.shearAfter[i]! * unit.shearAfter[i]!) / beam.GA[i]!;
    }
    real.reactions.forEach((reaction, s) => {
      sum += (reaction.force * unit.reactions[s]!.force) / supports[s]!.stiffness;
    });
    expect(beamStateAt(real, 0.18).deflection / sum).toBeCloseTo(1, 9);
  });

  it('stepped cantilever by hand: F L1³/3EI1 plus the root part moved on', () => {
    const [F, root, free] = [100, { L: 0.2, EI: 800 }, { L: 0.3, EI: 100 }];
    const beam = prepared(
      [
        { from: 0, to: root.L, EI: root.EI, GA: BENDS_ONLY },
        { from: root.L, to: root.L + free.L, EI: free.EI, GA: BENDS_ONLY },
      ],
      [{ station: 0, stiffness: RIGID, tiltStiffness: RIGID }],
      [],
    );
    const tip = beamStateAt(solved(beam, [{ station: 0.5, force: F, couple: 0 }]), 0.5);
    const M = F * free.L;
    const atStep = (F * root.L ** 3) / (3 * root.EI) + (M * root.L ** 2) / (2 * root.EI);
    const slope = (F * root.L ** 2) / (2 * root.EI) + (M * root.L) / root.EI;
    expect(tip.deflection).toBeCloseTo(atStep + slope * free.L + (F * free.L ** 3) / (3 * free.EI), 12);
  });

  it('shear deflection of a cantilever is F L³/3EI + F L/GA (Timoshenko)', () => {
    const beam = prepared(
      [{ from: 0, to: 0.05, EI: 700, GA: 3e6 }],
      [{ station: 0, stiffness: RIGID, tiltStiffness: RIGID }],
      [],
    );
    const tip = beamStateAt(solved(beam, [{ station: 0.05, force: 900, couple: 0 }]), 0.05);
    expect(tip.deflection).toBeCloseTo((900 * 0.05 ** 3) / (3 * 700) + (900 * 0.05) / 3e6, 12);
    expect(tip.slope).toBeCloseTo((900 * 0.05 ** 2) / (2 * 700), 12);
  });

  it('short parts do no harm: a groove 1e-7 of the length (as wide as nothing) changes nothing', () => {
    const plain = prepared([{ from: 0, to: 1, EI: 50, GA: BENDS_ONLY }], [pin(0.1), pin(0.6)], [1]);
    const grooved = prepared(
      [
        { from: 0, to: 0.3, EI: 50, GA: BENDS_ONLY },
        { from: 0.3, to: 0.3 + 1e-7, EI: 25, GA: BENDS_ONLY },
        { from: 0.3 + 1e-7, to: 1, EI: 50, GA: BENDS_ONLY },
      ],
      [pin(0.1), pin(0.6)],
      [1],
    );
    const load = [{ station: 1, force: -70, couple: 0 }];
    const [a, b] = [solved(plain, load).deflection, solved(grooved, load).deflection];
    expect(Math.abs(b[b.length - 1]! / a[a.length - 1]! - 1)).toBeLessThan(1e-6);
  });

  it('elastic supports tend to rigid ones; tilt stiffness to a clamp', () => {
    const rigid = solved(prepared(parts, [pin(0.02), pin(0.07), pin(0.1)], [0, 0.06, 0.18]), loads);
    let last = Number.POSITIVE_INFINITY;
    for (const k of [1e9, 1e11, 1e13]) {
      const soft = solved(prepared(parts, [pin(0.02, k), pin(0.07, k), pin(0.1, k)], [0, 0.06, 0.18]), loads);
      const difference = Math.abs(soft.reactions[1]!.force / rigid.reactions[1]!.force - 1);
      expect(difference).toBeLessThan(last / 20);
      last = difference;
    }
    const clamped = solved(
      prepared(parts, [{ station: 0.05, stiffness: RIGID, tiltStiffness: RIGID }], [0, 0.06, 0.18]),
      loads,
    );
    const held = solved(
      prepared(parts, [{ station: 0.05, stiffness: RIGID, tiltStiffness: 1e13 }], [0, 0.06, 0.18]),
      loads,
    );
    expect(largest(held.deflection.map((v, i) => v - clamped.deflection[i]!))).toBeLessThan(
      1e-7 * largest(clamped.deflection),
    );
  });

  it('reciprocity (Maxwell, Betti) of the influences', () => {
    const beam = prepared(parts, [pin(0.02, 3e7), pin(0.1, 8e7)], [0, 0.06, 0.18]);
    const there = beamInfluence(beam, 0.06, 0.18);
    const back = beamInfluence(beam, 0.18, 0.06);
    if ('unassessed' in there || 'unassessed' in back) throw new Error('refused');
    expect(there.perForce.deflection / back.perForce.deflection).toBeCloseTo(1, 10);
    expect(there.perCouple.slope / back.perCouple.slope).toBeCloseTo(1, 10);
    expect(there.perCouple.deflection / back.perForce.slope).toBeCloseTo(1, 10);
  });

  it('two planes: turning the load about the shaft turns the answer with it', () => {
    fc.assert(
      fc.property(fc.double({ min: -3, max: 3, noNaN: true }), (angle) => {
        const beam = prepared(parts, [pin(0.02, 3e7), pin(0.1)], [0.06, 0.18]);
        const [c, s] = [Math.cos(angle), Math.sin(angle)];
        const flat = { station: 0.18, fx: 300, fy: -120, mx: 9, my: 4 };
        const turned = {
          station: 0.18,
          fx: c * flat.fx - s * flat.fy,
          fy: s * flat.fx + c * flat.fy,
          mx: c * flat.mx - s * flat.my,
          my: s * flat.mx + c * flat.my,
        };
        const a = solveShaft(beam, [flat]);
        const b = solveShaft(beam, [turned]);
        if ('unassessed' in a || 'unassessed' in b) throw new Error('refused');
        for (let i = 0; i < beam.nodes.length; i++) {
          const size = Math.hypot(a.x.deflection[i]!, a.y.deflection[i]!);
          expect(Math.abs(b.x.deflection[i]! - (c * a.x.deflection[i]! - s * a.y.deflection[i]!))).toBeLessThan(
            1e-12 + 1e-9 * size,
          );
          expect(Math.hypot(b.x.momentAfter[i]!, b.y.momentAfter[i]!)).toBeCloseTo(
            Math.hypot(a.x.momentAfter[i]!, a.y.momentAfter[i]!),
            8,
          );
        }
      }),
      { seed: 52, numRuns: 50 },
    );
  });
});

describe('stepped shaft: what is refused', () => {
  const part = (from: number, to: number, EI = 10, GA = BENDS_ONLY): BeamPart => ({ from, to, EI, GA });
  const cases: [string, BeamPart[], BeamSupport[], number[], string][] = [
    ['no parts', [], [pin(0), pin(1)], [], 'no length'],
    ['a part of no length', [part(0, 0)], [pin(0)], [], 'no length'],
    ['a gap', [part(0, 0.4), part(0.5, 1)], [pin(0), pin(1)], [], 'end to end'],
    ['an overlap', [part(0, 0.6), part(0.5, 1)], [pin(0), pin(1)], [], 'end to end'],
    ['no stiffness', [part(0, 1, 0)], [pin(0), pin(1)], [], 'stiffness of a part'],
    ['stiffness not a number', [part(0, 1, Number.NaN)], [pin(0), pin(1)], [], 'stiffness of a part'],
    ['no shear stiffness', [part(0, 1, 1, 0)], [pin(0), pin(1)], [], 'stiffness of a part'],
    ['zero span', [part(0, 1)], [pin(0.5), pin(0.5)], [], 'same station'],
    ['one pin', [part(0, 1)], [pin(0.5)], [], 'do not hold'],
    ['no support', [part(0, 1)], [], [], 'do not hold'],
    ['a soft support below zero', [part(0, 1)], [pin(0, -4), pin(1)], [], 'support stiffness'],
    ['a support off the shaft', [part(0, 1)], [pin(0), pin(1.2)], [], 'off the shaft'],
    ['a load off the shaft', [part(0, 1)], [pin(0), pin(1)], [Number.NaN], 'off the shaft'],
  ];
  it.each(cases)('%s', (_name, parts, supports, stations, reason) => {
    expect(prepareBeam(parts, supports, stations)).toEqual({ unassessed: expect.stringContaining(reason) });
  });

  it('a load that is no number, or stands where no node is; NaN off the shaft', () => {
    const beam = prepared([part(0, 1)], [pin(0), pin(1)], [0.5]);
    expect(solveBeam(beam, [{ station: 0.5, force: Number.NaN, couple: 0 }])).toHaveProperty('unassessed');
    expect(solveBeam(beam, [{ station: 0.4, force: 1, couple: 0 }])).toHaveProperty('unassessed');
    expect(beamStateAt(solved(beam, []), 1.5).deflection).toBeNaN();
    expect(beamStateAt(solved(beam, []), -0.5).momentAfter).toBeNaN();
    expect(beamStateAt(solved(beam, []), Number.NaN).slope).toBeNaN();
  });
});
