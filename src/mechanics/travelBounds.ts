/**
 * What nothing within the travel exceeds, for the segments of a duty that may be anywhere in it.
 *
 * Weights (and a tip force along gravity) are bounded by the sphere search (`gravitySearch.ts`). Every other force of the case
 * comes on top with its own most anywhere in the travel, whatever its direction: a force free to point anywhere at a point of a link is a
 * weight there under free gravity, so `GravityCheck.cap` bounds it. A sum of bounds is a bound; it is loose by as much as the parts do not
 * want the same pose. `TravelBounds` lets a caller give the certified worst of the same forms instead.
 *
 * Motion. With |q̇| ≤ ω, |q̈| ≤ α and D_jb the most that the centre of link b comes to stand off axis j, its acceleration is at most
 *
 *     a_b = Σ_j α_j D_jb + Σ_{j≤k} c ω_j ω_k D_kb,      c = 1 for j = k, else 2          (`freeLoadsPose.ts`)
 *
 * so its mass adds a force m_b a_b there, and its inertia I about the centre a moment of at most I (|ω̇| + |ω|²). Every term of a_b stands
 * across its axis j, so along the axis of the joint looked at it has at most the sine of the angle between the two: none where they are
 * parallel. Force along and across the axis are bounded each by itself. Own derivation; held against random poses and motions.
 */
import { type Chain, type ChainCase, INERTIA, WRENCH } from './chain.ts';
import { DirectionValue } from './directionValue.ts';
import type { CheckForm, Form } from './form.ts';
import { GravityCheck } from './gravityCheck.ts';
import { GravityClimb } from './gravityClimb.ts';
import { gravityLoad } from './gravityLoad.ts';
import { GravitySearch } from './gravitySearch.ts';
import { OutwardSets } from './outwardSets.ts';

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

/** Bounds by the sphere search, force by force; `rounds` of refinement at most. */
export const sphereBounds = (
  chain: Chain,
  load: ChainCase,
  checks: readonly CheckForm[],
  rounds = ROUNDS,
): readonly number[] => {
  const whole = gravityLoad(chain, load);
  const still: ChainCase = { ...load, force: 'none', magnitude: 0, speed: null, accel: null };
  const searched = whole ? load : still;
  const weights = whole ?? gravityLoad(chain, still)!;
  const bare = checks.map((check): CheckForm => ({ ...check, forms: check.forms.map(homogeneous) }));
  const search = new GravitySearch(chain, searched, weights, bare, new GravityClimb(chain, searched));
  for (let round = 0; round < rounds && search.open(GAP); round++) search.round(GAP);
  const others = whole ? [] : otherForces(chain, load);
  return checks.map((check, k) => {
    const extra = others.length === 0 ? 0 : Math.max(...check.forms.map((f) => mostOf(chain, check.joint, f, others)));
    const constant = Math.max(...check.forms.map((f) => Math.hypot(...f.c) + f.o));
    const bound = search.entries[k]!.bound + extra + Math.max(0, constant);
    return bound > 0 ? bound * OUTWARD : bound;
  });
};

function homogeneous(f: Form): Form {
  return { ...f, c: new Float64Array(f.rows), o: 0 };
}

/** A force and a moment on link `link` whose direction is not known. */
interface OtherForce {
  readonly link: number;
  /** N, at most, by the joint whose axis it stands across; null: it may point anywhere. */
  readonly across: Float64Array | null;
  /** N and N·m, at most. */
  readonly force: number;
  readonly moment: number;
  /** Outward sets of a unit mass at the point where the force acts. */
  readonly sets: OutwardSets;
}

function otherForces(chain: Chain, load: ChainCase): readonly OtherForce[] {
  const list: OtherForce[] = [];
  if (load.force !== 'none') {
    const sets = pointSets(chain, chain.n - 1, chain.tipOrigin);
    list.push({ link: chain.n - 1, across: null, force: load.magnitude, moment: 0, sets });
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
    const across = Float64Array.from({ length: b + 1 }, (_, j) => {
      let turning = speed[j]! * D[j]!;
      for (let k = j + 1; k <= b; k++) turning += 2 * speed[k]! * D[k]!;
      return mass * (accel[j]! * D[j]! + speed[j]! * turning);
    });
    const force = across.reduce((sum, part) => sum + part, 0);
    list.push({ link: b, across, force, moment: largestInertia(load, b, centre) * (A + W * W), sets });
  }
  return list;
}

/** Axes nearer than this sine are parallel. */
const PARALLEL = 1e-12;

/** Most that the sine of the angle between the axis of joint i and each other axis can be. [n] */
function axisSines(chain: Chain, i: number): Float64Array {
  const sines = new Float64Array(chain.n).fill(1);
  sines[i] = 0;
  // Past axes that are parallel to this one the angle to the next does not change.
  for (let k = i + 1; k < chain.n; k++) {
    sines[k] = sineBefore(chain, k);
    if (sines[k]! > PARALLEL) break;
  }
  for (let k = i - 1; k >= 0; k--) {
    sines[k] = sineBefore(chain, k + 1);
    if (sines[k]! > PARALLEL) break;
  }
  return sines;
}

/** Sine of the angle between the axes of joint k and of the joint before it: the z axis of the one seen from the other. */
function sineBefore(chain: Chain, k: number): number {
  return Math.min(1, Math.hypot(chain.rotation[9 * k + 2]!, chain.rotation[9 * k + 5]!));
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
function mostOf(chain: Chain, joint: number, f: Form, others: readonly OtherForce[]): number {
  const bare = homogeneous(f);
  const sines = axisSines(chain, joint);
  let sum = 0;
  for (const { link, across, force, moment, sets } of others) {
    if (link < joint) continue;
    if (moment > 0) sum += moment * momentNorm(f);
    if (!(force > 0)) continue;
    const anyWay = new GravityCheck(sets, joint, bare, force, [0, 0, 1]).cap(LEVEL, 0);
    sum += across ? Math.min(anyWay, splitMost(sets, joint, bare, force, weighed(across, sines))) : anyWay;
  }
  return sum;
}

function weighed(across: Float64Array, sines: Float64Array): number {
  return across.reduce((sum, part, j) => sum + part * sines[j]!, 0);
}

/** Most of a form by a force of at most `across` N across the joint's axis and `along` N along it. */
function splitMost(sets: OutwardSets, joint: number, f: Form, across: number, along: number): number {
  const value = new DirectionValue(sets, joint, f, 1);
  let flat = 0;
  for (let k = 0; k < AROUND; k++) {
    const angle = (2 * Math.PI * k) / AROUND;
    const way = value.of(Math.cos(angle), Math.sin(angle), 0, LEVEL, flat);
    if (!(way <= flat)) flat = way;
  }
  const axial = along > 0 ? Math.max(value.of(0, 0, 1, LEVEL, 0), value.of(0, 0, -1, LEVEL, 0), 0) : 0;
  return (across * flat) / Math.cos(Math.PI / AROUND) + along * axial;
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
