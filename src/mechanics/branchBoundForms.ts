/** What branch and bound makes of a check's forms before it starts: which turn with the axis, and which need no drive torque. */
import type { Numbers } from '../math/vector.ts';
import { InboardDirections } from './branchBoundInboard.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';

/** Whether a form keeps its value when the load turns about the z axis: rows that turn into each other, or that look along z. */
export function sameAllRound(f: Form): boolean {
  const { P, c, l } = f;
  const along = (row: Numbers, at: number) => [0, 1, 3, 4].every((k) => row[at + k] === 0);
  if (!along(l, 0) || f.torqueFrom > Number.NEGATIVE_INFINITY || f.torqueTo < Number.POSITIVE_INFINITY) return false;
  const pair = f.rows >= 2 && !(along(P, 0) && along(P, WRENCH));
  for (let r = pair ? 2 : 0; r < f.rows; r++) if (!along(P, WRENCH * r)) return false;
  if (!pair) return true;
  if (c[0] !== 0 || c[1] !== 0) return false;
  // second row = first row turned by a right angle: R P = P R for every turn R
  for (const k of [0, 3]) {
    const [a, b, d, e] = [P[k]!, P[k + 1]!, P[WRENCH + k]!, P[WRENCH + k + 1]!];
    if (a !== e || b !== -d || P[k + 2] !== 0 || P[WRENCH + k + 2] !== 0) return false;
  }
  return true;
}

/** Weights alone on a joint whose axis always lies along gravity: they turn nothing about it. */
function turnsNothing(chain: Chain, load: ChainCase, joint: number): boolean {
  if (load.force !== 'none') return false;
  const { count, fixed } = new InboardDirections(chain, joint, false);
  return count === 0 && Math.hypot(fixed[0]!, fixed[1]!) < 1e-13;
}

/** The forms that can hold at the joint, without their torque where there is none. */
export function formsAt(chain: Chain, load: ChainCase, joint: number, forms: readonly Form[]): readonly Form[] {
  if (!turnsNothing(chain, load, joint)) return forms;
  const kept = new Map<string, Form>();
  for (const f of forms) {
    if (f.torqueFrom > 0 || f.torqueTo < 0) continue;
    const still: Form = {
      ...f,
      P: f.P.map((v, k) => (k % WRENCH === 5 ? 0 : v)),
      l: f.l.map((v, k) => (k === 5 ? 0 : v)),
      torqueFrom: Number.NEGATIVE_INFINITY,
      torqueTo: Number.POSITIVE_INFINITY,
    };
    kept.set(`${still.P.join()} ${still.c.join()} ${still.l.join()} ${still.o}`, still);
  }
  return [...kept.values()];
}
