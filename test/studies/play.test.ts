import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import type { ArmFile, RollingFile } from '../../src/arm/armFile.ts';
import { isRingParts, jointParts } from '../../src/capacity/index.ts';
import { bentAxis, pointShift, ringLever, ringPlayTilt, ringTiltStiffness } from '../../src/capacity/play/index.ts';
import { bareBearing } from '../../src/capacity/rolling/index.ts';
import { jointShaft, shaftSupports } from '../../src/capacity/shaft/index.ts';
import { seededRandom } from '../../src/math/random.ts';
import { shaftLoads } from '../../src/mechanics/beamForms.ts';
import { solveShaft } from '../../src/mechanics/beamStepped.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { poseScratch, staticLoads, tipReach } from '../../src/mechanics/newtonEuler.ts';
import { pointSets } from '../../src/mechanics/travelBounds.ts';
import { armGives, playStudy, tipErrorAt } from '../../src/studies/play.ts';
import { lawAt, reachBound, straightPieces } from '../../src/studies/playReach.ts';
import { playRows } from '../../src/studies/playRows.ts';
import { TipErrors } from '../../src/studies/playTip.ts';
import { randomArm } from '../randomArm.ts';
import { armOf, G, spit } from './smallArms.ts';

const MICRON = 1e-6;

function bearing(clearance: number, stiffness: number | null = 100): RollingFile {
  return {
    kind: 'deep-groove',
    bore_mm: 20,
    outer_mm: 42,
    width_mm: 12,
    C_N: 9400,
    C0_N: 5000,
    clearance_um: [clearance, clearance],
    ...(stiffness === null ? {} : { stiffness_N_um: stiffness }),
  };
}

const SHAFT = { diameter_mm: 40, material: 'steel-c45' } as const;

interface Two {
  readonly one?: RollingFile;
  readonly two?: RollingFile;
  readonly targets?: ArmFile['targets'];
  readonly diameter?: number;
}

/**
 * Two level axes along y, 0.4 m apart; the tip 0.3 m further and 0.2 m to the side, a weight of 100 N there and nothing else. Spans 0.1 and
 * 0.06 m, plays 20 and 30 µm.
 */
function sideways({ one = bearing(20), two = bearing(30), targets, diameter = 40 }: Two = {}): ArmFile {
  const joint = (name: string, x: number, span: number, key: string, travel: [number, number]) => ({
    name,
    kind: 'revolute' as const,
    origin_mm: [x, 0, 0] as [number, number, number],
    axis: [0, 1, 0] as [number, number, number],
    travel_deg: travel,
    link: { name: `${name} link`, mass_kg: 0, centre_mm: [0, 0, 0] as [number, number, number] },
    support: {
      arrangement: 'clevis' as const,
      hub_mm: 0,
      span_mm: span,
      thrust: 'A' as const,
      bearings: { A: key, B: key },
      shaft: { ...SHAFT, diameter_mm: diameter },
    },
  });
  return {
    armload: 1,
    name: 'sideways',
    gravity_m_s2: [0, 0, -G],
    joints: [joint('first', 0, 100, 'one', [-90, 90]), joint('second', 400, 60, 'two', [-90, 90])],
    tip: { origin_mm: [300, 200, 0] },
    cases: [{ name: 'hung', payload: { mass_kg: 100 / G, centre_mm: [0, 0, 0] } }],
    bearings: { one, two },
    ...(targets ? { targets } : {}),
  };
}

function ready(file: ArmFile) {
  const arm = armOf(file);
  return { arm, chain: flattenArm(arm) };
}

/** Forces on springs and no more: the shaft as stiff as it comes. */
function at(file: ArmFile, pose: readonly number[]) {
  const { arm, chain } = ready(file);
  return tipErrorAt(arm, chain, pose, chain.cases[0]!);
}

