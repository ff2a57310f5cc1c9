import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { withLinkMass, withPair } from '../../src/arm/changeArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import type { JobPool } from '../../src/mechanics/job.ts';
import type { CheckRow } from '../../src/studies/results.ts';
import type { WorstResult } from '../../src/studies/worstArm.ts';
import { armChecks, runWorst, type WorstInput } from '../../src/studies/worstRun.ts';
import { inlinePool } from '../../src/worker/inlinePool.ts';
import { contradictions } from '../worst/adversary.ts';
import { severalCases, withCases } from '../worst/armKinds.ts';

const GAP = 5e-2;

/** A run in line, with what was handed to the worker. */
async function run(arm: Arm, earlier: { arm: Arm; worst: WorstResult } | null = null) {
  const inputs: WorstInput[] = [];
  const inner = inlinePool();
  const pool: JobPool = {
    ...inner,
    run: (request) =>
      inner.run({
        ...request,
        input: (chunk) => {
          const input = request.input(chunk);
          inputs.push(input as WorstInput);
          return input;
        },
      }),
  };
  const worst = await runWorst(arm, { pool, gap: GAP, seconds: 60, earlier });
  return { worst, joints: [...new Set(inputs.flatMap((input) => input.joints))].sort((a, b) => a - b) };
}

const place = (row: CheckRow) => `${row.case} ${row.jointIndex} ${row.bearing} ${row.check}`;

/** Everything the adversary says against the rows of every case. */
function said(arm: Arm, worst: WorstResult, seed: number): string[] {
  const checks = armChecks(arm, flattenArm(arm));
  return arm.cases.flatMap((_, k) =>
    contradictions(
      arm,
      k,
      checks.map((check, c) => {
        const row = worst.eachCase[k * checks.length + c]!;
        return { check, found: row.value, pose: Float64Array.from(row.pose), free: row.free, bound: row.bound! };
      }),
      { seed, poses: 2000, climbs: 1 },
    ),
  );
}

describe('a run after a change of layout', () => {
  it('searches again the joint whose span changed, and no other, in all of three cases (seeds 701, 703, 705)', async () => {
    for (const seed of [701, 703, 705]) {
      const arm = severalCases(seed, 3);
      const first = await run(arm);
      expect(first.joints).toEqual([0, 1, 2]);
      expect(first.worst.certified).toBe(true);
      const joint = seed % 3;
      const { span } = arm.joints[joint]!.support as { span: number };
      const wider = withPair(arm, joint, { span: 1.2 * span });
      const second = await run(wider, { arm, worst: first.worst });
      expect(second.joints).toEqual([joint]);
      expect(second.worst.certified).toBe(true);
      const before = new Map(first.worst.eachCase.map((row) => [place(row), row]));
      expect(second.worst.eachCase.map(place)).toEqual([...before.keys()]);
      for (const row of second.worst.eachCase) {
        if (row.jointIndex === joint) continue;
        expect(row).toEqual(before.get(place(row)));
      }
      const radial = (worst: WorstResult) =>
        worst.rows.find((row) => row.jointIndex === joint && row.check === 'radial')!.value;
      expect(radial(second.worst)).not.toBe(radial(first.worst));
      expect(said(wider, second.worst, seed)).toEqual([]);
    }
  });

  it('keeps joints outboard of a link whose mass changed (seed 711)', async () => {
    const arm = severalCases(711, 3);
    const first = await run(arm);
    const heavier = withLinkMass(arm, 0, arm.joints[0]!.link.mass + 1);
    const second = await run(heavier, { arm, worst: first.worst });
    expect(second.joints).toEqual([0]);
    expect(said(heavier, second.worst, 711)).toEqual([]);
  });

  it('searches nothing where nothing changed, and gives the same rows', async () => {
    const arm = severalCases(721, 2);
    const first = await run(arm);
    const second = await run(structuredClone(arm), { arm, worst: first.worst });
    expect(second.joints).toEqual([]);
    expect(second.worst.rows).toEqual(first.worst.rows);
  });

  it('keeps nothing of another arm, another gravity, another factor or a case of another name', async () => {
    const arm = severalCases(731, 2);
    const first = await run(arm);
    const others: readonly Arm[] = [
      severalCases(732, 2),
      severalCases(731, 3),
      { ...arm, gravity: [0, 0, -1.62] },
      withCases(arm, (load) => ({ ...load, factor: 1.5 * load.factor })),
      withCases(arm, (load) => ({ ...load, name: `${load.name} again` })),
    ];
    for (const other of others) {
      const all = flattenArm(other).names.map((_, joint) => joint);
      expect((await run(other, { arm, worst: first.worst })).joints).toEqual(all);
    }
  });

  it('takes nothing from a worst that never came to rows', async () => {
    const arm = severalCases(741, 1);
    const none: WorstResult = { rows: [], eachCase: [], seconds: 0, certified: false, partial: true };
    expect((await run(arm, { arm, worst: none })).joints).toEqual([0]);
  });
});
