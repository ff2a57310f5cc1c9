import { describe, expect, it } from 'vitest';
import { armload, model, modelFile } from './armload.ts';

interface Row {
  bearing: string | null;
  check: string;
  value: number | null;
  found?: number;
  bound?: number;
  gap?: number;
  certified?: boolean;
  pose_deg: number[];
  case: string;
  verdict?: string;
  reason?: string;
}

function rowsOf(stdout: string): Row[] {
  return JSON.parse(stdout).joints.flatMap((joint: { checks: Row[] }) => joint.checks);
}

describe('armload worst', () => {
  const FIXED = modelFile('swing-joint').cases[0].name;

  it('gives found, bound, gap and certified in the contract shape, above the grid and attained at its pose', async () => {
    const ran = await armload([
      'worst',
      model('swing-joint'),
      '--case',
      FIXED,
      '--gap',
      '0.001',
      '--seconds',
      '60',
      '--json',
    ]);
    expect([0, 1]).toContain(ran.code);
    const document = JSON.parse(ran.stdout);
    expect(document).toMatchObject({ armload: 1, gap_asked: 0.001, certified: true, partial: false });
    const rows = rowsOf(ran.stdout).filter((row) => row.check === 'radial');
    expect(rows.map((row) => row.bearing)).toEqual(['A', 'B']);
    const grid = rowsOf(
      (await armload(['sweep', model('swing-joint'), '--case', FIXED, '--step', '1', '--json'])).stdout,
    );
    for (const row of rows) {
      expect(row.certified).toBe(true);
      expect(row.found).toBe(row.value);
      expect(row.bound).toBeGreaterThanOrEqual(row.found!);
      expect(row.gap).toBeLessThanOrEqual(0.001);
      const swept = grid.find((r) => r.check === 'radial' && r.bearing === row.bearing)!;
      expect(row.found! * (1 + 1e-9)).toBeGreaterThanOrEqual(swept.value!);
      expect(row.bound).toBeGreaterThanOrEqual(swept.value!);
      const at = await armload([
        'pose',
        model('swing-joint'),
        `--at=${row.pose_deg.join(',')}`,
        '--case',
        row.case,
        '--json',
      ]);
      const loads = JSON.parse(at.stdout).results[0].joints[0].bearings;
      expect(loads[row.bearing!].radial_N / row.found!).toBeCloseTo(1, 9);
    }
  });

  it('prints found and bound side by side and what they mean', async () => {
    const ran = await armload(['worst', model('swing-joint'), '--case', FIXED, '--seconds', '60']);
    expect(ran.stdout).toMatch(/joint +bearing +check +found +bound +unit +gap % +certified/);
    expect(ran.stdout).toContain('bound: nothing within travel exceeds it');
    expect(ran.stderr).toContain('competent engineer');
  });

  it('stops at Ctrl-C with the best so far, marked partial, and 130', async () => {
    const args = ['worst', model('seven-joint'), '--gap', '0.000001', '--seconds', '300', '--workers', '2', '--json'];
    const ran = await armload(args, { interruptAfter: 4000 });
    expect(ran.code).toBe(130);
    expect(JSON.parse(ran.stdout)).toMatchObject({ partial: true, certified: false });
  });

  it('refuses wrong numbers', async () => {
    for (const args of [
      ['--gap', '0'],
      ['--gap', '-1'],
      ['--seconds', 'long'],
      ['--workers', '65'],
    ]) {
      const ran = await armload(['worst', model('swing-joint'), ...args]);
      expect([args, ran.code, ran.stdout]).toEqual([args, 3, '']);
      expect(ran.stderr.trimEnd().split('\n')).toHaveLength(1);
    }
  });
});
