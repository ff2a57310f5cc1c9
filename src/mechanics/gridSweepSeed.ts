/** Poses of a grid that load a check hard, found quickly: the start of a sweep, not its answer. */
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm } from './form.ts';
import type { Grid } from './gridSweepGrid.ts';
import { sampleAngle } from './gridSweepGrid.ts';
import { governing, type Leaders, offer } from './gridSweepLeaders.ts';
import { PoseValue } from './gridSweepPose.ts';

/** Every so many-th sample of each joint, about `poses` in all. Indices of its poses are those of the same poses in `grid`. */
export function coarseGrid(grid: Grid, poses: number): Grid {
  const moving = grid.count.reduce((sum, count) => sum + (count > 1 ? 1 : 0), 0);
  const wanted = Math.max(2, Math.floor(poses ** (1 / Math.max(1, moving))));
  const every = grid.count.map((count) => Math.max(1, Math.floor((count - 1) / (wanted - 1))));
  const count = grid.count.map((all, j) => Math.floor((all - 1) / every[j]!) + 1);
  return {
    n: grid.n,
    from: grid.from,
    step: grid.step.map((step, j) => step * every[j]!),
    to: count.map((own, j) => sampleAngle(grid, j, (own - 1) * every[j]!)),
    count,
    stride: grid.stride.map((stride, j) => stride * every[j]!),
    poses: count.reduce((poses, own) => poses * own, 1),
  };
}

/** From the pose that governs each check, goes to better ones joint by joint, by strides that halve; offers what it meets. */
export function climb(chain: Chain, load: ChainCase, checks: readonly CheckForm[], grid: Grid, leaders: Leaders): void {
  const at = new PoseValue(chain, load, checks, grid);
  for (let c = 0; c < checks.length; c++) {
    let index = governing(leaders, c);
    if (index < 0) continue;
    at.set(index);
    let best = at.value(c);
    for (let pass = 0, moved = true; moved && pass < 4; pass++) {
      moved = false;
      for (let j = 0; j < grid.n; j++) {
        const stride = grid.stride[j]!;
        const count = grid.count[j]!;
        for (let hop = 2 ** Math.floor(Math.log2(Math.max(1, count / 4))); hop >= 1; hop /= 2) {
          for (const way of [-hop, hop]) {
            const sample = Math.floor(index / stride) % count;
            if (sample + way < 0 || sample + way >= count) continue;
            at.set(index + way * stride);
            if (at.bound(c, best) <= best) continue;
            const value = at.value(c, best);
            if (!(value > best)) continue;
            best = value;
            index += way * stride;
            moved = true;
          }
        }
      }
    }
    if (Number.isFinite(best)) offer(leaders, c, best, index);
  }
}
