import { afterAll, describe, expect, it } from 'vitest';
import { armload, model, modelFile, scratchFolder } from './armload.ts';

const scratch = scratchFolder();
afterAll(() => scratch.remove());

interface Row {
  bearing: string | null;
  check: string;
  value: number;
  pose_deg: number[];
  case: string;
}

const GRID = ['--samples', '9'];

async function compare(file: string, joint: string, ...args: string[]) {
  const ran = await armload(['compare', file, '--joint', joint, ...GRID, '--json', ...args]);
  expect(ran.code).toBe(0);
  return JSON.parse(ran.stdout);
}

async function swept(file: string, joint: string): Promise<Row[]> {
  const ran = await armload(['sweep', file, ...GRID, '--json']);
  return JSON.parse(ran.stdout).joints.find((entry: { joint: string }) => entry.joint === joint).checks;
}

function same(mine: Row[], direct: Row[]): void {
  for (const row of mine) {
    const other = direct.find((r) => r.check === row.check && r.bearing === row.bearing)!;
    expect(row.value).toBeCloseTo(other.value, 8);
    expect(row.pose_deg).toEqual(other.pose_deg);
    expect(row.case).toBe(other.case);
  }
}

describe('armload compare', () => {
  it('equals a sweep of the file, and a sweep of the file rewritten to the other layout', async () => {
    const document = await compare(model('two-link'), 'elbow');
    expect(document).toMatchObject({ armload: 1, joint: 'elbow', partial: false });
    expect(document.cantilever).toMatchObject({ as_in_file: true, span_mm: 45, overhang_mm: 28, side: '+' });
    expect(document.clevis).toMatchObject({ as_in_file: false, span_mm: 45, offset_mm: 0 });
    same(document.cantilever.checks, await swept(model('two-link'), 'elbow'));
    const file = modelFile('two-link');
    const support = file.joints[1].support;
    delete support.overhang_mm;
    delete support.side;
    Object.assign(support, { arrangement: 'clevis', span_mm: 45 });
    same(document.clevis.checks, await swept(scratch.write('clevis.arm.json', file), 'elbow'));
    for (const { check, bearing, ratio } of document.ratios) {
      const value = (rows: Row[]) => rows.find((r) => r.check === check && r.bearing === bearing)?.value;
      const over =
        bearing === null && check === 'radial'
          ? document.cantilever.worst_radial.value
          : value(document.cantilever.checks);
      const under =
        bearing === null && check === 'radial' ? document.clevis.worst_radial.value : value(document.clevis.checks);
      expect(ratio === null ? under : ratio).toBe(ratio === null ? 0 : over / under);
    }
    expect(document.ratios.at(-1).ratio).toBeGreaterThan(1);
  });

  it('makes a cantilever of a clevis by the stated default, or as told', async () => {
    const document = await compare(model('two-link'), 'shoulder');
    expect(document.clevis).toMatchObject({ as_in_file: true, span_mm: 62 });
    expect(document.cantilever).toMatchObject({ span_mm: 62, overhang_mm: 31, side: '-' });
    expect(document.cantilever.A_mm).toBe(document.clevis.A_mm);
    expect(document.taken.join('; ')).toContain(
      'overhang 31 mm: the near bearing stays where the clevis has its bearing',
    );
    const args = ['--clevis-span', '80', '--cantilever-span', '90', '--overhang', '20', '--side', '+'];
    const told = await compare(model('two-link'), 'shoulder', ...args);
    expect(told.clevis.span_mm).toBe(80);
    expect(told.cantilever).toMatchObject({ span_mm: 90, overhang_mm: 20, side: '+', A_mm: 20, B_mm: 110 });
    const file = modelFile('two-link');
    const { bearings, shaft, thrust, hub_mm } = file.joints[0].support;
    file.joints[0].support = {
      arrangement: 'cantilever',
      hub_mm,
      span_mm: 90,
      overhang_mm: 20,
      side: '+',
      thrust,
      bearings,
      shaft,
    };
    same(told.cantilever.checks, await swept(scratch.write('cantilever.arm.json', file), 'shoulder'));
  });

  it('lists worst loads against span, the own spans among them with the same values', async () => {
    const { spans, clevis, cantilever } = await compare(model('two-link'), 'elbow', '--cantilever-span', '60');
    const at = spans.map((row: { span_mm: number }) => row.span_mm);
    expect(at).toEqual([...at].sort((a: number, b: number) => a - b));
    expect(at).toEqual(expect.arrayContaining([18, 22.5, 36, 45, 60, 112]));
    const own = spans.find((row: { span_mm: number }) => row.span_mm === 45);
    expect(own.clevis.A.value).toBe(clevis.checks[0].value);
    const wide = spans.find((row: { span_mm: number }) => row.span_mm === 60);
    expect(wide.cantilever.B.value).toBe(cantilever.checks[1].value);
    const worst = spans.map((row: { cantilever: { A: Row } }) => row.cantilever.A.value);
    expect(worst).toEqual([...worst].sort((a: number, b: number) => b - a));
  });

  it('goes over the whole travel by proof where no grid is asked for: within the gap of `worst`, never below the grid', async () => {
    const args = ['--case', 'hold the grinder', '--json'];
    const proved = JSON.parse((await armload(['compare', model('two-link'), '--joint', 'elbow', ...args])).stdout);
    expect(proved).toMatchObject({ certified: true, gap_asked: 0.001, partial: false });
    const worst = JSON.parse((await armload(['worst', model('two-link'), ...args])).stdout);
    const rows: Row[] = worst.joints.find((entry: { joint: string }) => entry.joint === 'elbow').checks;
    const grid = await compare(model('two-link'), 'elbow', '--case', 'hold the grinder');
    proved.cantilever.checks.forEach((row: Row & { bound: number }, k: number) => {
      const direct = rows.find((r) => r.check === row.check && r.bearing === row.bearing)!;
      expect(Math.abs(row.value - direct.value)).toBeLessThanOrEqual(0.001 * direct.value + 1e-9);
      expect(row.bound).toBeGreaterThanOrEqual(grid.cantilever.checks[k].value - 1e-9);
      expect(row.value).toBeGreaterThanOrEqual(grid.cantilever.checks[k].value * (1 - 1e-9) - 1e-9);
    });
    proved.spans.forEach((row: { clevis: { A: Row & { bound: number } } }, k: number) => {
      expect(row.clevis.A.bound).toBeGreaterThanOrEqual(grid.spans[k].clevis.A.value - 1e-9);
    });
    const text = await armload(['compare', model('two-link'), '--joint', 'elbow', '--case', 'hold the grinder']);
    expect(text.stdout).toContain('over the whole travel, 1 case');
    expect(text.stdout).toContain('nothing within travel exceeds them by more than 0.1 %');
  });

  it('says of which values it is not proved', async () => {
    const ran = await armload(['compare', model('two-link'), '--joint', 'elbow', '--gap', '1e-9', '--seconds', '1']);
    expect(ran.code).toBe(0);
    expect(ran.stdout).toMatch(/for \d+ of \d+ it is not proved that nothing within travel exceeds them/);
  });

  it('prints tables that say what was taken and how', async () => {
    const ran = await armload(['compare', model('two-link'), '--joint', 'elbow', ...GRID]);
    expect(ran.code).toBe(0);
    expect(ran.stdout).toMatch(
      /Taken: clevis span 45 mm, as the cantilever in the file; clevis with its middle on the hub plane/,
    );
    expect(ran.stdout).toContain('one pass over the poses, every layout and span held against every joint load of it');
    expect(ran.stdout).toMatch(/check +bearing +clevis +cantilever +unit +ratio/);
    expect(ran.stdout).toMatch(/span mm +clevis A N +clevis B N +cantilever A N +cantilever B N/);
    expect(ran.stderr).toContain('competent engineer');
  });

  it('refuses what it cannot compare', async () => {
    const file = modelFile('two-link');
    delete file.joints[0].support;
    delete file.joints[0].drive;
    const bare = scratch.write('bare.arm.json', file);
    for (const [args, message] of [
      [[model('two-link')], /required option '--joint <name>' not specified/],
      [[model('two-link'), '--joint', 'wrist'], /there is no joint "wrist"; the joints are "shoulder", "elbow"/],
      [[bare, '--joint', 'shoulder'], /joint "shoulder" has no support/],
      [[model('two-link'), '--joint', 'elbow', '--side', 'left'], /Allowed choices are \+, -/],
      [[model('two-link'), '--joint', 'elbow', '--overhang', '-3'], /It takes a number of 0 or more/],
    ] as const) {
      const ran = await armload(['compare', ...args]);
      expect([args, ran.code, ran.stdout]).toEqual([args, 3, '']);
      expect(ran.stderr).toMatch(message);
      expect(ran.stderr.trimEnd().split('\n')).toHaveLength(1);
    }
  });
});
