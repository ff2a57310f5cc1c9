/** What a certified worst claims, and a search for poses that contradict it: the plain kernel alone, no table and no bound. */
import type { Arm } from '../../src/arm/arm.ts';
import { capacityChecks, capacityForms } from '../../src/capacity/index.ts';
import { type Random, seededRandom } from '../../src/math/random.ts';
import { type Chain, type ChainCase, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { type FreePart, hasFree } from '../../src/mechanics/freeLoads.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { polish } from '../../src/mechanics/polish.ts';

/** One row of a certified worst. */
export interface Claim {
  readonly check: CheckForm;
  readonly found: number;
  readonly pose: Float64Array;
  readonly free: FreePart | null;
  readonly bound: number;
}

const known = new WeakMap<Arm, readonly CheckForm[]>();

/** Loads and, where the arm has bearings and shafts, the convex demands on them; made once for an arm. */
export function allChecks(arm: Arm, chain: Chain): readonly CheckForm[] {
  const before = known.get(arm);
  if (before) return before;
  const made = [...loadChecks(arm, chain), ...capacityForms(capacityChecks(arm, chain))];
  known.set(arm, made);
  return made;
}

/** `count` of a list, spread by a seed; all of it where it is not longer. */
export function some<T>(list: readonly T[], count: number, seed: number): readonly T[] {
  const random = seededRandom(seed);
  const left = [...list];
  while (left.length > count) left.splice(random.below(left.length), 1);
  return left;
}

export function nameOf(check: CheckForm): string {
  return `joint ${check.joint + 1} ${check.bearing ?? ''} ${check.check}`;
}

/** A pose within the travel; every third angle at an end of it, where many worst poses lie. */
export function randomPose(chain: Chain, random: Random, pose: Float64Array): void {
  for (let i = 0; i < chain.n; i++) {
    const pick = random.next();
    const [low, high] = [chain.from[i]!, chain.to[i]!];
    pose[i] = pick < 1 / 6 ? low : pick < 1 / 3 ? high : Math.min(high, Math.max(low, random.between(low, high)));
  }
}

/** The plain kernel at a pose with free parts held. */
export class Plain {
  readonly out: Float64Array;
  readonly chain: Chain;
  readonly load: ChainCase;
  private readonly scratch;
  private readonly still: Float64Array;

  constructor(chain: Chain, load: ChainCase) {
    this.chain = chain;
    this.load = load;
    this.out = new Float64Array(6 * chain.n);
    this.scratch = poseScratch(chain.n);
    this.still = new Float64Array(chain.n);
  }

  at(pose: ArrayLike<number>, free: FreePart | null): void {
    const tip = free?.tipForce ?? null;
    if (!free?.speed) {
      staticLoads(this.chain, this.load, pose, this.out, this.scratch, tip);
      return;
    }
    const rates = { speed: free.speed, accel: free.accel ?? this.still };
    dynamicLoads(this.chain, this.load, pose, rates, this.out, this.scratch, tip);
  }

  value(check: CheckForm): number {
    return checkValue(check, this.out, 6 * check.joint);
  }
}

/** Value of a check at w[at..], by its definition once more: quick, and held against the engine's own at every claim. */
function quickValue(check: CheckForm, w: Float64Array, at: number): number {
  let most = Number.NaN;
  for (const f of check.forms) {
    if (w[at + 5]! < f.torqueFrom || w[at + 5]! > f.torqueTo) continue;
    const { P, c, l } = f;
    let square = 0;
    for (let r = 0, k = 0; r < f.rows; r++) {
      let y = c[r]!;
      for (let j = 0; j < 6; j++, k++) y += P[k]! * w[at + j]!;
      square += y * y;
    }
    let value = Math.sqrt(square) + f.o;
    for (let j = 0; j < 6; j++) value += l[j]! * w[at + j]!;
    if (!(value <= most)) most = value;
  }
  return most;
}

/** Free parts by chance: the tip force anywhere, accelerations at their limits, speeds at or within theirs. */
export function randomFree(load: ChainCase, n: number, random: Random): FreePart | null {
  if (!hasFree(load)) return null;
  const sign = () => (random.next() < 0.5 ? -1 : 1);
  return {
    tipForce: load.force === 'any' ? random.direction() : null,
    speed: load.speed
      ? Array.from({ length: n }, (_, j) => load.speed![j]! * (random.next() < 0.7 ? sign() : random.between(-1, 1)))
      : null,
    accel: load.accel ? Array.from({ length: n }, (_, j) => load.accel![j]! * sign()) : null,
  };
}

export interface Attack {
  readonly seed: number;
  /** Random poses, all claims at each. */
  readonly poses: number;
  /** Climbs for each claim, from the best pose met and from random ones. */
  readonly climbs: number;
  /** A value this share of the largest size in play above a bound counts as rounding; 0: none is forgiven. */
  readonly forgive?: number;
}

/** Everything that contradicts the claims, in words; empty where they hold. */
export function contradictions(arm: Arm, caseIndex: number, claims: readonly Claim[], attack: Attack): string[] {
  const chain = flattenArm(arm);
  const load = chain.cases[caseIndex]!;
  const plain = new Plain(chain, load);
  const random = seededRandom(attack.seed + 50_000);
  const said: string[] = [];
  const most = claims.map(() => Number.NEGATIVE_INFINITY);
  const where = claims.map(() => new Float64Array(chain.n));
  const pose = new Float64Array(chain.n);
  for (let k = 0; k < attack.poses; k++) {
    randomPose(chain, random, pose);
    plain.at(pose, randomFree(load, chain.n, random));
    claims.forEach(({ check }, c) => {
      const value = quickValue(check, plain.out, 6 * check.joint);
      if (value > most[c]!) {
        most[c] = value;
        where[c]!.set(pose);
      }
    });
  }
  claims.forEach((claim, c) => {
    const { check, found, bound } = claim;
    const name = nameOf(check);
    plain.at(claim.pose, claim.free);
    const attained = plain.value(check);
    const size = Math.max(Math.abs(attained), 1e-6 * loadSize(plain.out, check));
    if (!(Math.abs(attained - quickValue(check, plain.out, 6 * check.joint)) <= 1e-12 * size))
      said.push(`${name}: unlike its forms`);
    if (!(Math.abs(attained - found) <= 1e-9 * size)) said.push(`${name}: found ${found} is ${attained} at its pose`);
    if (!(found <= bound)) said.push(`${name}: found ${found} above its bound ${bound}`);
    claim.pose.forEach((q, i) => {
      if (!(q >= chain.from[i]! && q <= chain.to[i]!)) said.push(`${name}: joint ${i + 1} off its travel at ${q}`);
    });
    if (!allowedFree(load, claim.free)) said.push(`${name}: free parts beyond their limits`);
    let best = most[c]!;
    for (let k = 0; k < attack.climbs; k++) {
      if (k === 0) pose.set(where[c]!);
      else randomPose(chain, random, pose);
      best = Math.max(best, polish(chain, load, check, pose).value);
    }
    if (best > bound + (attack.forgive ?? 0) * size)
      said.push(`${name}: ${best} exceeds the bound ${bound} by ${(best - bound) / size}`);
  });
  return said;
}

/** What the check's value is made of, roughly: rows of it at the size of the load. */
function loadSize(out: Float64Array, check: CheckForm): number {
  let most = 0;
  for (const f of check.forms) {
    for (let r = 0; r <= f.rows; r++) {
      let sum = 0;
      for (let k = 0; k < 6; k++) {
        const factor = r < f.rows ? f.P[6 * r + k]! : f.l[k]!;
        sum += Math.abs(factor * out[6 * check.joint + k]!);
      }
      most = Math.max(most, sum);
    }
  }
  return most;
}

function allowedFree(load: ChainCase, free: FreePart | null): boolean {
  if (hasFree(load) !== (free !== null)) return false;
  if (!free) return true;
  if (free.tipForce && Math.abs(Math.hypot(...free.tipForce) - 1) > 1e-9) {
    // A force that makes no difference may be left out
    if (free.tipForce.some((v) => v !== 0)) return false;
  }
  const within = (values: readonly number[] | null, limits: Float64Array | null) =>
    values === null || values.every((v, j) => Math.abs(v) <= limits![j]! * (1 + 1e-12));
  return within(free.speed, load.speed) && within(free.accel, load.accel);
}