describe('play by hand on two joints', () => {
  // The weight at 0.2 m lies beyond B, so A is pushed up and B down: journals 10 µm up and down on a span of 0.1 m lean 200 µm/m, at
  // 0.2 m -10 - 200·0.15 = -40 µm; the second 15 µm on 0.06 m lean 500 µm/m: -15 - 500·0.17 = -100 µm.
  it('stretched out level: 40 and 100 µm down, 140 together', () => {
    const found = at(sideways(), [0, 0]);
    expect(found.joints[0]!.play![2] / MICRON).toBeCloseTo(-40, 9);
    expect(found.joints[1]!.play![2] / MICRON).toBeCloseTo(-100, 9);
    expect(found.play / MICRON).toBeCloseTo(140, 9);
    expect(found.joints[0]!.play![0]).toBeCloseTo(0, 15);
    expect(found.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(found.total, 15);
  });

  it('the second link hanging down: its lean also moves the tip 500 µm/m · 0.3 m = 150 µm along the axis', () => {
    const found = at(sideways(), [0, Math.PI / 2]);
    const [x, y, z] = found.joints[1]!.play!;
    expect(x / MICRON).toBeCloseTo(0, 9);
    expect(Math.abs(y) / MICRON).toBeCloseTo(150, 9);
    expect(z / MICRON).toBeCloseTo(-100, 9);
    // The first joint leans 200 µm/m; the tip lies 0.3 m below it.
    expect(Math.abs(found.joints[0]!.play![1]) / MICRON).toBeCloseTo(60, 9);
  });

  it('over the travel: bounds √(40² + (200·0.7)²) and √(100² + 150²) µm, within the polygon’s 0.7 %', () => {
    const { arm, chain } = ready(sideways());
    const result = playStudy(arm, chain);
    const exact = [Math.hypot(40, 140), Math.hypot(100, 150)].map((v) => v * MICRON);
    result.joints.forEach((joint, i) => {
      expect(joint.playBound! / exact[i]!).toBeGreaterThan(1 - 1e-9);
      expect(joint.playBound! / exact[i]!).toBeLessThan(1.008);
    });
    expect(result.joints[0]!.tilt).toBeCloseTo(200 * MICRON, 15);
    expect(result.joints[1]!.tilt).toBeCloseTo(500 * MICRON, 15);
    // Attained with both links straight down, where both lean the same way: 140 µm down, 0.7·200 + 0.3·500 along.
    expect(result.tip.play / MICRON).toBeCloseTo(Math.hypot(140, 290), 1);
  });

  it('no clearance, no play; twice the clearance, twice the play', () => {
    const none = at(sideways({ one: bearing(0), two: bearing(0) }), [0.3, -0.4]);
    expect(none.play).toBe(0);
    const { arm, chain } = ready(sideways({ one: bearing(0), two: bearing(0) }));
    const result = playStudy(arm, chain);
    expect(result.joints.map((joint) => [joint.tilt, joint.playBound])).toEqual([
      [0, 0],
      [0, 0],
    ]);
    const single = at(sideways(), [0.3, -0.4]);
    const double = at(sideways({ one: bearing(40), two: bearing(60) }), [0.3, -0.4]);
    expect(double.play / single.play).toBeCloseTo(2, 12);
  });
});

describe('springing', () => {
  it('of bearings by hand: 150 N up on A and 250 N down on B, at 100 N/µm: -1.5 … -2.5 - 40·0.15 µm', () => {
    // A shaft of 400 mm bends next to nothing.
    const found = at(sideways({ diameter: 400 }), [0, 0]);
    // first: A +1.5 µm, B -2.5 µm on 0.1 m: at 0.2 m -2.5 - 40·0.15 = -8.5 µm
    expect(found.joints[0]!.spring![2] / MICRON).toBeCloseTo(-8.5, 1);
    // second, stations ±0.03: A 100·(0.03 - 0.2)/0.06 = -283.3 N, B 383.3 N: -3.833 - 111.1·0.17 = -22.72 µm
    expect(found.joints[1]!.spring![2] / MICRON).toBeCloseTo(-22.72, 1);
  });

  it('of bearings and shaft is that of the beam on elastic supports (random arms, seeds 1–15)', () => {
    const stiffness = 80e6;
    for (let seed = 1; seed <= 15; seed++) {
      const arm = sprung(randomArm(seed, { joints: 2, drives: seed % 2 === 0 }), stiffness);
      const chain = flattenArm(arm);
      const w = new Float64Array(WRENCH * chain.n);
      const pose = Float64Array.from(chain.from, (from, j) => (from + 2 * chain.to[j]!) / 3);
      staticLoads(chain, chain.cases[0]!, pose, w, poseScratch(chain.n));
      for (const give of armGives(arm, chain)) {
        const parts = jointParts(arm, chain, give.joint)!;
        if (isRingParts(parts) || 'unassessed' in give.spring) throw new Error('no pair');
        const found = give.spring.value.at(w, WRENCH * give.joint);
        const shaft = jointShaft(parts.part, shaftSupports(parts.support, [stiffness, stiffness]));
        if ('unassessed' in shaft) throw new Error(shaft.unassessed);
        const solved = solveShaft(shaft.value.beam, shaftLoads(shaft.value.loading, w, WRENCH * give.joint));
        if ('unassessed' in solved) throw new Error(solved.unassessed);
        const beam = bentAxis(solved, parts.support.hub);
        if ('unassessed' in beam) throw new Error(beam.unassessed);
        const scale = Math.hypot(...beam.value.shift) + 0.1 * Math.hypot(...beam.value.lean);
        const reach = [0.1, -0.2, parts.support.hub + 0.3] as const;
        pointShift(found, reach).forEach((value, i) => {
          expect(Math.abs(value - pointShift(beam.value, reach)[i]!) / scale).toBeLessThan(1e-6);
        });
      }
    }
  });

  it('stiffer bearings spring less, down to the shaft alone; a stiffer shaft less again', () => {
    const spring = (stiffness: number, diameter: number) =>
      at(sideways({ one: bearing(20, stiffness), two: bearing(30, stiffness), diameter }), [0.2, 0.3]).spring;
    const falling = [10, 100, 1000, 1e6, 1e9].map((stiffness) => spring(stiffness, 40));
    for (let k = 1; k < falling.length; k++) expect(falling[k]!).toBeLessThan(falling[k - 1]!);
    expect(falling[4]! / falling[3]!).toBeCloseTo(1, 2);
    expect(spring(1e9, 400)).toBeLessThan(1e-2 * falling[4]!);
    expect(spring(1e9, 4000)).toBeLessThan(1e-9);
  });

  it('an estimated stiffness gives way with the two-thirds power of the load', () => {
    const heavy = (factor: number) => {
      const file = sideways({ one: bearing(20, null), two: bearing(30, null), diameter: 400 });
      return at({ ...file, cases: [{ ...file.cases![0]!, factor }] }, [0, 0]).spring;
    };
    expect(heavy(8) / heavy(1)).toBeCloseTo(4, 2);
  });
});

/** Bearings with clearance and stiffness, and a shaft, on every pair of a random arm. */
function sprung(arm: Arm, stiffness: number): Arm {
  const one = {
    ...bareBearing('deep-groove', 0.02, 0.042, 0.012),
    C: 9400,
    C0: 5000,
    stiffness,
    clearance: { from: 10 * MICRON, to: 25 * MICRON },
  };
  const shaft = {
    diameter: 0.02,
    bore: 0.005,
    material: 'steel-c45',
    turnsWith: 'link',
    finish: 'machined',
    sections: [],
  } as const;
  return {
    ...arm,
    bearings: { one },
    joints: arm.joints.map((joint) => {
      const { support } = joint;
      if (!support || support.arrangement === 'ring') return joint;
      return { ...joint, support: { ...support, bearingA: 'one', bearingB: 'one', shaft } };
    }),
  };
}

describe('the tip over the travel', () => {
  it('no pose, case or direction of a free force exceeds the bound; what is found is attained (seeds 1–16)', () => {
    let tightest = 0;
    for (let seed = 1; seed <= 16; seed++) {
      const force = (['none', 'base', 'any', 'tool'] as const)[seed % 4]!;
      const arm = sprung(randomArm(seed, { joints: 1 + (seed % 4), force, drives: seed % 3 === 0 }), 60e6);
      const chain = flattenArm(arm);
      const { tip, joints } = playStudy(arm, chain, { poses: 300 });
      expect(joints.every((joint) => joint.unassessed.length === 0)).toBe(true);
      const random = seededRandom(seed);
      const gives = armGives(arm, chain);
      const errors = new TipErrors(chain, chain.cases[0]!, gives);
      for (let draw = 0; draw < 300; draw++) {
        const pose = Float64Array.from(chain.from, (from, j) => random.between(from, chain.to[j]!));
        const found = errors.at(pose, force === 'any' ? random.direction() : null);
        expect(found.total).toBeLessThanOrEqual(tip.bound!);
        gives.forEach((give, k) => {
          const { play, spring, undecided } = found.joints[k]!;
          expect(Math.hypot(...play!) + undecided).toBeLessThanOrEqual(joints[give.joint]!.playBound!);
          expect(Math.hypot(...spring!)).toBeLessThanOrEqual(joints[give.joint]!.springBound!);
        });
      }
      const again = tipErrorAt(arm, chain, tip.pose, chain.cases[0]!, tip.tipForce);
      expect(again.total / tip.found!).toBeCloseTo(1, 12);
      expect(tip.found!).toBeLessThanOrEqual(tip.bound!);
      tightest = Math.max(tightest, tip.found! / tip.bound!);
      expect(joints.reduce((sum, joint) => sum + joint.share, 0)).toBeCloseTo(tip.found!, 12);
    }
    expect(tightest).toBeGreaterThan(0.8);
  });

  it('the largest way of a law within reach is met to the polygon’s 0.7 % (seeds 1–12)', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const chain = flattenArm(randomArm(seed, { joints: 1 + (seed % 3), full: 0.5 }));
      const sets = pointSets(chain, chain.n - 1, chain.tipOrigin);
      const random = seededRandom(seed);
      const law = {
        constant: random.next() * 1e-5,
        terms: [1, 2, 3].map(() => ({ station: random.between(-0.2, 0.2), weight: random.next() * 1e-4 })),
        along: random.next() * 1e-4,
      };
      const reach = new Float64Array(3 * chain.n);
      let most = 0;
      for (let draw = 0; draw < 4000; draw++) {
        const pose = Float64Array.from(chain.from, (from, j) => random.between(from, chain.to[j]!));
        tipReach(chain, pose, reach, poseScratch(chain.n));
        most = Math.max(most, lawAt(law, reach[2]!, Math.hypot(reach[0]!, reach[1]!)));
      }
      const bound = reachBound(sets, 0, law);
      expect(most).toBeLessThanOrEqual(bound);
      expect(most).toBeGreaterThan(0.95 * bound);
    }
  });

  it('the straight pieces of a law are the law: their largest at any height', () => {
    const law = {
      constant: 2,
      terms: [
        { station: 1, weight: 3 },
        { station: -2, weight: 1 },
      ],
      along: 0,
    };
    const pieces = straightPieces(law);
    for (let z = -5; z <= 5; z += 0.25) {
      const largest = Math.max(...pieces.map(({ slope, at0 }) => slope * z + at0));
      expect(largest).toBeCloseTo(2 + 3 * Math.abs(z - 1) + Math.abs(z + 2), 12);
    }
    const chain = flattenArm(randomArm(1, { joints: 1 }));
    const sets = pointSets(chain, 0, chain.tipOrigin);
    expect(reachBound(sets, 0, { ...law, constant: Number.NaN })).toBe(Number.POSITIVE_INFINITY);
  });
});

