/** Published examples in the scope of joint and bearing loads. */
import { describe, expect, it } from 'vitest';
import type { Arm, Drive } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { turnedArm } from '../armVariants.ts';
import { jointLoads } from '../properties/jointLoads.ts';
import { checkOf, forceAt, pairLoads, radial, wrench } from '../properties/pairLoads.ts';
import { randomArm, randomRotation } from '../randomArm.ts';
import { add, dot, size } from '../worldArm.ts';
import { BETWEEN, COUPLES, GEAR_SHAFT, OVERHANG, TWO_LINK_ARMS, VECTOR_PAIR } from './publishedExamples.ts';

const near = (value: number, expected: number, tolerance: number) =>
  expect(Math.abs(value - expected)).toBeLessThanOrEqual(tolerance * Math.abs(expected));

// The shaft lies along z, up is y; what a support does to the shaft is the opposite of the load on the bearing.
describe('published examples of bearing loads', () => {
  it(`overhung load: ${OVERHANG.source} [${OVERHANG.tag}]`, () => {
    const { load, span, overhang, tolerance } = OVERHANG;
    const { A, B } = pairLoads(forceAt([0, -load, 0], [0, 0, span + overhang]), 0, span);
    near(-A[1], OVERHANG.reactionFar, tolerance);
    near(-B[1], OVERHANG.reactionNear, tolerance);
  });

  it(`load between: ${BETWEEN.source} [${BETWEEN.tag}]`, () => {
    const { A, B } = pairLoads(forceAt([0, -BETWEEN.load, 0], [0, 0, BETWEEN.loadFromLeft]), 0, BETWEEN.span);
    near(-A[1], BETWEEN.reactionLeft, BETWEEN.tolerance);
    near(-B[1], BETWEEN.reactionRight, BETWEEN.tolerance);
  });

  for (const example of COUPLES) {
    it(`couple ${example.place}: ${example.source} [${example.tag}]`, () => {
      // Anticlockwise from z towards y is about -x. The joint origin stands where the couple acts.
      const w = wrench([0, 0, 0], [-example.couple, 0, 0]);
      const { A, B } = pairLoads(w, -example.station, example.span - example.station);
      near(-A[1], example.reactionLeft, example.tolerance);
      near(-B[1], example.reactionRight, example.tolerance);
    });
  }

  it(`force and couple in space: ${VECTOR_PAIR.source} [${VECTOR_PAIR.tag}]`, () => {
    const { span, force, forcePoint, couple, tolerance } = VECTOR_PAIR;
    const w = forceAt(force, forcePoint);
    couple.forEach((c, k) => {
      w[3 + k]! += c;
    });
    const { A, B } = pairLoads(w, 0, span, 'B');
    for (const k of [0, 1] as const) {
      near(A[k], VECTOR_PAIR.radialA[k], tolerance);
      near(B[k], VECTOR_PAIR.radialB[k], tolerance);
    }
    near(checkOf('radial', 'A', w, 0, span), VECTOR_PAIR.sizeA, VECTOR_PAIR.printedTolerance);
    near(checkOf('radial', 'B', w, 0, span), VECTOR_PAIR.sizeB, VECTOR_PAIR.printedTolerance);
    expect(A[2]).toBe(0);
    near(B[2], VECTOR_PAIR.axial, tolerance);
    near(w[5]!, VECTOR_PAIR.torque, tolerance);
  });

  it(`gear at mid span: ${GEAR_SHAFT.source} [${GEAR_SHAFT.tag}]`, () => {
    const { torque, pitchDiameter, pressureAngleDeg, span, resultant, bending, tolerance } = GEAR_SHAFT;
    const pressureAngle = (pressureAngleDeg * Math.PI) / 180;
    for (const side of [-1, 1]) {
      const drive: Drive = { kind: 'gear', station: 0, radius: pitchDiameter / 2, pressureAngle, mesh: 0.7 };
      const w = wrench([0, 0, 0], [0, 0, side * torque]);
      const { A, B } = pairLoads(w, -span / 2, span / 2, 'A', drive);
      near(size(add(A, B)), resultant, tolerance);
      near(radial(A), resultant / 2, tolerance);
      near((radial(B) * span) / 2, bending, tolerance);
    }
  });

  for (const example of TWO_LINK_ARMS) {
    it(`two-link arm, upright and turned anyhow (seed 7): ${example.source} [${example.tag}]`, () => {
      const arm = twoLinkArm(example);
      for (const now of [arm, turnedArm(arm, randomRotation(seededRandom(7)))]) {
        const loads = jointLoads(now, [example.q1, example.q2]);
        // The arm turns upwards about -y here: the weight's moment about that axis is against the torque that holds it.
        const torques = loads.map(({ moment }, i) => -dot(moment, now.joints[i]!.axis));
        near(torques[0]!, example.torque1, example.tolerance);
        near(torques[1]!, example.torque2, example.tolerance);
        near(size(loads[0]!.force), example.force1, example.tolerance);
        near(size(loads[1]!.force), example.force2, example.tolerance);
      }
    });
  }
});

function twoLinkArm({ m1, m2, l1, c1, c2, g }: (typeof TWO_LINK_ARMS)[number]): Arm {
  const base = randomArm(1, { joints: 2 });
  const eye = [1, 0, 0, 0, 1, 0, 0, 0, 1] as const;
  const joint = (x: number, mass: number, centre: number) => ({
    ...base.joints[0]!,
    placement: { position: [x, 0, 0] as const, rotation: eye },
    axis: [0, -1, 0] as const,
    link: { name: 'link', mass, centre: [centre, 0, 0] as const, inertia: null },
  });
  return {
    ...base,
    gravity: [0, 0, -g],
    joints: [joint(0, m1, c1), joint(l1, m2, c2)],
    tip: { position: [0.3, 0, 0], rotation: eye },
    cases: [{ name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 }],
  };
}
