import type { Chain } from '../mechanics/chain.ts';
import { type GridChoice, gridOf } from '../mechanics/gridSweepGrid.ts';
import { gridRefusalText } from '../report/gridText.ts';
import { toSI } from '../units/unit.ts';
import { UsageError } from './exit.ts';

/** Samples of each joint where neither option is given. */
export const DEFAULT_SAMPLES = 9;

export interface GridOptions {
  /** Degrees. */
  readonly step?: number;
  readonly samples?: number;
}

/** The grid asked for, and its poses; refused with what would fit where it has too many. */
export function gridChoice(chain: Chain, options: GridOptions): { choice: GridChoice; poses: number } {
  if (options.step !== undefined && options.samples !== undefined) {
    throw new UsageError('--step and --samples say the same thing twice; give one of them');
  }
  const choice: GridChoice =
    options.step === undefined ? { samples: options.samples ?? DEFAULT_SAMPLES } : { step: toSI(options.step, '°') };
  const outcome = gridOf(chain, choice);
  if (!outcome.ok) throw new UsageError(gridRefusalText(outcome.refusal));
  return { choice, poses: outcome.grid.poses };
}
