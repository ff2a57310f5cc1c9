/** Fatigue over sampled poses: against plain histories, against random choices of what a case leaves free; the samples themselves. */
import { describe, expect, it } from 'vitest';
import { isRingParts, jointParts } from '../../src/capacity/index.ts';
import { fatigueSafety, loadCycles, sectionHistory } from '../../src/capacity/shaft/index.ts';
import { seededRandom } from '../../src/math/random.ts';
import { shaftForms } from '../../src/mechanics/beamForms.ts';
import { radialVector } from '../../src/mechanics/bearingPair.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { fatigueRows } from '../../src/studies/assessFatigue.ts';
import { caseHistory, caseLoads, outerEntries } from '../../src/studies/fatigueHistory.ts';
import { samplePoses } from '../../src/studies/samplePoses.ts';
import { wholeFile } from '../arm/wholeFile.ts';
import { armOf, CLEVIS, oneJoint } from '../capacity/checks/oneJoint.ts';
import { randomArm } from '../randomArm.ts';

const whole = armOf(wholeFile());

describe('poses for samples', () => {
  it('are a grid with both ends of each travel, as fine as fits', () => {
    const arm = oneJoint({ support: CLEVIS, travel: [-30, 90] });
    const poses = samplePoses(flattenArm(arm), 100);
    expect(poses).toHaveLength(100);
    expect(poses[0]).toBeCloseTo(-Math.PI / 6, 12);
    expect(poses[99]).toBeCloseTo(Math.PI / 2, 12);
  });

  it('are spread where no grid fits: within travel, ends met, every sixth of each travel visited', () => {
    const chain = flattenArm(randomArm(4, { joints: 9 }));
    const poses = samplePoses(chain, 2000);
    expect(poses).toHaveLength(9 * 2000);
    for (let j = 0; j < 9; j++) {
      const [from, to] = [chain.from[j]!, chain.to[j]!];
      const own = Array.from({ length: 2000 }, (_, k) => poses[9 * k + j]!);
      const bins = new Set(own.map((q) => Math.min(5, Math.floor((6 * (q - from)) / (to - from)))));
      expect(bins.size).toBe(6);
      expect(Math.min(...own)).toBeGreaterThanOrEqual(from);
      expect(Math.max(...own)).toBeLessThanOrEqual(to);
      if (chain.full[j] === 0) expect([Math.min(...own), Math.max(...own)]).toEqual([from, to]);
    }
  });

  it('are one pose where nothing turns', () => {
    const arm = oneJoint({ support: CLEVIS, travel: [20, 20] });
    expect(samplePoses(flattenArm(arm), 100)).toHaveLength(1);
  });
});

describe('thinned history', () => {
  it.each(['link', 'housing'] as const)(
    'gives the cycles of the whole one, shaft turning with the %s; seed 6',
    (turnsWith) => {
      const random = seededRandom(6);
      for (let k = 0; k < 20; k++) {
        const history = Float64Array.from({ length: 4 * 300 }, () => random.between(-3, 5));
        const thin = outerEntries(history, turnsWith);
        expect(thin.length).toBeLessThan(history.length / 2);
        const [all, few] = [loadCycles(history, turnsWith), loadCycles(thin, 'housing')];
        if ('unassessed' in all || 'unassessed' in few) throw new Error('a load cycle is wanted');
        all.value.forEach((cycle, fibre) => {
          for (const key of ['momentAmplitude', 'momentMean', 'torqueAmplitude', 'torqueMean'] as const) {
            expect(few.value[fibre]![key]).toBeCloseTo(cycle[key], 10);
          }
        });
      }
    },
  );

  it('keeps a load that is not a number, so that it is not passed over', () => {
    const history = Float64Array.from({ length: 40 }, (_, k) => Math.sin(k));
    history[9] = Number.NaN;
    expect('unassessed' in loadCycles(outerEntries(history, 'housing'), 'housing')).toBe(true);
    expect(outerEntries(new Float64Array(8), 'housing')).toHaveLength(8);
  });
});

