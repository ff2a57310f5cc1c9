import { describe, expect, it } from 'vitest';
import type { Arm, LoadCase } from '../../src/arm/arm.ts';
import type { ArmFile } from '../../src/arm/armFile.ts';
import { type DutyPart, dutyPart } from '../../src/capacity/duty/index.ts';
import { jointParts } from '../../src/capacity/index.ts';
import { bareBearing } from '../../src/capacity/rolling/index.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { anyTorque, checkValue } from '../../src/mechanics/form.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { dynamicLoads, poseScratch } from '../../src/mechanics/newtonEuler.ts';
import { sphereBounds } from '../../src/mechanics/travelBounds.ts';
import { travelLoads } from '../../src/studies/dutyTravel.ts';
import { randomArm } from '../randomArm.ts';
import { armOf } from '../studies/smallArms.ts';

const ball = { ...bareBearing('deep-groove', 0.02, 0.042, 0.012), C: 9400, C0: 5000 };
const angular = { ...bareBearing('angular-contact', 0.02, 0.042, 0.012, Math.PI / 12), C: 10000, C0: 6000 };
const crossed = { ...bareBearing('crossed-roller', 0.08, 0.12, 0.013), C: 15000, C0: 21000 };

/** Bearings on every pair: deep groove, adjusted angular contact and rings in turn. */
function withBearings(arm: Arm): Arm {
  return {
    ...arm,
    bearings: { ball, angular, crossed },
    joints: arm.joints.map((joint, k) => {
      const { support } = joint;
      if (!support || support.arrangement === 'ring') return joint;
      if (k % 3 === 2) {
        const ring = {
          arrangement: 'ring',
          hub: support.hub,
          station: support.stationA,
          bearing: 'crossed',
          shaft: null,
        };
        return { ...joint, support: ring as never };
      }
      const name = k % 3 === 1 ? 'angular' : 'ball';
      const adjusted = k % 3 === 1 ? ('back-to-back' as const) : null;
      return { ...joint, support: { ...support, adjusted, bearingA: name, bearingB: name } };
    }),
  };
}

function partsOf(arm: Arm): { readonly parts: readonly DutyPart[]; readonly chain: ReturnType<typeof flattenArm> } {
  const chain = flattenArm(arm);
  const parts = chain.jointIndex.flatMap((_, joint) => {
    const one = jointParts(arm, chain, joint);
    if (!one) return [];
    const sides = one.support.arrangement === 'ring' ? (['ring'] as const) : (['A', 'B'] as const);
    return sides.flatMap((side) => {
      const part = dutyPart(one, side);
      return 'value' in part ? [part.value] : [];
    });
  });
  return { parts, chain };
}

/** A pose, motion and tip force that the case allows, by chance; limits are met often. */
function drawn(load: LoadCase, chain: ReturnType<typeof flattenArm>, random: ReturnType<typeof seededRandom>) {
  const limit = () => (random.next() < 0.6 ? (random.next() < 0.5 ? -1 : 1) : random.between(-1, 1));
  return {
    pose: Float64Array.from(chain.from, (from, j) => random.between(from, chain.to[j]!)),
    rates: {
      speed: Float64Array.from(chain.from, (_, j) => limit() * (load.motion?.speed[j] ?? 0)),
      accel: Float64Array.from(chain.from, (_, j) => limit() * (load.motion?.accel[j] ?? 0)),
    },
    force: load.tipForce?.direction === 'any' ? random.direction() : null,
  };
}

const KINDS = [
  { force: 'none', motion: false },
  { force: 'any', motion: false },
  { force: 'base', motion: false },
  { force: 'tool', motion: true },
  { force: 'none', motion: true },
  { force: 'any', motion: true },
] as const;

describe('bounds over the travel', () => {
  it('are exceeded by no pose, motion or tip force that the case allows (seeds 1–36, 400 draws each)', () => {
    let tightest = 0;
    for (let seed = 1; seed <= 36; seed++) {
      const kind = KINDS[seed % KINDS.length]!;
      const arm = withBearings(
        randomArm(seed, {
          joints: 1 + (seed % 5),
          drives: seed % 4 === 0,
          parallel: seed % 5 === 0 ? 0.8 : 0.15,
          ...kind,
        }),
      );
      const { parts, chain } = partsOf(arm);
      const load = chain.cases[0]!;
      const checks = parts.flatMap((part) => part.sizes);
      const bounds = sphereBounds(chain, load, checks);
      const random = seededRandom(seed);
      const w = new Float64Array(WRENCH * chain.n);
      const scratch = poseScratch(chain.n);
      const most = checks.map(() => Number.NEGATIVE_INFINITY);
      for (let draw = 0; draw < 400; draw++) {
        const { pose, rates, force } = drawn(arm.cases[0]!, chain, random);
        dynamicLoads(chain, load, pose, rates, w, scratch, force);
        checks.forEach((check, c) => {
          most[c] = Math.max(most[c]!, checkValue(check, w, WRENCH * check.joint));
        });
      }
      checks.forEach((_, c) => {
        const slack = 1e-9 * Math.max(1, Math.abs(bounds[c]!));
        expect(most[c]!).toBeLessThanOrEqual(bounds[c]! + slack);
        if (bounds[c]! > 1e-6) tightest = Math.max(tightest, most[c]! / bounds[c]!);
      });
    }
    // A bound that nothing comes near would say nothing.
    expect(tightest).toBeGreaterThan(0.95);
  });

  it('stay within a third of what is found where only the direction of a tip force is free (seeds 1–8)', () => {
    for (let seed = 1; seed <= 8; seed++) {
      const arm = withBearings(randomArm(seed, { joints: 2 + (seed % 3), force: 'any' }));
      const { parts, chain } = partsOf(arm);
      for (const { bound, found } of travelLoads(chain, chain.cases[0]!, parts, sphereBounds)) {
        expect(bound).toBeGreaterThanOrEqual(found);
        expect(found).toBeGreaterThan(0.5 * bound);
      }
    }
  });
});

