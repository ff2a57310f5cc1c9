/**
 * The sweep pose by pose: the reference that the nested sweep is tested against, and the way of any case whose numbers are not all
 * finite, so that every failed value is counted.
 */
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm } from './form.ts';
import type { Grid } from './gridSweepGrid.ts';
import { beaten, type Leaders, offer } from './gridSweepLeaders.ts';
import { PoseValue } from './gridSweepPose.ts';

export class PlainSweep {
  private readonly checks: readonly CheckForm[];
  private readonly grid: Grid;
  private readonly at: PoseValue;
  private readonly sample: Float64Array;

  constructor(chain: Chain, load: ChainCase, checks: readonly CheckForm[], grid: Grid) {
    this.checks = checks;
    this.grid = grid;
    this.at = new PoseValue(chain, load, checks, grid);
    this.sample = new Float64Array(chain.n);
  }

  /** Takes the poses of a box (first and last sample of each joint) into account, in the order of their indices. */
  run(low: ArrayLike<number>, high: ArrayLike<number>, leaders: Leaders): void {
    const { grid, sample, at, checks } = this;
    let index = 0;
    for (let j = 0; j < grid.n; j++) {
      sample[j] = low[j]!;
      index += low[j]! * grid.stride[j]!;
    }
    for (;;) {
      at.set(index);
      for (let c = 0; c < checks.length; c++) {
        const floor = leaders.best[c]! - leaders.tie[c]!;
        if (beaten(leaders, c, at.bound(c, floor), index)) continue;
        offer(leaders, c, at.value(c, floor), index);
      }
      let j = grid.n - 1;
      while (j >= 0 && sample[j] === high[j]) {
        index -= (high[j]! - low[j]!) * grid.stride[j]!;
        sample[j] = low[j]!;
        j--;
      }
      if (j < 0) return;
      sample[j]!++;
      index += grid.stride[j]!;
    }
  }
}
