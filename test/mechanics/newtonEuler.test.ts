import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { assertChain, flattenArm } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch, staticLoads, tipReach } from '../../src/mechanics/newtonEuler.ts';
import { randomArm } from '../randomArm.ts';

describe('Newton–Euler', () => {
  it('gives the two-link closed form (Spong, Hutchinson & Vidyasagar; figures recomputed)', () => {
    const arm = twoLink();
    const chain = flattenArm(arm);
    const out = new Float64Array(12);
    staticLoads(chain, chain.cases[0]!, [0, 0], out, poseScratch(2));
    // Rotation about the file's y axis turns x down, so gravity's torque about it is positive.
    expect(Math.abs(out[5]!)).toBeCloseTo(9.3195, 9);
    expect(Math.abs(out[11]!)).toBeCloseTo(1.4715, 9);
    expect(Math.hypot(out[6]!, out[7]!, out[8]!)).toBeCloseTo(9.81, 9);
    expect(Math.hypot(out[0]!, out[1]!, out[2]!)).toBeCloseTo(29.43, 9);
  });

  it('equals the static pass at zero rates, 50 random arms (seeds 1–50)', () => {
    for (let seed = 1; seed <= 50; seed++) {
      const arm = randomArm(seed, {
        joints: 1 + (seed % 9),
        force: seed % 3 === 0 ? 'base' : seed % 3 === 1 ? 'tool' : 'none',
      });
      const chain = flattenArm(arm);
      assertChain(chain);
      const random = seededRandom(seed);
      const pose = Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
      const zero = pose.map(() => 0);
      const a = new Float64Array(6 * chain.n);
      const b = new Float64Array(6 * chain.n);
      staticLoads(chain, chain.cases[0]!, pose, a, poseScratch(chain.n));
      dynamicLoads(chain, chain.cases[0]!, pose, { speed: zero, accel: zero }, b, poseScratch(chain.n));
      const size = Math.hypot(...a);
      for (let k = 0; k < a.length; k++) expect(Math.abs(a[k]! - b[k]!)).toBeLessThan(1e-12 * (size + 1));
    }
  });

  it('is virtual work: static torque is minus the slope of potential energy (seeds 1–30)', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 7), force: 'base' });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const random = seededRandom(1000 + seed);
      const pose = Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
      const out = new Float64Array(6 * chain.n);
      const scratch = poseScratch(chain.n);
      // Work function W(q) = Σ m g·x + F·x_tip, from the joint load at the first joint's origin: use tip and mass positions by difference.
      staticLoads(chain, load, pose, out, scratch);
      const torques = Array.from({ length: chain.n }, (_, i) => out[6 * i + 5]!);
      for (let i = 0; i < chain.n; i++) {
        const h = 1e-6;
        const at = (d: number) =>
          work(
            chain,
            load,
            pose.map((q, k) => (k === i ? q + d : q)),
          );
        const slope = (at(h) - at(-h)) / (2 * h);
        expect(Math.abs(slope - torques[i]!)).toBeLessThan(1e-6 * (1 + Math.abs(torques[i]!)) * 50);
      }
    }
  });

  it('reaches the tip where the frames put it', () => {
    const chain = flattenArm(twoLink());
    const out = new Float64Array(6);
    tipReach(chain, [0, Math.PI / 2], out, poseScratch(2));
    expect(Math.hypot(out[0]!, out[1]!, out[2]!)).toBeCloseTo(Math.hypot(0.4, 0.3), 12);
  });
});

/** Work done by weights and the base-fixed tip force from the zero of their positions, J. */
function work(
  chain: ReturnType<typeof flattenArm>,
  load: ReturnType<typeof flattenArm>['cases'][number],
  pose: number[],
): number {
  const m = new Float64Array(9);
  let R = [1, 0, 0, 0, 1, 0, 0, 0, 1];
  let p = [0, 0, 0];
  let sum = 0;
  const times = (A: number[], v: number[]) =>
    [0, 1, 2].map((r) => A[3 * r]! * v[0]! + A[3 * r + 1]! * v[1]! + A[3 * r + 2]! * v[2]!);
  const mul = (A: number[], B: number[]) =>
    [0, 1, 2].flatMap((r) => [0, 1, 2].map((c) => [0, 1, 2].reduce((s, k) => s + A[3 * r + k]! * B[3 * k + c]!, 0)));
  for (let i = 0; i < chain.n; i++) {
    const o = times(R, [...chain.origin.slice(3 * i, 3 * i + 3)]);
    p = p.map((v, k) => v + o[k]!);
    const c = Math.cos(pose[i]!);
    const s = Math.sin(pose[i]!);
    m.set([c, -s, 0, s, c, 0, 0, 0, 1]);
    R = mul(mul(R, [...chain.rotation.slice(9 * i, 9 * i + 9)]), [...m]);
    const h = times(R, [...load.first.slice(3 * i, 3 * i + 3)]);
    for (let k = 0; k < 3; k++) sum += chain.gravity[k]! * (load.mass[i]! * p[k]! + h[k]!);
  }
  const tip = times(R, [...chain.tipOrigin]).map((v, k) => v + p[k]!);
  if (load.force === 'base') for (let k = 0; k < 3; k++) sum += load.magnitude * load.forceUnit[k]! * tip[k]!;
  return sum;
}

function twoLink(): Arm {
  const base = randomArm(1, { joints: 2, force: 'none' });
  const eye = [1, 0, 0, 0, 1, 0, 0, 0, 1] as const;
  const joint = (x: number, mass: number, centre: number) => ({
    ...base.joints[0]!,
    placement: { position: [x, 0, 0] as const, rotation: eye },
    axis: [0, 1, 0] as const,
    link: { name: 'l', mass, centre: [centre, 0, 0] as const, inertia: null },
  });
  return {
    ...base,
    gravity: [0, 0, -9.81],
    joints: [joint(0, 2, 0.2), joint(0.4, 1, 0.15)],
    tip: { position: [0.3, 0, 0], rotation: eye },
    cases: [{ name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 }],
  };
}
