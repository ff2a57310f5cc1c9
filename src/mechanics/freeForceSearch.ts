/**
 * Bounds for a case at rest whose tip force may point anywhere: weights and force, each at its own pose outboard of the joint.
 *
 * A check is the most over e of what the weights and what the force do along e. Along a given e, and under a given direction of gravity, each is
 * bounded by its own outward set; a force free to point anywhere is a weight at the tip under free gravity. The sum, a function of gravity's
 * direction like that of weights alone, is carried back to the base by `GravityCheck`. It is tight where weights and force want
 * the same pose outboard. What gap is left where they do not, branch and bound closes.
 *
 * Where a form cannot tell the joint's housing from its link, all is seen from the link: then both have the joint itself at the same angle. Where
 * it can, but is bounded by forms that cannot (`roundForms`), those stand for it if the joint turns far enough for them to be near.
 */
import type { Chain, ChainCase } from './chain.ts';
import { FanCheck, type SphereCheck } from './fanCheck.ts';
import { GravityCheck } from './gravityCheck.ts';
import { type CheckState, gapOf, overshoot, ROUNDING } from './gravitySearch.ts';
import type { GravityMass, OutwardSets } from './outwardSets.ts';
import { PoseSplit } from './poseSplit.ts';
import { FAR, leaned, type RoundForm, roundForms, sameAllRound, upright } from './roundForms.ts';
import { TipPush } from './tipPush.ts';

/** Finer tables than this no longer pay: branch and bound takes over. */
const LAST_LEVEL = 4;
/** The same for forms of three rows, whose tables cost far more. */
const LAST_LEVEL_OF_THREE = 3;
/** Share by which a finer level must better a bound to be followed by a still finer one. */
const WORTH = 2e-4;

export class FreeForceSearch {
  private readonly parts: readonly { readonly search: SphereCheck; bound: number }[];
  private readonly last: number;
  /** What the forms were raised by, so that none of their constants is negative along any e. */
  private readonly raised: number;
  private readonly state: CheckState;
  private level = -1;
  private stalled = false;
  private tree: PoseSplit | null = null;
  private readonly startSplitting: () => PoseSplit;

  /** `state` of a check: its bound is lowered here. Torque ranges of its forms are left out. `weights`, `tip`: outward sets of the links and of the tip alone. */
  constructor(chain: Chain, load: ChainCase, state: CheckState, weights: OutwardSets, tip: OutwardSets) {
    const { forms, joint } = state.check;
    const g = Math.hypot(...chain.gravity);
    const down = g > 0 ? chain.gravity.map((v) => v / g) : [0, 0, -1];
    this.state = state;
    const far = chain.to[joint]! - chain.from[joint]! >= FAR;
    const round = far || forms.every(sameAllRound) ? roundForms(forms) : null;
    const inLink = round !== null;
    const used = round ?? forms.map(upright);
    this.raised = Math.max(0, ...used.map(({ form: f, leanO }) => Math.hypot(...f.c) + Math.abs(leanO) - f.o));
    const make = ({ form: f, lean, leanO }: RoundForm, heavy: OutwardSets, pushed: OutwardSets): SphereCheck => {
      if (f.rows === 3) return new FanCheck(heavy, joint, f, g, down, inLink, pushed, { lean, leanO });
      const plain = leaned({ form: f, lean, leanO });
      return new GravityCheck(heavy, joint, plain, g, down, inLink, new TipPush(pushed, joint, plain, inLink));
    };
    const raised = used.map((one) => ({ ...one, form: { ...one.form, o: one.form.o + this.raised } }));
    this.parts = raised.map((one) => ({ search: make(one, weights, tip), bound: Number.POSITIVE_INFINITY }));
    this.startSplitting = () =>
      new PoseSplit(
        { chain, weights, tip, masses: load, tipMass: tipMass(chain, load), first: inLink ? joint + 1 : joint },
        this.parts.map(({ bound }, k) => ({ bound, make: (h, p) => make(raised[k]!, h, p) })),
      );
    this.last = forms.some((f) => f.rows === 3) ? LAST_LEVEL_OF_THREE : LAST_LEVEL;
    state.ceiling = Math.max(0, ...this.parts.map(({ search }) => search.ceiling));
    this.stalled = !Number.isFinite(state.ceiling);
  }

  /** Whether finer tables can help. */
  open(gap: number): boolean {
    return !this.stalled && this.level < this.last && gapOf(this.state) > gap;
  }

  /** Whether splitting can help. */
  canSplit(gap: number): boolean {
    return Number.isFinite(this.state.ceiling) && gapOf(this.state) > gap && !this.tree?.spent;
  }

  /** A slice of splitting, for a gap of `gap`. */
  split(gap: number): void {
    const wanted = this.wanted(gap);
    this.tree ??= this.startSplitting();
    this.lower(this.tree.slice(wanted));
  }

  private wanted(gap: number): number {
    const { found } = this.state;
    return this.raised + (found > 0 ? found / (1 - 0.95 * gap) : 0);
  }

  private lower(most: number): void {
    const { state } = this;
    state.bound = Math.min(state.bound, most - this.raised + ROUNDING * state.ceiling);
  }

  /** One level finer, for a gap of `gap`. */
  round(gap: number): void {
    this.level++;
    const { state, level } = this;
    const wanted = this.wanted(gap);
    let most = Number.NEGATIVE_INFINITY;
    for (const part of this.parts) {
      // A form that stays below what is attained, or allowed by the gap, needs no finer look.
      if (part.bound > wanted) {
        const { search } = part;
        const enough = Math.max(this.raised + state.found, wanted * (1 - overshoot(level, search.stepCount)));
        const bound = search.best(level, wanted, enough);
        if (!(bound >= part.bound)) part.bound = bound;
      }
      if (!(part.bound <= most)) most = part.bound;
    }
    // Level 1 is where the tables begin to speak; a bound that stands still from there on is the pose's fault.
    this.stalled = level > 1 && !(most - this.raised < state.bound * (1 - WORTH));
    this.lower(most);
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
