/** Joint loads of an arm by the kernel, as plain vectors in the file's housing frames, and how far two sets lie apart. */
import { expect } from 'vitest';
import type { Arm, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { assertChain, flattenArm, wrenchToFile } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch, type Rates, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { size } from '../worldArm.ts';

/** Per revolute joint, ON the joint, N and N·m about the joint origin. */
export type Loads = readonly { readonly force: Vec3; readonly moment: Vec3 }[];

export function poseIn(arm: Arm, seed: number): number[] {
  const random = seededRandom(seed + 4321);
  return arm.joints.flatMap((joint) =>
    joint.kind === 'revolute' ? [random.between(joint.travel.from, joint.travel.to)] : [],
  );
}

/** Of case `of` (default the first); in motion where `rates` are given. `any`: direction of a free tip force, base frame. */
export function jointLoads(
  arm: Arm,
  pose: readonly number[],
  { any = null, rates = null, of = 0 }: { any?: Vec3 | null; rates?: Rates | null; of?: number } = {},
): Loads {
  const chain = flattenArm(arm);
  assertChain(chain);
  const out = new Float64Array(6 * chain.n);
  const scratch = poseScratch(chain.n);
  if (rates) dynamicLoads(chain, chain.cases[of]!, pose, rates, out, scratch, any);
  else staticLoads(chain, chain.cases[of]!, pose, out, scratch, any);
  const turned = new Float64Array(6);
  return Array.from({ length: chain.n }, (_, i) => {
    wrenchToFile(chain, i, out, 6 * i, turned);
    const [fx, fy, fz, mx, my, mz] = turned as unknown as [number, number, number, number, number, number];
    return { force: [fx, fy, fz], moment: [mx, my, mz] };
  });
}

/** Largest difference of two sets over the largest force (moment) in the second; NaN where anything is. */
export function loadsApart(a: Loads, b: Loads): number {
  expect(a.length).toBe(b.length);
  let worst = 0;
  for (const part of ['force', 'moment'] as const) {
    const scale = Math.max(...b.map((load) => size(load[part])));
    a.forEach((load, i) => {
      const other = b[i]![part];
      const gap = size([load[part][0] - other[0], load[part][1] - other[1], load[part][2] - other[2]]);
      const ratio = gap === 0 ? 0 : gap / scale;
      worst = Math.max(worst, ratio);
    });
  }
  return worst;
}

export function expectSameLoads(a: Loads, b: Loads, within: number): void {
  expect(loadsApart(a, b)).toBeLessThan(within);
}
