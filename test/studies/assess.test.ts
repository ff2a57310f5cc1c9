/** Capacity at one pose and over rows: values against other routes, bounds against random choices, verdicts joined. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import type { BearingFile } from '../../src/arm/armFile.ts';
import { capacityForms, demandAt } from '../../src/capacity/index.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { armCapacity, assessPose, assessRows, checkOf, rowsWithVerdict } from '../../src/studies/assess.ts';
import { REASONS } from '../../src/studies/assessVerdict.ts';
import { type CheckRow, isMissing } from '../../src/studies/results.ts';
import { wholeFile } from '../arm/wholeFile.ts';
import { armOf, CLEVIS, GROOVE, oneJoint } from '../capacity/checks/oneJoint.ts';

/** Every support, drive, motion and a free tip force; loads small enough to compute, large enough to matter. */
const whole = armOf(wholeFile());

describe('assessment at one pose', () => {
  const chain = flattenArm(whole);
  const capacity = armCapacity(whole, chain);
  const pose = [0.3, -1.1, 0.7];
  const assessed = assessPose(whole, chain, capacity, pose);

  it('has the demand of the kernel where a case leaves nothing free', () => {
    const out = new Float64Array(WRENCH * chain.n);
    const scratch = poseScratch(chain.n);
    let compared = 0;
    for (const load of chain.cases) {
      if (load.force === 'any' || load.speed) continue;
      staticLoads(chain, load, pose, out, scratch);
      const { rows } = assessed.find((one) => one.case === load.name)!;
      for (const check of capacity.checks) {
        const row = rows.find(
          (one) => one.jointIndex === check.jointIndex && one.bearing === check.bearing && one.check === check.check,
        )!;
        if (!check.form && !check.atPose) expect(isMissing(row)).toBe(true);
        else {
          expect(row.value).toBeCloseTo(demandAt(check, out, WRENCH * check.joint), 9);
          compared++;
        }
      }
    }
    expect(compared).toBeGreaterThan(20);
  });

  it('has a value that its own choice of the free parts attains', () => {
    const out = new Float64Array(WRENCH * chain.n);
    const still = new Float64Array(chain.n);
    for (const { case: name, rows } of assessed) {
      const load = chain.cases.find((one) => one.name === name)!;
      for (const row of rows) {
        if (!row.free) continue;
        const rates = { speed: row.free.speed ?? still, accel: row.free.accel ?? still };
        dynamicLoads(chain, load, pose, rates, out, poseScratch(chain.n), row.free.tipForce);
        const check = capacity.checks.find(
          (one) => one.jointIndex === row.jointIndex && one.bearing === row.bearing && one.check === row.check,
        )!;
        expect(row.value / demandAt(check, out, WRENCH * check.joint)).toBeCloseTo(1, 7);
      }
    }
  });

  it('is not exceeded by 400 random choices of the free parts, seed 17', () => {
    const random = seededRandom(17);
    const out = new Float64Array(WRENCH * chain.n);
    for (const load of chain.cases) {
      if (load.force !== 'any' && !load.speed) continue;
      const { rows } = assessed.find((one) => one.case === load.name)!;
      for (let k = 0; k < 400; k++) {
        const within = (limits: Float64Array | null) =>
          Float64Array.from({ length: chain.n }, (_, j) => (limits?.[j] ?? 0) * random.between(-1, 1));
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
        for (const check of capacity.checks) {
          if (!check.form) continue;
          const row = rows.find(
            (one) => one.jointIndex === check.jointIndex && one.bearing === check.bearing && one.check === check.check,
          )!;
          // The value may fall short of the worst by what the form of a sum lies above it, or by a hair of a speed.
          expect(demandAt(check, out, WRENCH * check.joint)).toBeLessThanOrEqual(1.006 * row.value + 1e-12);
        }
      }
    }
  });

  it('keeps a row for what cannot be computed and throws on a pose of the wrong length', () => {
    const bare = oneJoint({ support: { ...CLEVIS, shaft: undefined } as never });
    const link = flattenArm(bare);
    const [only] = assessPose(bare, link, armCapacity(bare, link), [0]);
    const stress = only!.rows.find((row) => row.check === 'stress')!;
    expect(isMissing(stress)).toBe(true);
    expect(stress.reason).toContain('fill in `shaft`');
    expect(() => assessPose(bare, link, armCapacity(bare, link), [0, 0])).toThrow(RangeError);
  });

  it('passes nothing when a load is not a number', () => {
    const broken: Arm = { ...whole, gravity: [0, 0, Number.NaN] };
    const sick = flattenArm(broken);
    for (const { rows } of assessPose(broken, sick, armCapacity(broken, sick), pose)) {
      expect(rows.length).toBeGreaterThan(0);
      for (const row of rows) if (row.verdict !== null) expect(row.verdict).toBe('unassessed');
    }
  });
});

