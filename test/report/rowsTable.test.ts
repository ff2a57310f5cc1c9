import { describe, expect, it } from 'vitest';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { gridOf } from '../../src/mechanics/gridSweepGrid.ts';
import { gridChoiceText, gridRefusalText } from '../../src/report/gridText.ts';
import { bearingLoadTable, jointLoadTable } from '../../src/report/poseTable.ts';
import { rowsTable } from '../../src/report/rowsTable.ts';
import { cellText, type Table } from '../../src/report/table.ts';
import { poseArm } from '../../src/studies/poseArm.ts';
import type { CheckRow } from '../../src/studies/results.ts';
import { toSI } from '../../src/units/unit.ts';
import { randomArm } from '../randomArm.ts';

const ROW: CheckRow = {
  joint: 'slew',
  jointIndex: 0,
  bearing: 'A',
  check: 'radial',
  unit: 'N',
  value: 812.44,
  case: 'carry',
  pose: [toSI(-170, '°'), toSI(45.5, '°')],
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

function texts(table: Table): string[][] {
  return table.rows.map((row, r) => row.map((cell, k) => cellText(table.columns[k]!, cell, r)));
}
const titles = (table: Table) => table.columns.map((column) => column.title);

describe('rowsTable', () => {
  it('shows only the columns that the rows fill', () => {
    const plain = rowsTable([ROW, { ...ROW, bearing: null, check: 'moment', unit: 'N·m', value: 12.345 }]);
    expect(titles(plain)).toEqual(['joint', 'bearing', 'check', 'worst', 'unit', 'case', 'pose']);
    expect(texts(plain)).toEqual([
      ['slew', 'A', 'radial', '812.4', 'N', 'carry', '-170,45.5'],
      ['', '–', 'moment', '12.35', 'N·m', 'carry', '-170,45.5'],
    ]);
  });

  it('writes the joint on every row where asked, and after another joint', () => {
    const rows = [ROW, ROW, { ...ROW, joint: 'elbow', jointIndex: 1 }, ROW];
    expect(texts(rowsTable(rows)).map((row) => row[0])).toEqual(['slew', '', 'elbow', 'slew']);
    expect(texts(rowsTable(rows, { group: false })).map((row) => row[0])).toEqual(['slew', 'slew', 'elbow', 'slew']);
  });

  it('keeps found and bound apart and says what is not certified', () => {
    const table = rowsTable([
      { ...ROW, bound: 813, gap: 0.000689, certified: true },
      { ...ROW, bound: 900, gap: 0.0973, certified: false },
    ]);
    expect(titles(table).slice(3, 8)).toEqual(['found', 'bound', 'unit', 'gap', 'certified']);
    expect(texts(table).map((row) => row.slice(3, 8))).toEqual([
      ['812.4', '813.0', 'N', '0.069', 'yes'],
      ['812.4', '900.0', 'N', '9.730', 'no'],
    ]);
  });

  it('shows verdicts with their reasons, and what failed as failed', () => {
    const table = rowsTable([
      { ...ROW, allowable: 1000, utilisation: 0.81244, verdict: 'pass' },
      { ...ROW, verdict: 'unassessed', reason: 'give C0_N' },
      { ...ROW, value: Number.NaN, allowable: 1000, utilisation: Number.NaN, verdict: 'pass' },
    ]);
    const verdict = titles(table).indexOf('verdict');
    expect(texts(table).map((row) => row[verdict])).toEqual(['pass', 'unassessed', 'failed']);
    expect(texts(table).map((row) => row.at(-1))).toEqual(['', 'give C0_N', '']);
    expect(texts(table)[2]![3]).toBe('failed');
    expect(texts(table)[1]![verdict - 1]).toBe('–');
  });

  it('turns values into shown units, metric and inch', () => {
    const rows = [{ ...ROW, unit: 'Pa', value: 2.5e6 }];
    expect(texts(rowsTable(rows))[0]!.slice(3, 5)).toEqual(['2.500', 'MPa']);
    expect(texts(rowsTable([ROW], { system: 'inch' }))[0]!.slice(3, 5)).toEqual(['182.6', 'lbf']);
  });
});

describe('pose tables', () => {
  it('hold the numbers of the result', () => {
    const arm = randomArm(2, { joints: 2 });
    const ring = { arrangement: 'ring', hub: 0, station: 0, bearing: null, shaft: null } as const;
    const mixed = { ...arm, joints: [arm.joints[0]!, { ...arm.joints[1]!, support: ring }] };
    const [result] = poseArm(mixed, flattenArm(mixed), [0.2, 0.3]);
    const joints = jointLoadTable(result!);
    expect(joints.rows[0]).toEqual([
      'joint 1',
      ...result!.joints[0]!.force,
      ...result!.joints[0]!.moment,
      result!.joints[0]!.torque,
    ]);
    const bearings = bearingLoadTable(result!);
    expect(bearings.rows.map((row) => row.slice(0, 2))).toEqual([
      ['joint 1', 'A'],
      ['', 'B'],
      ['joint 2', 'ring'],
    ]);
    const load = result!.joints[0]!.bearings.B!;
    expect(bearings.rows[1]!.slice(2)).toEqual([load.radial, ...load.radialVector, load.axial, null]);
    expect(bearings.rows[2]!.at(-1)).toBe(result!.joints[1]!.bearings.ring!.moment);
  });
});

describe('grids in words', () => {
  const chain = flattenArm(randomArm(1, { joints: 9, full: 1 }));
  const refusal = (choice: Parameters<typeof gridOf>[1]) => {
    const outcome = gridOf(chain, choice);
    if (outcome.ok) throw new Error('not refused');
    return gridRefusalText(outcome.refusal);
  };

  it('proposes a step that is taken and a number of samples that is taken', () => {
    const step = /take a step of ([\d.]+)° or more$/.exec(refusal({ step: toSI(5, '°') }));
    expect(gridOf(chain, { step: toSI(Number(step![1]), '°') }).ok).toBe(true);
    expect(Number(step![1])).toBeGreaterThan(15);
    const samples = /take at most (\d+) samples$/.exec(refusal({ samples: 1000 }));
    expect(gridOf(chain, { samples: Number(samples![1]) }).ok).toBe(true);
    expect(gridOf(chain, { samples: Number(samples![1]) + 1 }).ok).toBe(false);
  });

  it('names what was asked, and what is no grid', () => {
    expect(refusal({ step: toSI(5, '°') })).toMatch(
      /^a step of at most 5° makes 5\.2e\+16 poses, more than the 1\.0e\+12/,
    );
    expect(refusal({ samples: 1 })).toContain('at least 2');
    expect(refusal({ step: 0 })).toContain('above 0°');
    expect(gridChoiceText({ samples: 9 })).toBe('9 samples a joint');
  });
});
