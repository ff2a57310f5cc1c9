/** What branch and bound makes of a check's forms before it starts. */
import { InboardDirections } from './branchBoundInboard.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';

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
