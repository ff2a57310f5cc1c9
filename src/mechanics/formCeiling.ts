/** The size that a form of a joint load can have by lengths, masses and limits alone: the scale of rounding, and of what counts as nothing. */
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';

/** Most of a form that lengths, masses and limits allow: forces at their farthest, all along the form. */
export function formCeiling(chain: Chain, load: ChainCase, joint: number, f: Form): number {
  const { n } = chain;
  const length = (list: ArrayLike<number>, at: number) => Math.hypot(list[at]!, list[at + 1]!, list[at + 2]!);
  // how far the origin of each link is from the joint, and from the first joint
  let force = load.force === 'none' ? 0 : load.magnitude;
  let moment = 0;
  let reach = 0;
  let far = 0;
  let rates = 0;
  for (let k = 0; k < n; k++) {
    far += k > 0 ? length(chain.origin, 3 * k) : 0;
    if (k > joint) reach += length(chain.origin, 3 * k);
    rates += load.accel?.[k] ?? 0;
  }
  const speeds = load.speed?.reduce((sum, v) => sum + v, 0) ?? 0;
  const turning = rates + speeds * speeds;
  moment += force * (reach + length(chain.tipOrigin, 0));
  let to = 0;
  for (let k = joint; k < n; k++) {
    if (k > joint) to += length(chain.origin, 3 * k);
    const o = 6 * k;
    const trace = load.inertia[o]! + load.inertia[o + 1]! + load.inertia[o + 2]!;
    const first = length(load.first, 3 * k);
    const weight = length(chain.gravity, 0);
    const own = load.mass[k]! * (weight + turning * far) + turning * first;
    force += own;
    moment += own * to + first * (weight + turning * far) + turning * trace;
  }
  let alpha = 0;
  let beta = 0;
  for (let r = 0; r < f.rows; r++) {
    alpha += length(f.P, WRENCH * r) ** 2;
    beta += length(f.P, WRENCH * r + 3) ** 2;
  }
  return (
    (Math.sqrt(alpha) + length(f.l, 0)) * force +
    (Math.sqrt(beta) + length(f.l, 3)) * moment +
    Math.hypot(...f.c) +
    Math.abs(f.o)
  );
}
