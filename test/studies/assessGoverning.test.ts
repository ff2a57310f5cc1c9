/** What governs a bearing, and that nothing open hides behind a pass. */
import { describe, expect, it } from 'vitest';
import { governing, overall } from '../../src/studies/assessGoverning.ts';
import type { CheckRow } from '../../src/studies/results.ts';

function row(parts: Partial<CheckRow>): CheckRow {
  return {
    joint: 'hinge',
    jointIndex: 0,
    bearing: 'A',
    check: 'static',
    unit: 'N',
    value: 50,
    case: 'load',
    pose: [0],
    free: null,
    wrench: { force: [0, 0, 0], moment: [0, 0, 0] },
    bound: null,
    gap: null,
    certified: null,
    allowable: 100,
    utilisation: 0.5,
    verdict: 'pass',
    reason: null,
    source: null,
    ...parts,
  };
}

const missing = row({
  check: 'life',
  value: Number.NaN,
  pose: [],
  allowable: null,
  utilisation: null,
  verdict: 'unassessed',
  reason: 'no duty',
});

describe('governing check', () => {
  it('is the highest utilisation of each bearing and shaft, A before the shaft', () => {
    const all = governing([
      row({}),
      row({ check: 'slope', utilisation: 0.7 }),
      row({ bearing: null, check: 'stress', utilisation: 0.2, where: 'hub' }),
      row({ check: 'radial', verdict: null, allowable: null, utilisation: null }),
    ]);
    expect(all.map(({ bearing, row: one, verdict }) => [bearing, one!.check, verdict])).toEqual([
      ['A', 'slope', 'pass'],
      [null, 'stress', 'pass'],
    ]);
    expect(all[0]!.why).toBe('slope is the nearest to its limit of 2 checks');
    expect(all[1]!.why).toBe('stress at hub is the only check with a limit');
  });

  it('takes what is attained before what a loose bound leaves possible', () => {
    const life = row({
      check: 'life',
      unit: 's',
      value: 1000,
      bound: 20,
      allowable: 100,
      utilisation: 5,
      verdict: 'unassessed',
      reason: 'enough by the loads found',
    });
    const [only] = governing([life, row({ value: 94, utilisation: 0.94 })]);
    expect(only).toMatchObject({ row: { check: 'static' }, utilisation: 0.94, verdict: 'unassessed' });
    expect(only!.open).toEqual([{ check: 'life', reason: 'enough by the loads found' }]);
    const [short] = governing([{ ...life, value: 102, bound: 101, utilisation: 0.99, verdict: 'pass' }, row({})]);
    expect(short).toMatchObject({ row: { check: 'life' }, utilisation: 0.99, verdict: 'pass' });
  });

  it('shows what is open, and does not pass with it', () => {
    const [only] = governing([row({}), missing]);
    expect(only).toMatchObject({
      verdict: 'unassessed',
      utilisation: 0.5,
      open: [{ check: 'life', reason: 'no duty' }],
    });
    expect(overall([row({}), missing])).toBe('unassessed');
  });

  it('has no row where nothing could be assessed', () => {
    expect(governing([missing])[0]).toMatchObject({ row: null, utilisation: null, verdict: 'unassessed' });
  });

  it('puts what is over before an open gap with a larger bound', () => {
    const open = row({ check: 'slope', utilisation: 9, verdict: 'unassessed', reason: 'gap' });
    const over = row({ check: 'static', utilisation: 1.2, value: 120, verdict: 'over' });
    expect(governing([open, over])[0]).toMatchObject({ verdict: 'over', utilisation: 1.2, open: [{ check: 'slope' }] });
  });

  it('counts a failed load row as open', () => {
    const failed = row({ check: 'radial', value: Number.NaN, verdict: null, allowable: null, utilisation: null });
    expect(governing([row({}), failed])[0]!.verdict).toBe('unassessed');
    expect(overall([row({}), failed])).toBe('unassessed');
  });

  it('passes as a whole only where everything judged passes, and something was judged', () => {
    const load = row({ check: 'radial', verdict: null, allowable: null, utilisation: null });
    expect(overall([row({}), load])).toBe('pass');
    expect(overall([load])).toBe('unassessed');
    expect(overall([])).toBe('unassessed');
    expect(overall([row({}), missing, row({ verdict: 'over', utilisation: 2 })])).toBe('over');
  });
});
