/**
 * What nothing within the travel exceeds, for the segments of a duty that may be anywhere in it.
 *
 * Weights (and a tip force along gravity) are bounded by the sphere search (`../mechanics/gravitySearch.ts`). Every other force of the case
 * comes on top with its own most anywhere in the travel, whatever its direction: a force free to point anywhere at a point of a link is a
 * weight there under free gravity, so `GravityCheck.cap` bounds it. A sum of bounds is a bound; it is loose by as much as the parts do not
 * want the same pose. `TravelBounds` lets a caller give the certified worst of the same forms instead.
 *
 * Motion. With |q̇| ≤ ω, |q̈| ≤ α and D_jb the most that the centre of link b comes to stand off axis j, its acceleration is at most
 *
 *     a_b = Σ_j α_j D_jb + Σ_{j≤k} c ω_j ω_k D_kb,      c = 1 for j = k, else 2          (`../mechanics/freeLoadsPose.ts`)
 *
 * so its mass adds a force m_b a_b of unknown direction there, and its inertia I about the centre a moment of at most I (|ω̇| + |ω|²). Own
 * derivation; held against random poses and motions.
 */
import { type Chain, type ChainCase, INERTIA, WRENCH } from '../mechanics/chain.ts';
import type { CheckForm, Form } from '../mechanics/form.ts';
import { GravityCheck } from '../mechanics/gravityCheck.ts';
import { GravityClimb } from '../mechanics/gravityClimb.ts';
import { gravityLoad } from '../mechanics/gravityLoad.ts';
import { GravitySearch } from '../mechanics/gravitySearch.ts';
import { OutwardSets } from '../mechanics/outwardSets.ts';

/** Bounds of forms in one case over the travel, in the order given. Never below what occurs; NaN or Infinity where not known. */
export type TravelBounds = (chain: Chain, load: ChainCase, checks: readonly CheckForm[]) => readonly number[];

const GAP = 0.01;
const ROUNDS = 4;
/** Level of the tables for the other forces. */
const LEVEL = 2;
/** Directions round an axis in which the way off it is looked up; the polygon round the circle adds 1/cos(π/32), 0.5 %. */
const AROUND = 32;
/** What the sums here may lose to rounding, relative. */
const OUTWARD = 1 + 1e-12;

/** Bounds by the sphere search, force by force. */
export const sphereBounds: TravelBounds = (chain, load, checks) => {
  const whole = gravityLoad(chain, load);
  const still: ChainCase = { ...load, force: 'none', magnitude: 0, speed: null, accel: null };
  const searched = whole ? load : still;
  const weights = whole ?? gravityLoad(chain, still)!;
  const bare = checks.map((check): CheckForm => ({ ...check, forms: check.forms.map(homogeneous) }));
  const search = new GravitySearch(chain, searched, weights, bare, new GravityClimb(chain, searched));
  for (let round = 0; round < ROUNDS && search.open(GAP); round++) search.round(GAP);
  const others = whole ? [] : otherForces(chain, load);
  return checks.map((check, k) => {
    const extra = others.length === 0 ? 0 : Math.max(...check.forms.map((f) => mostOf(check.joint, f, others)));
    const constant = Math.max(...check.forms.map((f) => Math.hypot(...f.c) + f.o));
    const bound = search.entries[k]!.bound + extra + Math.max(0, constant);
    return bound > 0 ? bound * OUTWARD : bound;
  });
};

function homogeneous(f: Form): Form {
  return { ...f, c: new Float64Array(f.rows), o: 0 };
}

/** A force of at most `force` N, of any direction, at a point of link `link`, and a moment of at most `moment` N·m on it. */
interface OtherForce {
  readonly link: number;
  readonly force: number;
  readonly moment: number;
  /** Outward sets of a unit mass at the point. */
  readonly sets: OutwardSets;
}

function otherForces(chain: Chain, load: ChainCase): readonly OtherForce[] {
  const list: OtherForce[] = [];
  if (load.force !== 'none') {
    const sets = pointSets(chain, chain.n - 1, chain.tipOrigin);
    list.push({ link: chain.n - 1, force: load.magnitude, moment: 0, sets });
  }
  const { speed, accel } = load;
  if (!speed || !accel) return list;
  let W = 0;
  let A = 0;
  for (let b = 0; b < chain.n; b++) {
    A += accel[b]! + W * speed[b]!;
    W += speed[b]!;
    const mass = load.mass[b]!;
    const centre = Float64Array.from({ length: 3 }, (_, k) => (mass > 0 ? load.first[3 * b + k]! / mass : 0));
    const sets = pointSets(chain, b, centre);
    const D = Float64Array.from({ length: b + 1 }, (_, j) => (mass > 0 ? offAxis(sets, j) : 0));
    let a = 0;
    for (let k = 0; k <= b; k++) {
      let turning = speed[k]! * speed[k]!;
      for (let j = 0; j < k; j++) turning += 2 * speed[j]! * speed[k]!;
      a += (accel[k]! + turning) * D[k]!;
    }
    list.push({ link: b, force: mass * a, moment: largestInertia(load, b, centre) * (A + W * W), sets });
  }
  return list;
}

export function pointSets(chain: Chain, link: number, point: Float64Array): OutwardSets {
  const mass = new Float64Array(chain.n);
  const first = new Float64Array(3 * chain.n);
  mass[link] = 1;
  first.set(point.subarray(0, 3), 3 * link);
  return new OutwardSets(chain, { mass, first });
}

/** Most that the point of a set comes to stand off the axis of joint j, m. */
function offAxis(sets: OutwardSets, j: number): number {
  let most = 0;
  for (let k = 0; k < AROUND; k++) {
    const angle = (2 * Math.PI * k) / AROUND;
    const way = sets.at(j, Math.cos(angle), Math.sin(angle), 0, LEVEL);
    if (!(way <= most)) most = way;
  }
  return most / Math.cos(Math.PI / AROUND);
}

/** Not below the largest principal inertia about the centre, kg·m²: none exceeds half their sum. */
function largestInertia(load: ChainCase, b: number, centre: Float64Array): number {
  const at = INERTIA.stride * b;
  const trace = load.inertia[at + INERTIA.xx]! + load.inertia[at + INERTIA.yy]! + load.inertia[at + INERTIA.zz]!;
  const square = centre[0]! ** 2 + centre[1]! ** 2 + centre[2]! ** 2;
  return Math.max(0, trace - 2 * load.mass[b]! * square) / 2;
}

/** Most that the other forces add to a form of a joint. */
function mostOf(joint: number, f: Form, others: readonly OtherForce[]): number {
  let sum = 0;
  for (const { link, force, moment, sets } of others) {
    if (link < joint) continue;
    if (moment > 0) sum += moment * momentNorm(f);
    if (force > 0) sum += new GravityCheck(sets, joint, homogeneous(f), force, [0, 0, 1]).cap(LEVEL, 0);
  }
  return sum;
}

/** Largest of ‖P m‖ + |l·m| over unit moments m. */
function momentNorm(f: Form): number {
  const gram = (r: number, s: number) => {
    let sum = 0;
    for (let c = 3; c < WRENCH; c++) sum += f.P[WRENCH * r + c]! * f.P[WRENCH * s + c]!;
    return sum;
  };
  let square = 0;
  if (f.rows === 2) square = (gram(0, 0) + gram(1, 1)) / 2 + Math.hypot((gram(0, 0) - gram(1, 1)) / 2, gram(0, 1));
  else for (let r = 0; r < f.rows; r++) square += gram(r, r);
  return Math.sqrt(square) + Math.hypot(f.l[3]!, f.l[4]!, f.l[5]!);
}
