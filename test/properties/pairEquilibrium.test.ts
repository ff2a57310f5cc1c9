/** A shaft on two bearings with a gear or belt: everything on it adds up to no force and no moment, about every point. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Drive, PairSupport, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { axialForms, driveBranches, momentForms, radialForms, ringChecks } from '../../src/mechanics/bearingPair.ts';
import { checkValue, formValue } from '../../src/mechanics/form.ts';
import { randomArm } from '../randomArm.ts';
import { add, cross, less, scaled, size } from '../worldArm.ts';
import { checkOf, opposite, pairLoads, radial } from './pairLoads.ts';

interface Push {
  readonly force: Vec3;
  readonly at: Vec3;
}

/** The pushes of a drive ON the shaft, tooth by tooth and strand by strand, such that they hold the torque about the axis. */
function drivePushes(drive: Drive, torque: number): Push[] {
  const out = (angle: number): Vec3 => [Math.cos(angle), Math.sin(angle), 0];
  const on = (v: Vec3): Vec3 => [v[0], v[1], drive.station];
  if (drive.kind === 'gear') {
    const toMesh = out(drive.mesh);
    const tangent = cross([0, 0, 1], toMesh);
    const tangential = -torque / drive.radius;
    const separating = Math.abs(tangential) * Math.tan(drive.pressureAngle);
    return [
      { force: add(scaled(tangent, tangential), scaled(toMesh, -separating)), at: on(scaled(toMesh, drive.radius)) },
    ];
  }
  // Two strands, both pulling along `pull`, at the rim on either side; their difference carries the torque.
  const pull = out(drive.pull);
  const aside = cross([0, 0, 1], pull);
  const effective = torque / drive.radius;
  const sum = Math.max(drive.pretension, drive.tensionRatio * Math.abs(effective));
  const strands = [(sum + effective) / 2, (sum - effective) / 2];
  return strands.map((tension, k) => ({
    force: scaled(pull, tension),
    at: on(scaled(aside, (k === 0 ? 1 : -1) * drive.radius)),
  }));
}

/** Supports and drives of random arms, a joint load of any make, lengths and forces 1e-3 to 1e3. */
const shafts = fc
  .record({
    seed: fc.nat(100_000),
    length: fc.integer({ min: -3, max: 3 }),
    force: fc.integer({ min: -3, max: 3 }),
    driven: fc.boolean(),
  })
  .map(({ seed, length, force, driven }) => {
    const scale = 10 ** length;
    const arm = randomArm(seed, { joints: 6, drives: true, size: scale });
    const joint = arm.joints.find((j) => (j.drive !== null) === driven) ?? arm.joints[0]!;
    const random = seededRandom(seed + 1);
    const f = scaled(random.direction(), 10 ** force * random.next());
    const m = scaled(random.direction(), 10 ** force * scale * random.next());
    const point = scaled(random.direction(), scale);
    return { support: joint.support as PairSupport, drive: joint.drive, f, m, point, scale: 10 ** force };
  });

const UPWARD: Vec3 = [0, 0, 1];