describe('rings', () => {
  it('tilt from play c/(d tan α) and stiffness k (d/2)² tan² α, by hand on 100 mm at 45°', () => {
    const ring = { ...bareBearing('crossed-roller', 0.08, 0.12, 0.013), contactAngle: Math.PI / 4 };
    const lever = ringLever(ring);
    if ('unassessed' in lever) throw new Error(lever.unassessed);
    expect(lever.value).toBeCloseTo(0.05, 12);
    expect(ringPlayTilt(20 * MICRON, lever.value)).toEqual({ value: expect.closeTo(200 * MICRON, 12) });
    expect(ringTiltStiffness(200e6, lever.value)).toEqual({ value: expect.closeTo(500e3, 3) });
    expect(ringTiltStiffness(0, lever.value)).toHaveProperty('unassessed');
    expect(ringPlayTilt(Number.NaN, lever.value)).toHaveProperty('unassessed');
    expect(ringLever(bareBearing('deep-groove', 0.02, 0.042, 0.012))).toHaveProperty('unassessed');
  });

  it('summed over springs all round gives the same tilt stiffness', () => {
    const [k, d, alpha, Z] = [200e6, 0.1, 0.6, 40];
    // Each contact has k_n; radial: Σ k_n cos² α cos² φ = k.
    const kn = k / ((Z / 2) * Math.cos(alpha) ** 2);
    let tilting = 0;
    for (let i = 0; i < Z; i++) {
      const phi = (2 * Math.PI * i) / Z;
      tilting += kn * ((d / 2) * Math.sin(alpha) * Math.cos(phi)) ** 2;
    }
    const found = ringTiltStiffness(k, (d / 2) * Math.tan(alpha));
    expect('value' in found && found.value / tilting).toBeCloseTo(1, 12);
  });
});

