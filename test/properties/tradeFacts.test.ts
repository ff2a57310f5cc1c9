/** Statements of common practice about a bearing pair, each held as a property (tag of every one: common practice, no source). */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../src/arm/arm.ts';
import { solveUniformBeam, uniformBeamAt } from '../../src/mechanics/beam.ts';
import { momentForms } from '../../src/mechanics/bearingPair.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { add, scaled } from '../worldArm.ts';
import { checkOf, forceAt, pairLoads, radial, wrench } from './pairLoads.ts';

const within = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true });
const angle = within(-Math.PI, Math.PI);
/** Lengths and loads over six decades. */
const decades = within(-3, 3).map((e) => 10 ** e);
const out = (a: number): Vec3 => [Math.cos(a), Math.sin(a), 0];
const close = (a: Vec3, b: Vec3, scale: number) =>
  expect(Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2])).toBeLessThanOrEqual(1e-12 * scale);
const runs = { numRuns: 300, seed: 20_031 };

describe('trade facts of a bearing pair (fast-check seed 20031)', () => {
  it('tf01: a moment M across span D is carried as two equal and opposite radial loads of M/D', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(-5, 5), (moment, span, a, start) => {
        const { A, B } = pairLoads(wrench([0, 0, 0], scaled(out(a), moment)), start * span, (start + 1) * span);
        close(add(A, B), [0, 0, 0], moment / span);
        expect(radial(A) / (moment / span)).toBeCloseTo(1, 12);
        expect(radial(B) / (moment / span)).toBeCloseTo(1, 12);
      }),
      runs,
    );
  });

  it('tf02: the loads of a pure couple do not depend on where along the shaft it acts; bending moment and slopes do', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(-3, 3), within(-3, 3), (moment, span, a, here, there) => {
        const w = wrench([0, 0, 0], scaled(out(a), moment));
        // The couple acts at the joint origin; the pair stands elsewhere along the shaft.
        const one = pairLoads(w, here * span, (here + 1) * span);
        const two = pairLoads(w, there * span, (there + 1) * span);
        close(one.A, two.A, moment / span);
        close(one.B, two.B, moment / span);
        // The same couple on the shaft as a beam, here at its near quarter and there at its middle.
        const beam = { stationA: 0, stationB: span, EI: 1, stiffnessA: Infinity, stiffnessB: Infinity };
        const [quarter, middle] = [span / 4, span / 2].map((station) => {
          const solved = solveUniformBeam(beam, [{ station, force: 0, couple: moment }]);
          if ('unassessed' in solved) throw new Error(solved.unassessed);
          return { solved, endSlope: uniformBeamAt(solved, 0).slope, ...uniformBeamAt(solved, station) };
        });
        for (const { solved } of [quarter!, middle!]) {
          expect(Math.abs(Math.abs(solved.reactionA) - radial(one.A))).toBeLessThanOrEqual(1e-12 * radial(one.A));
        }
        expect(Math.abs(quarter!.momentBefore) / moment).toBeCloseTo(1 / 4, 9);
        expect(Math.abs(middle!.momentBefore) / moment).toBeCloseTo(1 / 2, 9);
        expect(Math.abs(quarter!.endSlope - middle!.endSlope)).toBeGreaterThan(1e-3 * moment * span);
      }),
      runs,
    );
  });

  it('tf03: loads of side forces and of moments add as vectors; adding sizes can name the wrong bearing', () => {
    fc.assert(
      fc.property(decades, decades, within(-3, 3), angle, angle, within(0, 3), (force, span, start, a, b, k) => {
        const [zA, zB] = [start * span, (start + 1) * span];
        const f = scaled(out(a), force);
        const m = scaled(out(b), k * force * span);
        const both = pairLoads(wrench(f, m), zA, zB);
        const side = pairLoads(wrench(f, [0, 0, 0]), zA, zB);
        const couple = pairLoads(wrench([0, 0, 0], m), zA, zB);
        const scale = force * (1 + Math.abs(start) + k);
        for (const bearing of ['A', 'B'] as const) {
          close(both[bearing], add(side[bearing], couple[bearing]), scale);
          const value = checkOf('radial', bearing, wrench(f, m), zA, zB);
          expect(value).toBeLessThanOrEqual(radial(side[bearing]) + radial(couple[bearing]) + 1e-12 * scale);
        }
      }),
      runs,
    );
    // A side force nearer to A, and a couple that lifts A and presses B: by sizes A is worst, by vectors B.
    const w = wrench([0, -100, 0], [4, 0, 0]);
    const parts = [
      pairLoads(wrench([0, -100, 0], [0, 0, 0]), -0.04, 0.06),
      pairLoads(wrench([0, 0, 0], [4, 0, 0]), -0.04, 0.06),
    ];
    const bySize = (['A', 'B'] as const).map((bearing) => parts.reduce((sum, part) => sum + radial(part[bearing]), 0));
    const byVector = (['A', 'B'] as const).map((bearing) => checkOf('radial', bearing, w, -0.04, 0.06));
    expect(bySize[0]!).toBeGreaterThan(bySize[1]!);
    expect(byVector[0]!).toBeLessThan(byVector[1]!);
  });

  it('tf04: the moment about the shaft axis is not carried by the bearings', () => {
    fc.assert(
      fc.property(decades, angle, angle, within(-1e6, 1e6), within(-3, 3), (force, a, b, torque, start) => {
        const f = scaled(out(a), force);
        const m = scaled(out(b), force);
        const plain = pairLoads(wrench(f, m), start, start + 1);
        expect(pairLoads(wrench(f, [m[0], m[1], torque]), start, start + 1)).toEqual(plain);
      }),
      runs,
    );
  });

  it('tf05: an outboard radial F at overhang a, span D: F(1 + a/D) near, F a/D far and the other way', () => {
    fc.assert(
      fc.property(
        decades,
        decades,
        within(0, 10),
        angle,
        within(-3, 3),
        fc.boolean(),
        (force, span, k, a, at, plus) => {
          const sign = plus ? 1 : -1;
          const load = at * span;
          const near = load + sign * k * span;
          const f = scaled(out(a), force);
          const { A, B } = pairLoads(forceAt(f, [0, 0, load]), near, near + sign * span);
          const scale = force * (1 + k + Math.abs(at)) * 4;
          close(A, scaled(f, 1 + k), scale);
          close(B, scaled(f, -k), scale);
        },
      ),
      runs,
    );
  });

  it('tf06: a radial load between the bearings shares as the opposite lever arms and loads neither beyond itself', () => {
    fc.assert(
      fc.property(decades, decades, within(0, 1), angle, within(-3, 3), (force, span, k, a, start) => {
        const [zA, zB] = [start * span, (start + 1) * span];
        const f = scaled(out(a), force);
        const { A, B } = pairLoads(forceAt(f, [0, 0, zA + k * span]), zA, zB);
        const scale = force * 4 * (1 + Math.abs(start));
        close(A, scaled(f, 1 - k), scale);
        close(B, scaled(f, k), scale);
        expect(Math.max(radial(A), radial(B))).toBeLessThanOrEqual(force + 1e-12 * scale);
      }),
      runs,
    );
  });

  it('tf07: where a radial load acts along the axis matters; where a force along the axis acts does not', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(-3, 3), within(0.01, 3), (force, span, a, at, shift) => {
        const loads = (f: Vec3, z: number) => pairLoads(forceAt(f, [0, 0, z * span]), 0, span);
        const f = scaled(out(a), force);
        const moved = radial(add(loads(f, at + shift).B, scaled(loads(f, at).B, -1)));
        expect(moved / (force * shift)).toBeCloseTo(1, 9);
        expect(loads([0, 0, force], at)).toEqual(loads([0, 0, force], at + shift));
      }),
      runs,
    );
  });

  it('tf08: a force along the axis at radius r adds the moment F r, so ±F r/D on the bearings', () => {
    fc.assert(
      fc.property(decades, decades, angle, decades, within(-3, 3), (force, span, a, r, at) => {
        const point: Vec3 = [r * Math.cos(a), r * Math.sin(a), at * span];
        const { A, B } = pairLoads(forceAt([0, 0, force], point), 0, span);
        const expected = scaled(out(a), (force * r) / span);
        const scale = (force * r) / span;
        close([A[0], A[1], 0], expected, scale);
        close([B[0], B[1], 0], scaled(expected, -1), scale);
      }),
      runs,
    );
  });

  it('tf09: the axial load goes to the locating bearing, or by its direction to one of an opposed pair', () => {
    fc.assert(
      fc.property(
        fc.oneof(fc.integer({ min: -10_000, max: 10_000 }), decades),
        fc.constantFrom('A' as const, 'B' as const, 'both' as const),
        (fz, thrust) => {
          const w = wrench([1, 2, fz], [3, 4, 5]);
          const loads = pairLoads(w, -0.02, 0.03, thrust);
          expect(loads.A[2] + loads.B[2]).toBe(fz);
          const bearer = thrust === 'both' ? (fz >= 0 ? 'A' : 'B') : thrust;
          const free = bearer === 'A' ? 'B' : 'A';
          expect(loads[free][2]).toBe(0);
          expect(checkOf('axial', bearer, w, -0.02, 0.03, thrust)).toBe(Math.abs(fz));
          expect(checkOf('axial', free, w, -0.02, 0.03, thrust)).toBe(0);
        },
      ),
      runs,
    );
  });

  it('tf10: bearings further apart carry less of a moment and of an overhung load', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(0, 5), within(1.01, 10), (force, span, a, overhang, wider) => {
        const couple = wrench([0, 0, 0], scaled(out(a), force * span));
        const overhung = forceAt(scaled(out(a), force), [0, 0, -(overhang + 0.01) * span]);
        for (const w of [couple, overhung]) {
          for (const bearing of ['A', 'B'] as const) {
            const close = checkOf('radial', bearing, w, 0, span);
            expect(checkOf('radial', bearing, w, 0, wider * span)).toBeLessThan(close);
          }
        }
      }),
      runs,
    );
  });

  it('tf11: the near load falls towards the load itself as D/a grows; little is gained beyond two to three overhangs', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(1, 1000), (force, overhang, a, k) => {
        const near = (ratio: number) =>
          checkOf('radial', 'A', forceAt(scaled(out(a), force), [0, 0, -overhang]), 0, ratio * overhang) / force;
        expect(near(k)).toBeGreaterThan(1);
        expect(near(2 * k)).toBeLessThan(near(k));
        expect(near(1e6)).toBeCloseTo(1, 5);
        // Twice the span from half an overhang takes a third off; from three overhangs an eighth, and no span takes more than a quarter.
        expect(near(1) / near(0.5)).toBeCloseTo(2 / 3, 9);
        expect(near(6) / near(3)).toBeCloseTo(7 / 8, 9);
        expect(near(3 * k) / near(3)).toBeGreaterThanOrEqual(3 / 4);
      }),
      runs,
    );
  });

  it('tf20: the peak bending moment is F a at the near bearing for an overhung load, F b c/D under a load between', () => {
    fc.assert(
      fc.property(decades, decades, angle, within(0, 5), within(0, 1), (force, span, a, overhang, share) => {
        const f = scaled(out(a), force);
        const at = (w: Float64Array, station: number) =>
          checkValue({ check: 'moment', joint: 0, bearing: null, unit: 'N·m', forms: momentForms(station) }, w, 0);
        const overhung = forceAt(f, [0, 0, -overhang * span]);
        expect(Math.abs(at(overhung, 0) - force * overhang * span)).toBeLessThanOrEqual(1e-12 * force * span * 6);
        const beam = { stationA: 0, stationB: span, EI: 1, stiffnessA: Infinity, stiffnessB: Infinity };
        const station = share * span;
        const solved = solveUniformBeam(beam, [{ station, force, couple: 0 }]);
        if ('unassessed' in solved) throw new Error(solved.unassessed);
        const { A } = pairLoads(forceAt(f, [0, 0, station]), 0, span);
        const peak = force * share * (1 - share) * span;
        expect(Math.abs(radial(A) * station - peak)).toBeLessThanOrEqual(1e-12 * force * span);
        expect(Math.abs(Math.abs(uniformBeamAt(solved, station).momentBefore) - peak)).toBeLessThanOrEqual(
          1e-12 * force * span,
        );
      }),
      runs,
    );
  });
});
