/** One check over two joint angles, the other joints held where they are on stage; worked out in short slices between frames. */

import { WRENCH } from '../../mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../mechanics/form.ts';
import { freeScratch, hasFree, newFreeWorst, worstOverFree } from '../../mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../../mechanics/freeLoadsPose.ts';
import type { ArmOnSheet } from './documentStore.ts';

export interface MapAsk {
  readonly sheet: ArmOnSheet;
  readonly check: CheckForm;
  readonly caseName: string;
  /** Chain indices of the joints along and up the map. */
  readonly across: number;
  readonly up: number;
  readonly pose: readonly number[];
}

export interface PoseMap {
  readonly columns: number;
  readonly rows: number;
  /** Row by row from the lowest angle of `up`; SI. */
  readonly values: Float64Array;
}

/** Points along each side: fewer where a pose leaves motion free, which takes long to look through. */
const SIDE = { fixed: 61, any: 41, motion: 17 } as const;
const SLICE_MS = 9;

export function sampleOf(from: number, to: number, k: number, count: number): number {
  return from + ((to - from) * k) / (count - 1);
}

/** The map, or null where it was stopped. */
export async function poseMap(ask: MapAsk, stopped: () => boolean): Promise<PoseMap | null> {
  const { sheet, check, across, up } = ask;
  const { chain } = sheet;
  const load = chain.cases.find((each) => each.name === ask.caseName);
  if (!load) return null;
  const side = load.speed ? SIDE.motion : load.force === 'any' ? SIDE.any : SIDE.fixed;
  const values = new Float64Array(side * side);
  const pose = Float64Array.from(ask.pose);
  const at = newPoseLoad(chain.n);
  const scratch = poseLoadScratch(chain.n);
  const found = newFreeWorst(chain.n);
  const freely = freeScratch(chain.n);
  const free = hasFree(load);
  let slice = performance.now();
  for (let k = 0; k < values.length; k++) {
    pose[across] = sampleOf(chain.from[across]!, chain.to[across]!, k % side, side);
    pose[up] = sampleOf(chain.from[up]!, chain.to[up]!, Math.floor(k / side), side);
    poseLoad(chain, load, pose, at, scratch);
    values[k] = free
      ? worstOverFree(check, load, at, found, freely)
      : checkValue(check, at.fixed, WRENCH * check.joint);
    if (performance.now() - slice > SLICE_MS) {
      await new Promise<void>((go) => setTimeout(go, 0));
      if (stopped()) return null;
      slice = performance.now();
    }
  }
  return { columns: side, rows: side, values };
}