const roller: BearingFile = { kind: 'cylindrical-roller', bore_mm: 20, outer_mm: 42, width_mm: 12, C0_N: 9000 };

describe('thrust on a bearing that takes none', () => {
  const verdicts = (axis: [number, number, number], left: BearingFile) => {
    const arm = oneJoint({ axis, support: CLEVIS, bearings: { left, right: GROOVE } });
    const chain = flattenArm(arm);
    return assessPose(arm, chain, armCapacity(arm, chain), [0.2])[0]!.rows.find((row) => row.check === 'thrust');
  };
  it('is over as soon as there is any, and passes where the axis is level', () => {
    expect(verdicts([0, 0, 1], roller)).toMatchObject({
      verdict: 'over',
      value: 100,
      allowable: 0,
      utilisation: Number.POSITIVE_INFINITY,
    });
    expect(verdicts([0, 1, 0], roller)).toMatchObject({ verdict: 'pass', utilisation: 0 });
    expect(verdicts([0, 0, 1], GROOVE)).toBeUndefined();
  });
  it('leaves a bushing open: the file says nothing of a flange', () => {
    const bush: BearingFile = {
      kind: 'plain-bushing',
      bore_mm: 20,
      outer_mm: 26,
      width_mm: 20,
      pressure_limit_MPa: 10,
    };
    expect(verdicts([0, 0, 1], bush)).toMatchObject({ verdict: 'unassessed', value: 100 });
    expect(verdicts([0, 0, 1], bush)!.reason).toContain('flange');
    expect(verdicts([0, 1, 0], bush)).toMatchObject({ verdict: 'pass' });
    expect(verdicts([0, 0, 1], { ...bush, flange_outer_mm: 32 })).toBeUndefined();
  });
});

