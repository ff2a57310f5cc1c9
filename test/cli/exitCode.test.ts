import { afterEach, describe, expect, it, vi } from 'vitest';
import { exitOf, jointObjects, rowObject } from '../../src/cli/rowObjects.ts';
import type { CheckRow } from '../../src/studies/results.ts';

const LOAD: CheckRow = {
  joint: 'slew',
  jointIndex: 0,
  bearing: 'A',
  check: 'radial',
  unit: 'N',
  value: 812.4,
  case: 'carry',
  pose: [Math.PI / 6],
  free: null,
  wrench: { force: [1, 2, 3], moment: [4, 5, 6] },
  bound: null,
  gap: null,
  certified: null,
  allowable: null,
  utilisation: null,
  verdict: null,
  reason: null,
  source: null,
};
const PASS: CheckRow = {
  ...LOAD,
  check: 'static',
  allowable: 1000,
  utilisation: 0.8124,
  verdict: 'pass',
  source: 'ISO 76',
};
const OVER: CheckRow = { ...PASS, allowable: 500, utilisation: 1.6248, verdict: 'over' };
const UNASSESSED: CheckRow = {
  ...PASS,
  allowable: null,
  utilisation: null,
  verdict: 'unassessed',
  reason: 'give C0_N',
};
const MISSING: CheckRow = { ...UNASSESSED, value: Number.NaN, pose: [], case: '' };

describe('exit code of rows', () => {
  const said = vi.spyOn(process.stderr, 'write').mockReturnValue(true);
  afterEach(() => said.mockClear());

  it('is 0 where nothing is over, 1 where anything is', () => {
    expect(exitOf([LOAD, PASS], false)).toBe(0);
    expect(said).not.toHaveBeenCalled();
    expect(exitOf([LOAD, PASS, OVER], false)).toBe(1);
    expect(said).toHaveBeenCalledWith('armload: 1 check over the limit\n');
  });

  it('is 1 for what was not assessed only where that is asked', () => {
    for (const row of [UNASSESSED, MISSING]) {
      expect(exitOf([PASS, row], false)).toBe(0);
      expect(exitOf([PASS, row], true)).toBe(1);
    }
    expect(exitOf([LOAD, PASS], true)).toBe(0);
    expect(exitOf([LOAD], true)).toBe(1);
    expect(exitOf([], true)).toBe(1);
  });

  it('is 1 for a value that failed, whatever its verdict says', () => {
    expect(exitOf([{ ...PASS, value: Number.NaN }], false)).toBe(1);
    expect(exitOf([{ ...LOAD, value: Number.POSITIVE_INFINITY }], false)).toBe(1);
    expect(exitOf([{ ...UNASSESSED, value: Number.NaN }], false)).toBe(1);
  });

  it('does not take a pass at its word: utilisation above 1, none, or not a number is over', () => {
    for (const utilisation of [1.0000001, null, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(exitOf([{ ...PASS, utilisation }], false)).toBe(1);
    }
    expect(exitOf([{ ...PASS, utilisation: 1 }], false)).toBe(0);
  });
});

describe('rows as JSON', () => {
  it('have the keys of the contract, and those of bound and capacity only where there is one', () => {
    expect(rowObject(LOAD)).toEqual({
      bearing: 'A',
      check: 'radial',
      value: 812.4,
      unit: 'N',
      pose_deg: [30],
      case: 'carry',
      wrench: { force_N: [1, 2, 3], moment_Nm: [4, 5, 6] },
    });
    expect(rowObject({ ...LOAD, bound: 813, gap: 0.0007, certified: true })).toMatchObject({
      found: 812.4,
      bound: 813,
      gap: 0.0007,
      certified: true,
    });
    expect(rowObject(PASS)).toMatchObject({ allowable: 1000, utilisation: 0.8124, verdict: 'pass', source: 'ISO 76' });
    expect(rowObject(UNASSESSED)).toMatchObject({ allowable: null, verdict: 'unassessed', reason: 'give C0_N' });
    expect(JSON.parse(JSON.stringify(rowObject(MISSING))).value).toBeNull();
  });

  it('tell the free parts in degrees and base axes', () => {
    const free = { tipForce: [0, 0, -1] as const, speed: [Math.PI], accel: [-Math.PI / 2] };
    const { free: told } = rowObject({ ...LOAD, free }) as { free: Record<string, number[]> };
    expect(told.tip_force_base).toEqual([0, 0, -1]);
    expect(told.speed_deg_s![0]).toBeCloseTo(180, 12);
    expect(told.accel_deg_s2![0]).toBeCloseTo(-90, 12);
  });

  it('are gathered under their joints', () => {
    const joints = jointObjects([LOAD, { ...LOAD, joint: 'elbow', jointIndex: 1 }, PASS]) as {
      joint: string;
      checks: unknown[];
    }[];
    expect(joints.map((joint) => [joint.joint, joint.checks.length])).toEqual([
      ['slew', 2],
      ['elbow', 1],
    ]);
  });
});