describe('bounds of motion by hand', () => {
  it('two links stretched out at full speed: m (ω1² (L1 + L2) + 2 ω1 ω2 L2 + ω2² L2), met but for the polygon (0.5 %)', () => {
    const [m, L1, L2, w1, w2] = [3, 0.4, 0.3, 5, 7];
    const joint = (name: string, x: number): ArmFile['joints'][number] => ({
      name,
      kind: 'revolute',
      origin_mm: [1000 * x, 0, 0],
      axis: [0, 0, 1],
      travel_deg: [-90, 90],
      link: {
        name: `${name} link`,
        mass_kg: 0,
        centre_mm: [0, 0, 0],
        inertia_kg_m2: { xx: 0, yy: 0, zz: 0, xy: 0, xz: 0, yz: 0 },
      },
      support: { arrangement: 'clevis', hub_mm: 0, span_mm: 100, thrust: 'A' },
    });
    const arm = armOf({
      armload: 1,
      name: 'two links',
      gravity_m_s2: [0, 0, 0],
      joints: [joint('first', 0), joint('second', L1)],
      tip: { origin_mm: [1000 * L2, 0, 0] },
      cases: [
        {
          name: 'spin',
          payload: { mass_kg: m, centre_mm: [0, 0, 0] },
          motion: { speed_deg_s: [w1, w2].map((w) => (w * 180) / Math.PI), accel_deg_s2: [0, 0] },
        },
      ],
    });
    const chain = flattenArm(arm);
    const checks = loadChecks(arm, chain).filter((check) => check.check === 'radial' && check.joint === 0);
    const force = m * (w1 * w1 * (L1 + L2) + 2 * w1 * w2 * L2 + w2 * w2 * L2);
    const bounds = sphereBounds(chain, chain.cases[0]!, checks);
    expect(bounds.length).toBe(2);
    for (const bound of bounds) {
      expect(bound / (force / 2)).toBeGreaterThanOrEqual(1 - 1e-9);
      expect(bound / (force / 2)).toBeLessThan(1.02);
    }
    const w = new Float64Array(WRENCH * 2);
    const rates = { speed: [w1, w2], accel: [0, 0] };
    dynamicLoads(chain, chain.cases[0]!, [0, 0], rates, w, poseScratch(2));
    expect(checkValue(checks[0]!, w, 0) / (force / 2)).toBeCloseTo(1, 9);
  });
});

describe('a load from the largest of its sizes', () => {
  it('is never below the load of any set within them, for pairs, adjusted pairs and rings (seeds 1–20, 200 draws each)', () => {
    let met = 0;
    for (let seed = 1; seed <= 20; seed++) {
      const arm = withBearings(randomArm(seed, { joints: 3, force: 'any', motion: true, drives: seed % 2 === 0 }));
      const { parts, chain } = partsOf(arm);
      const load = chain.cases[0]!;
      const random = seededRandom(100 + seed);
      const w = new Float64Array(WRENCH * chain.n);
      const scratch = poseScratch(chain.n);
      const seen: Float64Array[] = [];
      for (let draw = 0; draw < 200; draw++) {
        const { pose, rates, force } = drawn(arm.cases[0]!, chain, random);
        dynamicLoads(chain, load, pose, rates, w, scratch, force);
        seen.push(w.slice());
      }
      for (const part of parts) {
        const at = WRENCH * part.joint;
        const sizes = part.sizes.map((check) => Math.max(...seen.map((one) => checkValue(check, one, at))));
        const upper = part.fromSizes(sizes, 0);
        const most = Math.max(...seen.map((one) => part.at(one, at)));
        expect(most).toBeLessThanOrEqual(upper * (1 + 1e-12));
        if (most > 0.8 * upper) met++;
        for (const check of part.sizes) {
          const free = anyTorque(check);
          for (const one of seen) expect(checkValue(free, one, at)).toBeGreaterThanOrEqual(checkValue(check, one, at));
        }
      }
    }
    expect(met).toBeGreaterThan(20);
  });

  it('of one load alone is that load', () => {
    const arm = withBearings(randomArm(4, { joints: 3 }));
    const { parts, chain } = partsOf(arm);
    const w = new Float64Array(WRENCH * chain.n);
    const pose = Float64Array.from(chain.from, (from, j) => (from + chain.to[j]!) / 2);
    const rest = new Float64Array(chain.n);
    dynamicLoads(chain, chain.cases[0]!, pose, { speed: rest, accel: rest }, w, poseScratch(chain.n));
    expect(parts.length).toBe(5);
    for (const part of parts) {
      const at = WRENCH * part.joint;
      const sizes = part.sizes.map((check) => checkValue(check, w, at));
      expect(part.fromSizes(sizes, 0) / part.at(w, at)).toBeCloseTo(1, 12);
    }
  });
});
