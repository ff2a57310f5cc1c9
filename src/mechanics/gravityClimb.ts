/**
 * Climbs from a pose to a better one where the load is fixed at a pose (weights and tip forces): one joint at a time, exactly.
 *
 * For the linear function that wins at the present pose, the value along one joint is a + b cos q + c sin q, whose best angle within the
 * travel is in closed form; the check is at least that linear function, so no step loses. Ends where a round over the joints gains less
 * than a share of 1e-8.
 */
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import { type CheckForm, checkValue, formHolds, formValue } from './form.ts';
import type { Climber } from './gravitySearch.ts';
import { poseScratch, staticLoads } from './newtonEuler.ts';

const ROUNDS = 80;
const GAIN = 1e-8;

export class GravityClimb implements Climber {
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly out: Float64Array;
  private readonly scratch: ReturnType<typeof poseScratch>;
  /** Coefficients of the linear function that wins. [6] */
  private readonly line = new Float64Array(WRENCH);

  constructor(chain: Chain, load: ChainCase) {
    this.chain = chain;
    this.load = load;
    this.out = new Float64Array(WRENCH * chain.n);
    this.scratch = poseScratch(chain.n);
  }

  value(check: CheckForm, pose: Float64Array): number {
    staticLoads(this.chain, this.load, pose, this.out, this.scratch);
    return checkValue(check, this.out, WRENCH * check.joint);
  }

  valuesAt(
    entries: readonly { readonly check: CheckForm }[],
    pose: Float64Array,
    take: (at: number, value: number) => void,
  ): void {
    staticLoads(this.chain, this.load, pose, this.out, this.scratch);
    entries.forEach(({ check }, at) => {
      take(at, checkValue(check, this.out, WRENCH * check.joint));
    });
  }

  climb(check: CheckForm, pose: Float64Array): number {
    const { chain } = this;
    let best = this.value(check, pose);
    for (let round = 0; round < ROUNDS; round++) {
      const before = best;
      for (let k = 0; k < chain.n; k++) {
        // The load at hand is that of `pose` here.
        this.setLine(check);
        const old = pose[k]!;
        const here = this.along(check, pose, k, 0);
        const there = this.along(check, pose, k, Math.PI);
        const b = 0.5 * (here - there);
        const c = this.along(check, pose, k, 0.5 * Math.PI) - 0.5 * (here + there);
        pose[k] = bestAngle(b, c, chain.from[k]!, chain.to[k]!);
        const next = this.value(check, pose);
        if (next > best) {
          best = next;
        } else {
          pose[k] = old;
          this.value(check, pose);
        }
      }
      if (!(best - before > GAIN * Math.abs(best))) break;
    }
    return best;
  }

  private along(check: CheckForm, pose: Float64Array, k: number, angle: number): number {
    pose[k] = angle;
    staticLoads(this.chain, this.load, pose, this.out, this.scratch);
    const at = WRENCH * check.joint;
    let sum = 0;
    for (let j = 0; j < WRENCH; j++) sum += this.line[j]! * this.out[at + j]!;
    return sum;
  }

  /** The winning linear function at the present load: l + Pᵀe with e along P w + c. */
  private setLine(check: CheckForm): void {
    const { line, out } = this;
    const at = WRENCH * check.joint;
    let most = Number.NEGATIVE_INFINITY;
    for (const f of check.forms) {
      if (!formHolds(f, out, at)) continue;
      const value = formValue(f, out, at);
      if (!(value > most)) continue;
      most = value;
      line.set(f.l);
      let square = 0;
      for (let r = 0; r < f.rows; r++) square += row(f.P, f.c, r, out, at) ** 2;
      if (square === 0) continue;
      const scale = 1 / Math.sqrt(square);
      for (let r = 0; r < f.rows; r++) {
        const e = scale * row(f.P, f.c, r, out, at);
        for (let j = 0; j < WRENCH; j++) line[j]! += e * f.P[WRENCH * r + j]!;
      }
    }
  }
}

function row(P: Float64Array, c: Float64Array, r: number, w: Float64Array, at: number): number {
  let sum = c[r]!;
  for (let j = 0; j < WRENCH; j++) sum += P[WRENCH * r + j]! * w[at + j]!;
  return sum;
}

/** Angle of the interval where b cos q + c sin q is largest; the lower end where the ends tie. */
export function bestAngle(b: number, c: number, from: number, to: number): number {
  const turn = 2 * Math.PI;
  let peak = Math.atan2(c, b);
  peak += turn * Math.ceil((from - peak) / turn);
  if (peak <= to) return Math.max(from, peak);
  const value = (q: number) => b * Math.cos(q) + c * Math.sin(q);
  return value(to) > value(from) ? to : from;
}
