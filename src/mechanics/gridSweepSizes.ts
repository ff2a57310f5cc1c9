/** How large the terms of a check can get anywhere: the scale of rounding and of ties. */
import type { Chain, ChainCase } from './chain.ts';
import { INERTIA } from './chain.ts';
import type { CheckForm } from './form.ts';

function length3(v: ArrayLike<number>, at: number): number {
  return Math.hypot(v[at]!, v[at + 1]!, v[at + 2]!);
}

/** Largest |force| (N) and |moment| (N·m) of each joint under a case, in any pose and for anything the case leaves free. [2n] */
export function jointSizes(chain: Chain, load: ChainCase): Float64Array {
  const { n } = chain;
  const out = new Float64Array(2 * n);
  const accel = new Float64Array(n);
  const turning = new Float64Array(n);
  let omega = 0;
  let alpha = 0;
  let origin = length3(chain.gravity, 0);
  for (let i = 0; i < n; i++) {
    const speed = load.speed?.[i] ?? 0;
    if (i > 0) origin += (alpha + omega * omega) * length3(chain.origin, 3 * i);
    alpha += omega * speed + (load.accel?.[i] ?? 0);
    omega += speed;
    accel[i] = origin;
    turning[i] = alpha + omega * omega;
  }
  let force = load.force === 'none' ? 0 : load.magnitude;
  let moment = 0;
  let reach = length3(chain.tipOrigin, 0);
  for (let i = n - 1; i >= 0; i--) {
    moment += force * reach;
    const first = length3(load.first, 3 * i);
    let inertia = 0;
    for (let k = 0; k < INERTIA.stride; k++) inertia = Math.hypot(inertia, load.inertia[INERTIA.stride * i + k]!);
    force += load.mass[i]! * accel[i]! + first * turning[i]!;
    moment += first * accel[i]! + 2 * inertia * turning[i]!;
    out[2 * i] = force;
    out[2 * i + 1] = moment;
    reach = length3(chain.origin, 3 * i);
  }
  return out;
}

/** Size of each check's terms under a case, in its own unit; infinite or NaN where something in arm or case is not finite. */
export function checkSizes(chain: Chain, load: ChainCase, checks: readonly CheckForm[]): Float64Array {
  const joints = jointSizes(chain, load);
  return Float64Array.from(checks, (check) => {
    const force = joints[2 * check.joint]!;
    const moment = joints[2 * check.joint + 1]!;
    let size = 0;
    for (const f of check.forms) {
      let own = Math.abs(f.o) + force * length3(f.l, 0) + moment * length3(f.l, 3);
      for (let r = 0; r < f.rows; r++) {
        own += Math.abs(f.c[r]!) + force * length3(f.P, 6 * r) + moment * length3(f.P, 6 * r + 3);
      }
      if (!(own <= size)) size = own;
    }
    return size;
  });
}