describe('lost motion', () => {
  it('a load that stays down keeps its journal; one that turns all the way takes it right across', () => {
    const measured: RollingFile = bearing(18);
    const down = ready(spit({ bearing: measured }));
    const still = playStudy(down.arm, down.chain).joints[0]!.motion;
    expect(still.map((side) => [side.reverses, side.shift! < 1e-12])).toEqual([
      [false, true],
      [false, true],
    ]);
    const turning = ready(
      spit({
        bearing: measured,
        cases: [{ name: 'own weight', tip_force: { force_N: 5000, direction: { tool: [0, 0, -1] } } }],
      }),
    );
    const [side] = playStudy(turning.arm, turning.chain).joints[0]!.motion;
    expect(side!.reverses).toBe(true);
    expect(side!.shift! / (18 * MICRON)).toBeCloseTo(1, 4);
    expect(Math.abs(side!.from!.pose[0]! - side!.to!.pose[0]!)).toBeGreaterThan(2);
  });

  it('a tip force that may point anywhere takes the journal right across where it outweighs what holds it, and not where it does not', () => {
    const pushed = (force_N: number) => {
      const { arm, chain } = ready(
        spit({
          bearing: bearing(18),
          cases: [{ name: 'own weight', tip_force: { force_N, direction: 'any' } }],
        }),
      );
      const play = playStudy(arm, chain);
      const row = playRows(arm, play).find((one) => one.check === 'lost motion')!;
      return { side: play.joints[0]!.motion[0]!, row };
    };
    const strong = pushed(5000);
    expect(strong.side).toMatchObject({ reverses: true, free: true });
    expect(strong.side.shift! / (18 * MICRON)).toBeCloseTo(1, 4);
    expect(strong.row.source).toContain('changes side');
    const weak = pushed(500);
    expect(weak.side.reverses).toBe(false);
    // 500 N across 2000 N at most: asin(1/4) either way; 45° up and across, of the directions looked at, next to it.
    expect(weak.side.turn!).toBeLessThanOrEqual(2 * Math.asin(0.25) + 1e-9);
    expect(weak.side.turn!).toBeGreaterThan(1.9 * Math.atan(0.25));
    for (const { row } of [strong, weak]) expect(row.reason).toContain('left out');
    expect(weak.row.source).not.toContain('keeps its side');
  });

  it('with motion in a case never says that the load keeps its side', () => {
    const lost = (motion: boolean) => {
      const moving = motion ? { motion: { speed_deg_s: [100], accel_deg_s2: [500] } } : {};
      const inertia_kg_m2 = { xx: 1, yy: 1, zz: 1, xy: 0, xz: 0, yz: 0 };
      const link = { name: 'roast', mass_kg: 200, centre_mm: [0, 0, 0] as [number, number, number], inertia_kg_m2 };
      const cases = [{ name: 'own weight', ...moving }];
      const { arm, chain } = ready(spit({ bearing: bearing(18), cases, joint: { link } }));
      return playRows(arm, playStudy(arm, chain)).filter((one) => one.check === 'lost motion');
    };
    expect(lost(true).length).toBe(2);
    for (const row of lost(true)) {
      expect(row.source).not.toContain('keeps its side');
      expect(row.reason).toContain('left out');
      expect(row.verdict).toBeNull();
    }
    for (const row of lost(false)) expect([row.source, row.reason]).toEqual(['the load keeps its side', null]);
  });

  it('along a path: where a load as large as the weight and fixed in the link passes 180°', () => {
    // The load is 2 W cos(q/2) at the angle q/2: at 180° it is nought and then points the other way.
    const file = spit({
      bearing: bearing(18),
      travel: [90, 270],
      cases: [{ name: 'own weight', tip_force: { force_N: 2000, direction: { tool: [0, 0, -1] } } }],
      duty: [
        {
          case: 'own weight',
          share: 1,
          path: Array.from({ length: 41 }, (_, k) => ({
            time_s: k / 10,
            pose_deg: [180 - 45 * Math.cos((2 * Math.PI * k) / 40)],
          })),
        },
      ],
    });
    const { arm, chain } = ready(file);
    const [side] = playStudy(arm, chain).joints[0]!.motion;
    expect(side!.onPath.length).toBe(2);
    expect(side!.onPath[0]!.time).toBeCloseTo(1, 1);
    expect(side!.onPath[1]!.time).toBeCloseTo(3, 1);
    expect(side!.reverses).toBe(true);
  });
});

