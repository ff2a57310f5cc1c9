/** Joint loads against a general-purpose rigid-body engine: every joint of random arms, at rest and in motion. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm, wrenchToFile } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { withFixedJoints, withFullInertia } from '../armVariants.ts';
import { randomArm } from '../randomArm.ts';
import { type OutsideArm, outsideArm } from './rigidBody.ts';

const POSES = 20;

interface Both {
  ours: Float64Array;
  theirs: Float64Array;
}

/** Calls `look` with both sets of joint loads, file's housing frames, at `POSES` random poses of the arm's travel. */
async function atPoses(arm: Arm, seed: number, motion: boolean, look: (both: Both) => void): Promise<void> {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const outside: OutsideArm = await outsideArm(arm);
  const random = seededRandom(seed);
  const canonical = new Float64Array(6 * chain.n);
  const ours = new Float64Array(6 * chain.n);
  const theirs = new Float64Array(6 * chain.n);
  const turned = new Float64Array(6);
  const scratch = poseScratch(chain.n);
  for (let p = 0; p < POSES; p++) {
    const pose = Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
    const speed = pose.map(() => random.between(-3, 3));
    const accel = pose.map(() => random.between(-20, 20));
    const any = load.force === 'any' ? random.direction() : null;
    if (motion) {
      dynamicLoads(chain, load, pose, { speed, accel }, canonical, scratch, any);
      outside.motion(pose, speed, accel, theirs, any);
    } else {
      staticLoads(chain, load, pose, canonical, scratch, any);
      outside.statics(pose, theirs, any);
    }
    for (let i = 0; i < chain.n; i++) {
      wrenchToFile(chain, i, canonical, 6 * i, turned);
      ours.set(turned, 6 * i);
    }
    look({ ours, theirs });
  }
  outside.close();
}

/** Largest difference of force (moment) at any joint over the size of that joint's own force (moment). */
function difference({ ours, theirs }: Both): number {
  let worst = 0;
  for (let k = 0; k < ours.length; k += 3) {
    const gap = Math.hypot(ours[k]! - theirs[k]!, ours[k + 1]! - theirs[k + 1]!, ours[k + 2]! - theirs[k + 2]!);
    const ratio = gap / Math.hypot(theirs[k]!, theirs[k + 1]!, theirs[k + 2]!);
    worst = Math.max(worst, ratio);
  }
  return worst;
}

const FORCES = ['none', 'base', 'tool', 'any'] as const;

describe('joint loads of the outside engine', () => {
  it('at every scale: lengths and masses from 1e-3 to 1e3, at rest and in motion (seeds 61–84)', async () => {
    let worst = 0;
    for (let seed = 61; seed <= 84; seed++) {
      const size = 0.4 * 10 ** ((seed % 7) - 3);
      const mass = 3 * 10 ** ((seed % 5) * 1.5 - 3);
      const arm = withFullInertia(randomArm(seed, { joints: 1 + (seed % 7), force: 'base', size, mass }), seed);
      for (const motion of [false, true]) {
        await atPoses(arm, seed, motion, (both) => {
          worst = Math.max(worst, difference(both));
        });
      }
    }
    expect(worst).toBeLessThan(1e-9);
  });

  for (const motion of [false, true]) {
    it(`${motion ? 'in motion' : 'at rest'}, 60 random arms × ${POSES} poses, payloads, tip forces, fixed joints (seeds 1–60)`, async () => {
      let worst = 0;
      for (let seed = 1; seed <= 60; seed++) {
        const plain = randomArm(seed, { joints: 1 + (seed % 9), force: FORCES[seed % 4]!, payload: seed % 5 > 0 });
        const arm = withFullInertia(seed % 3 === 0 ? withFixedJoints(plain, seed) : plain, seed);
        await atPoses(arm, seed, motion, (both) => {
          worst = Math.max(worst, difference(both));
        });
      }
      expect(worst).toBeLessThan(1e-9);
    });
  }

  const models = readdirSync('models').filter((name) => name.endsWith('.arm.json'));
  it(`of every model and case of the project, ${POSES} poses each (seed 85)`, async () => {
    expect(models.length).toBeGreaterThan(0);
    let worst = 0;
    for (const name of models) {
      const reading = readArm(readFileSync(`models/${name}`, 'utf8'));
      if (!reading.ok) throw new Error(`${name} is not sound`);
      for (const load of reading.arm.cases) {
        const arm = { ...reading.arm, cases: [load] };
        await atPoses(arm, 85, load.motion !== null, (both) => {
          worst = Math.max(worst, difference(both));
        });
      }
    }
    expect(worst).toBeLessThan(1e-9);
  });
});