describe('fatigue of a shaft', () => {
  it('is that of the plain history of the same poses, worst section, where nothing is free', () => {
    const arm = oneJoint({
      axis: [0, 1, 0],
      travel: [-70, 40],
      link: { name: 'swing', mass_kg: 60, centre_mm: [120, 15, 30] },
      support: CLEVIS,
      cases: [{ name: 'low', factor: 0.4 }, { name: 'high' }],
    });
    const chain = flattenArm(arm);
    const parts = jointParts(arm, chain, 0)!;
    if ('unassessed' in parts.shaft) throw new Error(parts.shaft.unassessed);
    const shaft = parts.shaft.value;
    const poses = samplePoses(chain, 500);
    const wrenches = new Float64Array(2 * WRENCH * poses.length);
    const angles = new Float64Array(2 * poses.length);
    chain.cases.forEach((load, c) => {
      poses.forEach((q, k) => {
        const at = c * poses.length + k;
        staticLoads(chain, load, [q], wrenches.subarray(WRENCH * at, WRENCH * at + WRENCH), poseScratch(1));
        angles[at] = q;
      });
    });
    let least = Number.POSITIVE_INFINITY;
    let stress = 0;
    shaft.points.forEach(({ section, notch }, point) => {
      for (const side of ['momentBefore', 'momentAfter'] as const) {
        const history = sectionHistory(shaft, point, side, wrenches, angles);
        if ('unassessed' in history) throw new Error(history.unassessed);
        const cycles = loadCycles(history.value, 'link');
        if ('unassessed' in cycles) throw new Error(cycles.unassessed);
        const safety = fatigueSafety(cycles.value, section, notch, 'machined', shaft.material, 0.99);
        if ('unassessed' in safety) throw new Error(safety.unassessed);
        if (safety.value.safety >= least) continue;
        least = safety.value.safety;
        stress = safety.value.endurance.Se / least;
      }
    });
    const [row] = fatigueRows(arm, chain, { poses: 500 });
    expect(row!.value / stress).toBeCloseTo(1, 9);
    expect(row!.utilisation).toBeCloseTo(1.5 / least, 9);
    expect(row!.where).toBe('hub');
    // The pose shown is one of the load case that bends the shaft most.
    expect(row!.case).toBe('high');
    expect(row!.pose).toHaveLength(1);
  });

  it('covers 3000 random choices of what a case leaves free at a pose, and is above them by little, seed 12', () => {
    const random = seededRandom(12);
    const chain = flattenArm(whole);
    const pose = [0.4, -0.9, 1.3];
    for (const load of chain.cases) {
      if (load.force !== 'any' && !load.speed) continue;
      const here = caseLoads(chain, load, Float64Array.from(pose));
      for (let joint = 0; joint < 2; joint++) {
        const parts = jointParts(whole, chain, joint)!;
        if ('unassessed' in parts.shaft || isRingParts(parts)) continue;
        const shaft = parts.shaft.value;
        const point = shaft.points.findIndex(({ station }) => station === parts.support.hub);
        const history = caseHistory(shaft, joint, point, 'momentBefore', here, Float64Array.of(pose[joint]!));
        const forms = shaftForms(shaft.beam, shaft.loading, shaft.points[point]!.station, 'momentBefore');
        if ('unassessed' in history || 'unassessed' in forms) throw new Error('a history is wanted');
        const reach = (angle: number) => {
          let most = Number.NEGATIVE_INFINITY;
          for (let o = 0; o < history.value.length; o += 4) {
            most = Math.max(most, history.value[o + 1]! * Math.cos(angle) - history.value[o]! * Math.sin(angle));
          }
          return most;
        };
        const angles = Array.from({ length: 24 }, (_, k) => (2 * Math.PI * k) / 24);
        const seen = angles.map(() => Number.NEGATIVE_INFINITY);
        const out = new Float64Array(WRENCH * chain.n);
        for (let k = 0; k < 3000; k++) {
          // Ends of the limits as well as what lies between.
          const within = (limits: Float64Array | null) =>
            Float64Array.from(
              { length: chain.n },
              (_, j) =>
                (limits?.[j] ?? 0) * (random.next() < 0.5 ? Math.sign(random.between(-1, 1)) : random.between(-1, 1)),
            );
          const rates = { speed: within(load.speed), accel: within(load.accel) };
          dynamicLoads(
            chain,
            load,
            pose,
            rates,
            out,
            poseScratch(chain.n),
            load.force === 'any' ? random.direction() : null,
          );
          const [x, y] = radialVector(forms, out, WRENCH * joint);
          angles.forEach((angle, a) => {
            const along = x * Math.cos(angle) + y * Math.sin(angle);
            expect(along).toBeLessThanOrEqual(reach(angle) + 1e-9 * Math.abs(reach(angle)));
            seen[a] = Math.max(seen[a]!, along);
          });
        }
        const widest = Math.max(...angles.map((angle, a) => reach(angle) - seen[a]!));
        const size = Math.max(...angles.map(reach));
        expect(widest).toBeLessThan(0.12 * size);
      }
    }
  });

  it('pools the cases of the duty alone where the file has one', () => {
    const cases = [{ name: 'work' }, { name: 'mishap', factor: 3 }];
    const parts = { axis: [0, 1, 0] as [number, number, number], support: CLEVIS, cases };
    const all = oneJoint(parts);
    const busy = oneJoint({ ...parts, duty: [{ case: 'work', share: 1, anywhere: { cycles_per_min: [2] } }] });
    const value = (arm: typeof all) => fatigueRows(arm, flattenArm(arm), { poses: 200 })[0]!;
    expect(value(busy).reason).toContain('poses of work,');
    expect(value(all).reason).toContain('work, mishap');
    expect(value(all).value).toBeGreaterThan(2 * value(busy).value);
  });

  it('never falls when poses are added, and takes those asked for', () => {
    const arm = oneJoint({ axis: [0, 1, 0], travel: [-70, 40], support: CLEVIS });
    const chain = flattenArm(arm);
    const coarse = fatigueRows(arm, chain, { poses: 3 })[0]!.value;
    const fine = fatigueRows(arm, chain, { poses: 3, also: [[0.1], [-0.35]] })[0]!;
    expect(fine.value).toBeGreaterThanOrEqual(coarse * (1 - 1e-12));
    expect(fine.reason).toContain('range over 5 poses');
  });

  it('stays unassessed without a shaft or material, and says what to fill in', () => {
    const arm = oneJoint({ support: { ...CLEVIS, shaft: { diameter_mm: 20 } } });
    expect(fatigueRows(arm, flattenArm(arm))[0]).toMatchObject({ verdict: 'unassessed', pose: [], utilisation: null });
    expect(fatigueRows(arm, flattenArm(arm))[0]!.reason).toContain('fill in `material`');
    expect(fatigueRows(oneJoint({}), flattenArm(oneJoint({})))).toEqual([]);
  });
});