describe('verdicts joined to rows', () => {
  const arm = oneJoint({
    axis: [0, 1, 0],
    travel: [-60, 60],
    link: { name: 'swing', mass_kg: 100, centre_mm: [100, 20, 0] },
    support: CLEVIS,
    targets: { static_safety: 1.5 },
  });
  const chain = flattenArm(arm);
  const capacity = armCapacity(arm, chain);

  /** A row as a sweep or the certified worst makes it, from a pose. */
  const rowOf = (check: string, bearing: CheckRow['bearing'], q: number): CheckRow => {
    const { rows } = assessPose(arm, chain, capacity, [q])[0]!;
    const row = rows.find((one) => one.check === check && one.bearing === bearing)!;
    const { where: _, ...rest } = row;
    return { ...rest, allowable: null, utilisation: null, verdict: null, reason: null, source: null };
  };
  const joined = (row: CheckRow, options = {}) => rowsWithVerdict(chain, [row], capacity.checks, options)[0]!;

  it('hold the bound against the allowable where there is one', () => {
    const row = rowOf('static', 'B', 0);
    const proved = { ...row, bound: 1500, gap: 0.5, certified: false };
    expect(joined(proved)).toMatchObject({
      verdict: 'pass',
      allowable: 1600,
      utilisation: 1500 / 1600,
      reason: null,
      value: row.value,
    });
    expect(joined({ ...proved, bound: 1601 })).toMatchObject({ verdict: 'unassessed', reason: REASONS['open gap'] });
    expect(joined({ ...proved, value: 1700, bound: 1701 })).toMatchObject({ verdict: 'over' });
    expect(joined({ ...proved, value: Number.NaN })).toMatchObject({ verdict: 'unassessed', utilisation: null });
  });

  it('say of a grid that it is one, and pass nothing of half a grid', () => {
    const row = rowOf('static', 'B', 0);
    expect(joined(row)).toMatchObject({ verdict: 'pass', reason: 'on this grid only' });
    expect(joined(row, { scope: 'part of the grid' })).toMatchObject({ verdict: 'unassessed' });
    expect(joined({ ...row, value: 1700 }, { scope: 'part of the grid' })).toMatchObject({ verdict: 'over' });
  });

  it('leave pure load rows alone', () => {
    const load = { ...rowOf('static', 'B', 0), check: 'radial' };
    expect(joined(load)).toEqual(load);
  });

  it('leave a row that was not looked at with its own reason, and find the check of a row', () => {
    const row = {
      ...rowOf('static', 'B', 0),
      value: Number.NaN,
      pose: [],
      verdict: 'unassessed' as const,
      reason: 'stopped',
    };
    expect(joined(row)).toMatchObject({ verdict: 'unassessed', reason: 'stopped', allowable: 1600, utilisation: null });
    expect(checkOf(capacity.checks, row)!.rule.name).toBe('static equivalent load');
    expect(checkOf(capacity.checks, { ...row, check: 'radial' })).toBeNull();
  });

  it('tell the place on the shaft', () => {
    expect(joined(rowOf('stress', null, 0)).where).toBe('hub');
  });

  it('join what the certified worst gives: found and bound around the closed form', () => {
    // The couple of 20 N·m and the weight of 1000 N do not change with the angle about a level axis: FrB = 750 N throughout.
    const search = new WorstCase(chain, chain.cases[0]!, capacityForms(capacity.checks));
    for (let k = 0; k < 40 && search.open(1e-4); k++) search.step(1e-4);
    const rows = search.rows().map((found): CheckRow => {
      const head = rowOf(found.check.check, found.check.bearing, 0);
      const { bound, gap } = found;
      const out = { force: [0, 0, 0] as number[], moment: [0, 0, 0] as number[] };
      for (let r = 0; r < 3; r++) {
        for (let c = 0; c < 3; c++) {
          out.force[r]! += chain.housing[3 * r + c]! * found.wrench[c]!;
          out.moment[r]! += chain.housing[3 * r + c]! * found.wrench[3 + c]!;
        }
      }
      const wrench = out as unknown as CheckRow['wrench'];
      return { ...head, value: found.found, pose: [...found.pose], wrench, bound, gap, certified: gap <= 1e-4 };
    });
    const all = assessRows(chain, capacity, rows);
    const row = all.find((one) => one.check === 'static' && one.bearing === 'B')!;
    expect(row.value).toBeCloseTo(750, 6);
    expect(row.bound!).toBeGreaterThanOrEqual(row.value);
    expect(row.utilisation!).toBeCloseTo(750 / 1600, 4);
    expect(row).toMatchObject({ verdict: 'pass', reason: null, certified: true });
    expect(all.filter(({ verdict }) => verdict === 'over')).toEqual([]);
  });
});

describe('a row whose form lies above its demand', () => {
  const arm = oneJoint({
    axis: [0, 1, 0],
    support: { arrangement: 'ring', hub_mm: 0, station_mm: 0, bearing: 'ring' },
    bearings: { ring: { kind: 'crossed-roller', bore_mm: 60, outer_mm: 100, width_mm: 13, C0_N: 40000 } },
  });
  const chain = flattenArm(arm);
  const capacity = armCapacity(arm, chain);
  const check = capacity.checks.find((one) => one.check === 'static')!;

  it('takes the demand as attained, keeps the bound, and is certified by the gap asked for', () => {
    // At this angle the weight points between two of the directions that the sum is taken by.
    const [assessed] = assessPose(arm, chain, capacity, [0.1]);
    const base = assessed!.rows.find((row) => row.check === 'static')!;
    const out = new Float64Array(WRENCH);
    staticLoads(chain, chain.cases[0]!, [0.1], out, poseScratch(1));
    const safe = checkValue(check.form!, out, 0);
    expect(safe).toBeGreaterThan(base.value);
    const worst = {
      ...base,
      value: safe,
      bound: safe,
      gap: 0,
      certified: true,
      verdict: null,
      allowable: null,
      utilisation: null,
    };
    const [loose] = rowsWithVerdict(chain, [worst], capacity.checks, { gap: 0.05 });
    expect(loose!.value).toBeCloseTo(base.value, 9);
    expect(loose!.bound).toBe(safe);
    expect(loose!.gap).toBeCloseTo(1 - base.value / safe, 12);
    expect(loose!.certified).toBe(true);
    expect(loose!.utilisation).toBeCloseTo(safe / check.allowable!, 12);
    expect(rowsWithVerdict(chain, [worst], capacity.checks)[0]!.certified).toBe(false);
  });
});
