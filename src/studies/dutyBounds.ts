/**
 * What nothing within the travel exceeds, for the segments of a duty that may be anywhere in it.
 *
 * Weights (and a tip force along gravity) are bounded by the sphere search (`../mechanics/gravitySearch.ts`). For every other load of the case
 * its most by lengths alone comes on top: with R the way from the joint to the tip, a force F is at most F (‖P_f‖ + R ‖P_m‖) to a form
 * ‖P w + c‖ + l·w, and so are the forces of mass times the largest acceleration that the limits of the motion allow. That is a bound,
 * and a wide one: `TravelBounds` lets a caller give the certified worst of the same forms instead.
 */
import { type Chain, type ChainCase, INERTIA, WRENCH } from '../mechanics/chain.ts';
import type { CheckForm, Form } from '../mechanics/form.ts';
import { GravityClimb } from '../mechanics/gravityClimb.ts';
import { gravityLoad } from '../mechanics/gravityLoad.ts';
import { GravitySearch } from '../mechanics/gravitySearch.ts';

/** Bounds of forms in one case over the travel, in the order given. Never below what occurs; NaN or Infinity where not known. */
export type TravelBounds = (chain: Chain, load: ChainCase, checks: readonly CheckForm[]) => readonly number[];

const GAP = 0.01;
const ROUNDS = 4;
/** What the sums here may lose to rounding, relative. */
const OUTWARD = 1 + 1e-12;

/** Bounds by the sphere search, and by lengths for what is no weight. */
export const lengthBounds: TravelBounds = (chain, load, checks) => {
  const whole = gravityLoad(chain, load);
  const still: ChainCase = { ...load, force: 'none', magnitude: 0, speed: null, accel: null };
  const weights = whole ?? gravityLoad(chain, still)!;
  const bare = checks.map((check): CheckForm => ({ ...check, forms: check.forms.map(homogeneous) }));
  const search = new GravitySearch(
    chain,
    whole ? load : still,
    weights,
    bare,
    new GravityClimb(chain, whole ? load : still),
  );
  for (let round = 0; round < ROUNDS && search.open(GAP); round++) search.round(GAP);
  return checks.map((check, k) => {
    const extra = whole ? 0 : Math.max(...check.forms.map((f) => mostOf(chain, load, check.joint, f)));
    const constant = Math.max(...check.forms.map((f) => Math.hypot(...f.c) + f.o));
    const bound = search.entries[k]!.bound + extra + Math.max(0, constant);
    return bound > 0 ? bound * OUTWARD : bound;
  });
};

function homogeneous(f: Form): Form {
  return { ...f, c: new Float64Array(f.rows), o: 0 };
}

/** Most that tip force and motion add to a form, by lengths. */
function mostOf(chain: Chain, load: ChainCase, joint: number, f: Form): number {
  const force = normOf(f, 0);
  const moment = normOf(f, 3);
  let sum = 0;
  if (load.force !== 'none') sum += load.magnitude * (force + moment * reach(chain, joint, chain.n));
  if (load.speed && load.accel) {
    const most = inertiaMost(chain, load, load.speed, load.accel, joint);
    sum += force * most.force + moment * most.moment;
  }
  return sum;
}

/** Largest of ‖P x‖ + |l·x| over unit vectors x of the force (0) or moment (3) part. */
function normOf(f: Form, at: 0 | 3): number {
  const gram = (r: number, s: number) => {
    let sum = 0;
    for (let c = 0; c < 3; c++) sum += f.P[WRENCH * r + at + c]! * f.P[WRENCH * s + at + c]!;
    return sum;
  };
  let square = 0;
  if (f.rows === 2) {
    const [a, b, c] = [gram(0, 0), gram(1, 1), gram(0, 1)];
    square = (a + b) / 2 + Math.hypot((a - b) / 2, c);
  } else for (let r = 0; r < f.rows; r++) square += gram(r, r);
  return Math.sqrt(square) + Math.hypot(f.l[at]!, f.l[at + 1]!, f.l[at + 2]!);
}

/** Longest way from joint `from` along the chain to the origin of joint `to`, or (`to` = n) to the tip, m. */
function reach(chain: Chain, from: number, to: number): number {
  let sum = 0;
  for (let k = from + 1; k <= Math.min(to, chain.n - 1); k++) sum += length(chain.origin, 3 * k);
  return to === chain.n ? sum + length(chain.tipOrigin, 0) : sum;
}

function length(v: Float64Array, at: number): number {
  return Math.hypot(v[at]!, v[at + 1]!, v[at + 2]!);
}

/**
 * Most force and moment about the joint origin of mass times acceleration outboard of a joint. Link b, with |ω| ≤ W and |ω̇| ≤ A (sums over the
 * joints before it) and its origin's acceleration at most a: force ≤ M a + |h| (A + W²), moment about its origin ≤ |h| a + I (A + W²).
 */
function inertiaMost(
  chain: Chain,
  load: ChainCase,
  speed: Float64Array,
  accel: Float64Array,
  joint: number,
): { readonly force: number; readonly moment: number } {
  let W = 0;
  let A = 0;
  let a = 0;
  let force = 0;
  let moment = 0;
  for (let b = 0; b < chain.n; b++) {
    if (b > 0) a += (A + W * W) * length(chain.origin, 3 * b);
    // ω̇ of the link: the new joint's own, and the turning of its axis with what is before it.
    A += accel[b]! + W * speed[b]!;
    W += speed[b]!;
    if (b < joint) continue;
    const h = length(load.first, 3 * b);
    const own = load.mass[b]! * a + h * (A + W * W);
    force += own;
    moment += h * a + inertiaSize(load, b) * (A + W * W) + reach(chain, joint, b) * own;
  }
  return { force, moment };
}

/** Not below the largest principal inertia about the link origin: half the trace and more, kg·m². */
function inertiaSize(load: ChainCase, b: number): number {
  const at = INERTIA.stride * b;
  return load.inertia[at + INERTIA.xx]! + load.inertia[at + INERTIA.yy]! + load.inertia[at + INERTIA.zz]!;
}
