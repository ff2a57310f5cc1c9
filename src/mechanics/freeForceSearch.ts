/**
 * Bounds for a case at rest whose tip force may point anywhere: weights and force each from their own sphere problem.
 *
 * For a fixed pose a check is at most its worst over gravity plus its worst over the force, and a force free to point anywhere is a weight at
 * the tip under free gravity. The sum of the two bounds is a bound, and tight where both want the same pose: for every torque, and
 * for joints near the tip. What gap is left where they want different poses, branch and bound closes.
 */
import type { Chain, ChainCase } from './chain.ts';
import { GravityCheck } from './gravityCheck.ts';
import { type CheckState, gapOf, ROUNDING } from './gravitySearch.ts';
import type { GravityMass, OutwardSets } from './outwardSets.ts';

/** Finer tables than this no longer pay: branch and bound takes over. */
const LAST_LEVEL = 4;
/** The same for forms of three rows, whose tables cost far more. */
const LAST_LEVEL_OF_THREE = 1;
/** Share by which a finer level must better a bound to be followed by a still finer one. */
const WORTH = 2e-4;

export class FreeForceSearch {
  private readonly pairs: readonly { readonly gravity: GravityCheck; readonly force: GravityCheck; bound: number }[];
  private readonly last: number;
  private readonly state: CheckState;
  private level = -1;
  private stalled = false;

  /** `state` of a homogeneous check: its bound is lowered here. `weights`, `tip`: outward sets of the links and of the tip alone. */
  constructor(chain: Chain, state: CheckState, weights: OutwardSets, tip: OutwardSets) {
    const { check } = state;
    const g = Math.hypot(...chain.gravity);
    const down = g > 0 ? chain.gravity.map((v) => v / g) : [0, 0, -1];
    this.state = state;
    this.pairs = check.forms.map((f) => ({
      gravity: new GravityCheck(weights, check.joint, f, g, down),
      force: new GravityCheck(tip, check.joint, f, 1, down),
      bound: Number.POSITIVE_INFINITY,
    }));
    this.last = check.forms.some((f) => f.rows === 3) ? LAST_LEVEL_OF_THREE : LAST_LEVEL;
    state.ceiling = Math.max(0, ...this.pairs.map(({ gravity, force }) => gravity.ceiling + force.ceiling));
    this.stalled = !Number.isFinite(state.ceiling);
  }

  open(gap: number): boolean {
    return !this.stalled && this.level < this.last && gapOf(this.state) > gap;
  }

  /** One level finer. */
  round(): void {
    this.level++;
    let most = Number.NEGATIVE_INFINITY;
    for (const pair of this.pairs) {
      // A form that stays below what is attained needs no finer look.
      if (pair.bound > this.state.found) {
        const push = pair.force.cap(this.level, Number.NEGATIVE_INFINITY);
        const enough = this.state.found - push;
        const sum = pair.gravity.best(this.level, enough, enough) + push;
        if (!(sum >= pair.bound)) pair.bound = sum;
      }
      if (!(pair.bound <= most)) most = pair.bound;
    }
    const bound = most + ROUNDING * this.state.ceiling;
    // Level 1 is where the tables begin to speak; a bound that stands still from there on is the pose's fault.
    this.stalled = this.level > 1 && !(bound < this.state.bound * (1 - WORTH));
    this.state.bound = Math.min(this.state.bound, bound);
  }
}

/** The tip alone, as a weight of the force's size under unit gravity. */
export function tipMass(chain: Chain, load: ChainCase): GravityMass {
  const { n } = chain;
  const mass = new Float64Array(n);
  const first = new Float64Array(3 * n);
  mass[n - 1] = load.magnitude;
  for (let k = 0; k < 3; k++) first[3 * (n - 1) + k] = load.magnitude * chain.tipOrigin[k]!;
  return { mass, first };
}