describe('a shaft on two bearings', () => {
  it('is in equilibrium about every point: joint load, drive and bearings (fast-check seed 20021)', () => {
    fc.assert(
      fc.property(shafts, ({ support, drive, f, m, point }) => {
        const w = Float64Array.of(...f, ...m);
        const { stationA, stationB, thrust } = support;
        const { A, B } = pairLoads(w, stationA, stationB, thrust, drive);
        const pushes: Push[] = [
          { force: f, at: [0, 0, 0] },
          ...(drive ? drivePushes(drive, m[2]) : []),
          { force: opposite(A), at: [0, 0, stationA] },
          { force: opposite(B), at: [0, 0, stationB] },
        ];
        let force: Vec3 = [0, 0, 0];
        let moment = m;
        let forces = 0;
        let moments = size(m);
        for (const push of pushes) {
          force = add(force, push.force);
          const turn = cross(less(push.at, point), push.force);
          moment = add(moment, turn);
          forces += size(push.force);
          moments += size(push.force) * size(less(push.at, point));
        }
        // Without a drive the torque goes elsewhere: to whatever holds the joint.
        if (!drive) moment = [moment[0], moment[1], moment[2] - m[2]];
        expect(size(force)).toBeLessThan(1e-12 * forces);
        expect(size(moment)).toBeLessThan(1e-12 * moments);
      }),
      { numRuns: 500, seed: 20_021 },
    );
  });

  it('has strands that never push and a gear that never pulls the shafts together (fast-check seed 20022)', () => {
    fc.assert(
      fc.property(shafts, ({ drive, m }) => {
        fc.pre(drive !== null);
        for (const { force, at } of drivePushes(drive!, m[2])) {
          const towards = force[0] * (drive!.kind === 'gear' ? -at[0] : Math.cos((drive as { pull: number }).pull));
          const other = force[1] * (drive!.kind === 'gear' ? -at[1] : Math.sin((drive as { pull: number }).pull));
          expect(towards + other).toBeGreaterThanOrEqual(
            -1e-12 * size(force) * (drive!.kind === 'gear' ? size(at) : 1),
          );
        }
      }),
      { numRuns: 300, seed: 20_022 },
    );
  });

  it('has checks that say the size of those loads (fast-check seed 20023)', () => {
    fc.assert(
      fc.property(shafts, ({ support, drive, f, m }) => {
        const w = Float64Array.of(...f, ...m);
        const { stationA, stationB, thrust } = support;
        const loads = pairLoads(w, stationA, stationB, thrust, drive);
        for (const bearing of ['A', 'B'] as const) {
          const value = checkOf('radial', bearing, w, stationA, stationB, thrust, drive);
          expect(Math.abs(value - radial(loads[bearing]))).toBeLessThanOrEqual(1e-13 * value);
          expect(checkOf('axial', bearing, w, stationA, stationB, thrust, drive)).toBe(Math.abs(loads[bearing][2]));
        }
      }),
      { numRuns: 300, seed: 20_023 },
    );
  });

  it('has drive branches that cover every torque and meet at their ends (fast-check seed 20024)', () => {
    fc.assert(
      fc.property(shafts, ({ support, drive, f, m }) => {
        fc.pre(drive !== null);
        const branches = [...driveBranches(drive)].sort((a, b) => a.from - b.from);
        expect(branches[0]!.from).toBe(Number.NEGATIVE_INFINITY);
        expect(branches.at(-1)!.to).toBe(Number.POSITIVE_INFINITY);
        const forms = radialForms({ ...support, drive }, 'A');
        for (let k = 1; k < branches.length; k++) {
          expect(Math.abs(branches[k]!.from)).toBe(Math.abs(branches[k - 1]!.to));
          const w = Float64Array.of(...f, m[0], m[1], branches[k]!.from);
          const values = forms
            .filter((one) => w[5]! >= one.torqueFrom && w[5]! <= one.torqueTo)
            .map((one) => formValue(one, w, 0));
          expect(values.length).toBe(2);
          expect(Math.abs(values[0]! - values[1]!)).toBeLessThanOrEqual(1e-12 * Math.max(...values));
        }
      }),
      { numRuns: 300, seed: 20_024 },
    );
  });

  it('takes the stations of the arrangement: hub between on a clevis, pair to one side on a cantilever (seeds 1–300)', () => {
    const seen = new Set<string>();
    for (let seed = 1; seed <= 300; seed++) {
      const { support } = randomArm(seed, { joints: 1 }).joints[0]!;
      const { arrangement, hub, side, stationA, stationB } = support as PairSupport;
      seen.add(arrangement + (arrangement === 'cantilever' ? side : ''));
      // A radial load in the hub plane.
      const { A, B } = pairLoads(Float64Array.of(1, 0, 0, 0, hub, 0), stationA, stationB);
      if (arrangement === 'clevis') expect(Math.min(A[0], B[0])).toBeGreaterThan(0);
      else {
        expect(A[0]).toBeGreaterThanOrEqual(1 - 1e-12);
        expect(B[0]).toBeLessThanOrEqual(1e-12);
      }
    }
    expect([...seen].sort()).toEqual(['cantilever+', 'cantilever-', 'clevis']);
  });

  it('gives NaN, never a number that could pass, for a load that is not finite', () => {
    for (let k = 0; k < 6; k++) {
      const w = Float64Array.of(1, 2, 3, 4, 5, 6);
      w[k] = Number.NaN;
      const drive: Drive = { kind: 'gear', station: 0.01, radius: 0.02, pressureAngle: 0.35, mesh: 0.4 };
      for (const bearing of ['A', 'B'] as const) {
        expect(checkOf('radial', bearing, w, -0.05, 0.05, 'A', drive)).toBeNaN();
      }
      if (k !== 2) continue;
      for (const thrust of ['A', 'B', 'both'] as const) {
        const values = (['A', 'B'] as const).map((b) => checkOf('axial', b, w, -0.05, 0.05, thrust));
        expect(values.some(Number.isNaN)).toBe(true);
      }
    }
  });
});

describe('a ring that carries force and moment by itself', () => {
  it('is in equilibrium with the joint load and the drive, about its station (fast-check seed 20025)', () => {
    fc.assert(
      fc.property(shafts, ({ support, drive, f, m }) => {
        const station = support.stationA;
        const w = Float64Array.of(...f, ...m);
        const pushes: Push[] = [{ force: f, at: [0, 0, 0] }, ...(drive ? drivePushes(drive, m[2]) : [])];
        let force: Vec3 = [0, 0, 0];
        let moment = m;
        for (const push of pushes) {
          force = add(force, push.force);
          moment = add(moment, cross(less(push.at, scaled(UPWARD, station)), push.force));
        }
        const expected = [radial(force), Math.abs(f[2]), radial(moment)];
        const scale = [size(force) + size(f), size(f), size(moment) + size(m)];
        const checks = ringChecks(0, station, drive);
        expect(checks.map(({ check }) => check)).toEqual(['radial', 'axial', 'moment']);
        checks.forEach((check, k) => {
          expect(Math.abs(checkValue(check, w, 0) - expected[k]!)).toBeLessThanOrEqual(1e-11 * scale[k]!);
        });
      }),
      { numRuns: 300, seed: 20_025 },
    );
  });

  it('sees the tilting moment that moves with the point it is taken about (fast-check seed 20026)', () => {
    fc.assert(
      fc.property(shafts, ({ support, f, m }) => {
        const station = support.stationB;
        const w = Float64Array.of(...f, ...m);
        const about = less(m, cross(scaled(UPWARD, station), f));
        const check = { check: 'moment', joint: 0, bearing: null, unit: 'N·m', forms: momentForms(station) };
        expect(Math.abs(checkValue(check, w, 0) - radial(about))).toBeLessThanOrEqual(
          1e-12 * (radial(about) + size(m)),
        );
      }),
      { numRuns: 300, seed: 20_026 },
    );
  });

  it('has one-way thrust checks that are never less than nothing', () => {
    for (const fz of [-3, -0, 0, 5]) {
      const w = Float64Array.of(0, 0, fz, 0, 0, 0);
      const value = (bearing: 'A' | 'B') =>
        checkValue({ check: 'axial', joint: 0, bearing, unit: 'N', forms: axialForms('both', bearing) }, w, 0);
      expect([value('A'), value('B')]).toEqual([Math.max(fz, 0), Math.max(-fz, 0)]);
    }
  });
});
