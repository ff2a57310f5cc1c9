/**
 * Leaves out of a box what cannot hold the worst. At a worst pose the value neither rises nor falls along a joint that is off its
 * stops, nor along e, which has no stops. The slope over the box is slope + Σ bend·δ ± rest (`BoxBound`), so
 *
 * - where it has one sign, only the stop that it rises to can hold the worst: the box shrinks to that stop or goes;
 * - else δ_k lies where the slope can vanish, |slope + bend_kk δ_k| ≤ Σ_j≠k |bend_kj| ρ_j + rest, or at a stop.
 */
import type { Flat } from '../math/vector.ts';
import type { BoxBound } from './branchBoundBox.ts';
import type { Chain } from './chain.ts';

/** Shrinks low, high in place. Returns the share of the box that is left by volume, -1 where nothing is. */
export function shrinkBox(box: BoxBound, chain: Chain, low: Flat, high: Flat): number {
  const { n, size, active, activeCount, slope, bend, slopeRest, half, middle } = box;
  let share = 1;
  for (let a = 0; a < activeCount; a++) {
    const k = active[a]!;
    const rho = half[k]!;
    const g = slope[k]!;
    const own = bend[k * size + k]!;
    let rest = slopeRest[k]!;
    for (let b = 0; b < activeCount; b++) {
      const j = active[b]!;
      if (j !== k) rest += Math.abs(bend[k * size + j]!) * half[j]!;
    }
    if (!(rest < Number.POSITIVE_INFINITY)) continue;
    const stops = k < n && chain.full[k] === 0;
    const atLow = stops && low[k] === chain.from[k];
    const atHigh = stops && high[k] === chain.to[k];
    // where the slope can vanish, as steps from the middle
    let from = Number.POSITIVE_INFINITY;
    let to = Number.NEGATIVE_INFINITY;
    if (own !== 0) {
      const p = (-g - rest) / own;
      const q = (-g + rest) / own;
      from = Math.max(-rho, Math.min(p, q));
      to = Math.min(rho, Math.max(p, q));
    } else if (Math.abs(g) <= rest) {
      from = -rho;
      to = rho;
    }
    const inside = from <= to;
    let start = inside ? middle[k]! + from : Number.POSITIVE_INFINITY;
    let end = inside ? middle[k]! + to : Number.NEGATIVE_INFINITY;
    // a stop holds the worst only where the slope can point to it
    if (atLow && g - own * rho - rest <= 0) {
      start = low[k]!;
      if (!inside) end = low[k]!;
    }
    if (atHigh && g + own * rho + rest >= 0) {
      end = high[k]!;
      if (start === Number.POSITIVE_INFINITY) start = high[k]!;
    }
    if (!(start <= end)) return -1;
    const before = high[k]! - low[k]!;
    if (start > low[k]!) low[k] = Math.min(start, high[k]!);
    if (end < high[k]!) high[k] = Math.max(end, low[k]!);
    share *= (high[k]! - low[k]!) / before;
  }
  return share;
}