describe('rows', () => {
  it('pass by the bound alone: over where it is attained, unassessed in between', () => {
    const verdict = (tip_error_mm: number) => {
      const { arm, chain } = ready(sideways({ targets: { tip_error_mm } }));
      return playRows(arm, playStudy(arm, chain)).at(-1)!;
    };
    const row = verdict(1);
    expect(row).toMatchObject({ check: 'tip error', unit: 'm', joint: 'sideways', jointIndex: -1, case: 'hung' });
    const [found, bound] = [1000 * row.value, 1000 * row.bound!];
    expect(bound).toBeGreaterThan(found * 1.01);
    expect(verdict(bound * 1.001).verdict).toBe('pass');
    expect(verdict((bound + found) / 2)).toMatchObject({ verdict: 'unassessed' });
    expect(verdict(found * 0.99).verdict).toBe('over');
    expect(row.utilisation).toBeCloseTo(bound, 6);
  });

  it('say what is missing and never pass without it', () => {
    const bare: RollingFile = {
      kind: 'angular-contact',
      bore_mm: 20,
      outer_mm: 42,
      width_mm: 12,
      contact_angle_deg: 25,
    };
    const { arm, chain } = ready(sideways({ two: bare, targets: { tip_error_mm: 100 } }));
    const list = playRows(arm, playStudy(arm, chain));
    const tip = list.at(-1)!;
    expect(tip.verdict).toBe('unassessed');
    expect(tip.reason).toContain('second: play');
    expect(tip.reason).toContain('clearance');
    expect(Number.isNaN(tip.value)).toBe(true);
    const tilts = list.filter((row) => row.check === 'play tilt');
    expect(tilts.map((row) => row.verdict)).toEqual([null, 'unassessed']);
    const untargeted = ready(sideways());
    const open = playRows(untargeted.arm, playStudy(untargeted.arm, untargeted.chain)).at(-1)!;
    expect(open).toMatchObject({ verdict: 'unassessed' });
    expect(open.reason).toContain('tip_error_mm');
    expect(open.value).toBeGreaterThan(0);
  });

  it('tell of a joint without support, and of a shaft without material', () => {
    const file = sideways({ targets: { tip_error_mm: 100 } });
    const [first, second] = file.joints;
    const { support: _, ...bare } = second as Extract<typeof second, { kind: 'revolute' }>;
    const without = ready({ ...file, joints: [first!, bare] });
    const tip = playRows(without.arm, playStudy(without.arm, without.chain)).at(-1)!;
    expect(tip.verdict).toBe('unassessed');
    expect(tip.reason).toContain('second: the joint has no bearings');
    const arm = armOf(file);
    const joints = arm.joints.map((joint) => {
      const pair = joint.support;
      return pair?.shaft ? { ...joint, support: { ...pair, shaft: { ...pair.shaft, material: null } } } : joint;
    });
    const soft = { ...arm, joints };
    const open = playRows(soft, playStudy(soft)).at(-1)!;
    expect(open.verdict).toBe('unassessed');
    expect(open.reason).toContain('first: stiffness: the shaft names no material');
  });
});
