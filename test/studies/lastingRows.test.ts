/** Life, fatigue and play as one piece of work, and what stands for them until they are known. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readArm } from '../../src/arm/readArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { overall } from '../../src/studies/assessGoverning.ts';
import {
  isLasting,
  LASTING_PARTS,
  type LastingPart,
  lastingPart,
  lastingPending,
} from '../../src/studies/lastingRows.ts';
import { runLasting } from '../../src/studies/lastingRun.ts';
import { attainedShare, type CheckRow, isMissing, moreIsBetter } from '../../src/studies/results.ts';
import { inlinePool } from '../../src/worker/inlinePool.ts';

function model(name: string) {
  const reading = readArm(readFileSync(`models/${name}.arm.json`, 'utf8'));
  if (!reading.ok) throw new Error(`${name} is not sound`);
  return { arm: reading.arm, chain: flattenArm(reading.arm) };
}

/** The part that a row speaks of: no part is left without one. */
const keyOf = (row: CheckRow) => `${row.jointIndex} ${row.bearing}`;
const wall = model('wall-arm');
const parts = new Map(LASTING_PARTS.map((part) => [part, lastingPart(wall.arm, wall.chain, part)]));
const all = LASTING_PARTS.flatMap((part) => parts.get(part)!);

describe('lasting rows of the wall arm', () => {
  it('come from a worker as they come in line, part by part', async () => {
    const seen: LastingPart[] = [];
    const onPart = (part: LastingPart) => seen.push(part);
    const { rows, stopped } = await runLasting(wall.arm, { pool: inlinePool(), onPart });
    expect(stopped).toBe(false);
    expect(seen).toEqual(LASTING_PARTS);
    expect(rows).toEqual(all);
  });

  it('say of a run that was stopped that it was, and give no row of what was not reached', async () => {
    const control = new AbortController();
    control.abort();
    const { rows, stopped } = await runLasting(wall.arm, { pool: inlinePool(), signal: control.signal });
    expect({ rows, stopped }).toEqual({ rows: [], stopped: true });
  });

  it('are known by their names, and no load or static check is', () => {
    expect(all.length).toBeGreaterThan(10);
    expect(all.filter((row) => !isLasting(row))).toEqual([]);
    for (const check of ['radial', 'axial', 'static', 'pressure', 'slope', 'stress', 'moment']) {
      expect(isLasting({ check })).toBe(false);
    }
  });

  it('before they are known: a row for every part that is held against a limit, none of which passes', () => {
    for (const part of LASTING_PARTS) {
      const pending = lastingPending(wall.arm, wall.chain, part, 'being worked out');
      expect(pending.every(isMissing)).toBe(true);
      expect(overall(pending)).toBe('unassessed');
      expect(pending.every((row) => row.reason === 'being worked out')).toBe(true);
      const keys = new Set(pending.map(keyOf));
      const held = parts.get(part)!.filter((row) => row.verdict !== null);
      expect(held.length).toBeGreaterThan(0);
      expect(held.filter((row) => !keys.has(keyOf(row)))).toEqual([]);
    }
  });

  it('without a duty: life is unassessed at once, and says what to fill in', () => {
    const arm = { ...wall.arm, duty: null };
    const pending = lastingPending(arm, wall.chain, 'duty', 'being worked out');
    expect(pending).toEqual(lastingPart(arm, wall.chain, 'duty'));
    expect(pending.every((row) => row.reason?.includes('fill in `duty`'))).toBe(true);
  });
});

describe('share of the allowable', () => {
  it('of a life is the life asked for over the life reached; of all else demand over allowable', () => {
    expect(attainedShare({ check: 'life', value: 400, allowable: 100 })).toBe(0.25);
    expect(attainedShare({ check: 'life', value: Number.POSITIVE_INFINITY, allowable: 100 })).toBe(0);
    expect(attainedShare({ check: 'fatigue', value: 400, allowable: 100 })).toBe(4);
    expect(attainedShare({ check: 'static', value: 400, allowable: null })).toBeNull();
    expect(['life', 'system life', 'wear life', 'fatigue'].map((check) => moreIsBetter({ check }))).toEqual([
      true,
      true,
      true,
      false,
    ]);
  });
});
