import { describe, expect, it } from 'vitest';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { compareTable, layoutTable, spanTable } from '../../src/report/compareTables.ts';
import { compareArm } from '../../src/studies/compareArm.ts';
import { planCompare } from '../../src/studies/comparePlan.ts';
import { randomArm } from '../randomArm.ts';

describe('compare tables', () => {
  const arm = randomArm(1, { joints: 2 });
  const plan = planCompare(arm, flattenArm(arm), 'joint 2', { clevisSpan: 0.05, cantileverSpan: 0.08, spans: [0.06] });
  if ('refused' in plan) throw new Error(plan.refused);
  const result = compareArm(
    plan,
    plan.checks.map((check, k) => ({
      joint: 'joint 2',
      jointIndex: 1,
      bearing: check.bearing,
      check: check.check,
      unit: check.unit,
      value: 10 * (k + 1),
      case: k % 2 === 0 ? 'carry' : 'press',
      pose: [0.1, 0.2],
      free: null,
      wrench: { force: [0, 0, 0], moment: [0, 0, 0] },
      bound: null,
      gap: null,
      certified: null,
      allowable: null,
      utilisation: null,
      verdict: null,
      reason: null,
      source: null,
    })),
  );

  it('say which layout is the file and where the bearings stand', () => {
    const { rows } = layoutTable(result);
    expect(rows.map((row) => row[0])).toEqual(['clevis', 'cantilever']);
    expect(rows.filter((row) => row[1] === 'as in the file').map((row) => row[0])).toEqual([plan.asFile]);
    expect(rows.map((row) => row[2])).toEqual(['50 mm', '80 mm']);
  });

  it('set the two layouts side by side, the larger of A and B after both', () => {
    const { rows } = compareTable(result);
    expect(rows.map((row) => row.slice(0, 2))).toEqual([
      ['radial', 'A'],
      ['radial', 'B'],
      ['radial', 'A or B'],
      ['axial', 'A'],
      ['axial', 'B'],
      ['moment', null],
    ]);
    expect(rows[0]!.slice(2, 6)).toEqual([40, 60, 'N', 1.5]);
    expect(rows[2]!.slice(2, 6)).toEqual([50, 70, 'N', 1.4]);
    expect(rows[5]!.slice(2, 6)).toEqual([10, 10, 'N·m', 1]);
    expect(rows[0]!.at(-1)).toBe('press');
  });

  it('list every span with both bearings of both layouts and mark the two own ones', () => {
    const { rows } = spanTable(result);
    expect(rows.map((row) => [row[0], row[5]])).toEqual([
      [50, '← clevis'],
      [60, ''],
      [80, '← cantilever'],
    ]);
    expect(rows[1]!.slice(1, 5)).toEqual([120, 130, 140, 150]);
  });
});
