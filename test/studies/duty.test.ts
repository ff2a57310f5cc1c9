import { describe, expect, it } from 'vitest';
import type { ArmFile, BearingFile, SegmentFile } from '../../src/arm/armFile.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { sphereBounds, type TravelBounds } from '../../src/mechanics/travelBounds.ts';
import { dutyStudy } from '../../src/studies/duty.ts';
import type { DutyBearing, DutyResult } from '../../src/studies/dutyResult.ts';
import { dutyRows } from '../../src/studies/dutyRows.ts';
import { armOf, BALL, G, sinePath, spit, turnPath } from './smallArms.ts';

const HOUR = 3600;

function study(file: ArmFile): DutyResult {
  const duty = dutyStudy(armOf(file));
  if (!duty) throw new Error('no duty');
  return duty;
}

function lives(file: ArmFile): number[] {
  return study(file).bearings.map((one) => {
    if (!one.life) throw new Error(one.unassessed ?? 'no life');
    return one.life.basic / HOUR;
  });
}

function loads(file: ArmFile): number[] {
  return study(file).bearings.map((one) => one.life?.load ?? Number.NaN);
}

function rows(file: ArmFile) {
  const arm = armOf(file);
  const chain = flattenArm(arm);
  return dutyRows(arm, chain, dutyStudy(arm, chain));
}

const whole = (part: Pick<SegmentFile, 'path' | 'anywhere'>): SegmentFile[] => [
  { case: 'own weight', share: 1, ...part },
];

describe('duty, from the arm file to hours', () => {
  it('a swing of ±30° once a second under 1000 N: 20 equivalent rpm, 833 333 h (recomputed example), along a path and anywhere', () => {
    const path = spit({ duty: whole({ path: sinePath(30, 1) }) });
    const anywhere = spit({ travel: [-30, 30], duty: whole({ anywhere: { cycles_per_min: [60] } }) });
    for (const file of [path, anywhere]) {
      const [one] = study(file).bearings;
      expect(one!.segments[0]!.turning * 60).toBeCloseTo(20, 4);
      expect(one!.life!.load).toBeCloseTo(1000, 3);
      for (const hours of lives(file)) expect(hours / 833333.3).toBeCloseTo(1, 5);
    }
  });

  it('a swing of ±90° every 2 s: 30 equivalent rpm, 555 556 h (recomputed example)', () => {
    for (const hours of lives(spit({ duty: whole({ path: sinePath(90, 2) }) }))) {
      expect(hours / 555555.6).toBeCloseTo(1, 5);
    }
  });

  it('3, 4 and 5 kN at 1440, 1080 and 720 rpm for 1/4, 1/2, 1/4 of the time: P 3954 N, 10 000 h (Jindal, example 18-9; verified)', () => {
    const file = spit({
      mass: 2000 / G,
      bearing: { ...BALL, C_N: 34218.89, C0_N: 20000 },
      cases: [3, 4, 5].map((factor) => ({ name: `${factor} kN`, factor })),
      duty: [
        { case: '3 kN', share: 0.25, path: turnPath(60 / 1440) },
        { case: '4 kN', share: 0.5, path: turnPath(60 / 1080) },
        { case: '5 kN', share: 0.25, path: turnPath(60 / 720) },
      ],
    });
    const [one] = study(file).bearings;
    expect(one!.life!.load / 3954.342).toBeCloseTo(1, 5);
    expect(one!.life!.turning * 60).toBeCloseTo(1080, 6);
    for (const hours of lives(file)) expect(hours / 10000).toBeCloseTo(1, 4);
  });

  it('10 676 N at 1750 rpm on C 22 464 N: 88.73 h (Wentzell, example 20.1; verified), under a constant load by the plain formula', () => {
    const file = spit({
      mass: (2 * 10675.73) / G,
      bearing: { ...BALL, C_N: 22463.52, C0_N: 12000 },
      duty: whole({ path: turnPath(60 / 1750) }),
    });
    for (const hours of lives(file)) expect(hours / 88.72604).toBeCloseTo(1, 5);
  });

  it('a load that goes with the sine of the angle: the integral by its closed form, for balls and rollers', () => {
    // A force fixed in the link, as large as the weight, turns with it: each bearing carries W |cos(q/2)|.
    const W = 2000;
    const make = (bearing: BearingFile, steps: number) =>
      spit({
        bearing,
        cases: [{ name: 'own weight', tip_force: { force_N: W, direction: { tool: [0, 0, -1] } } }],
        duty: whole({ path: turnPath(1, steps) }),
      });
    // Mean of |cos u|^p over a half turn: 4/(3π) for 3; for 10/3 by a fine sum.
    const mean = (p: number) => {
      let sum = 0;
      const steps = 100_000;
      for (let k = 0; k < steps; k++) sum += Math.abs(Math.cos((Math.PI * (k + 0.5)) / steps)) ** p;
      return sum / steps;
    };
    expect(mean(3)).toBeCloseTo(4 / (3 * Math.PI), 9);
    const roller: BearingFile = { ...BALL, kind: 'cylindrical-roller' };
    for (const [bearing, p] of [
      [BALL, 3],
      [roller, 10 / 3],
    ] as const) {
      const exact = W * mean(p) ** (1 / p);
      for (const found of loads(make(bearing, 4))) expect(found / exact - 1).toBeLessThan(3e-4);
      for (const found of loads(make(bearing, 4))) expect(found / exact - 1).toBeGreaterThan(-3e-4);
      for (const found of loads(make(bearing, 720))) expect(Math.abs(found / exact - 1)).toBeLessThan(1e-5);
    }
  });

  it('counts what accelerates the arm: a mass swung about an upright axis, against the load by hand', () => {
    // m at r off the axis at the hub; ω = A w cos, α = -A w² sin: radial m r √(ω⁴ + α²), half on each bearing; weight to A as thrust.
    const [m, r, A, w] = [4, 0.3, 1, 12];
    const steps = 240;
    const file = spit({
      mass: 0,
      joint: {
        axis: [0, 0, 1],
        link: {
          name: 'flail',
          mass_kg: m,
          centre_mm: [1000 * r, 0, 0],
          inertia_kg_m2: { xx: 0.01, yy: 0.02, zz: 0.02, xy: 0, xz: 0, yz: 0 },
        },
      },
      duty: whole({ path: sinePath((A * 180) / Math.PI, (2 * Math.PI) / w, steps) }),
    });
    const file0: ArmFile = { ...file, gravity_m_s2: [0, 0, 0] };
    const exact = () => {
      let wear = 0;
      let swept = 0;
      const count = 20_000;
      for (let k = 0; k < count; k++) {
        const t = (2 * Math.PI * (k + 0.5)) / count;
        const omega = A * w * Math.cos(t);
        const alpha = A * w * w * Math.sin(t);
        const P = (m * r * Math.hypot(omega * omega, alpha)) / 2;
        wear += Math.abs(omega) * P ** 3;
        swept += Math.abs(omega);
      }
      return Math.cbrt(wear / swept);
    };
    for (const load of loads(file0)) expect(load / exact()).toBeCloseTo(1, 3);
    const [segment] = study(file0).segments;
    expect(segment!.joints[0]!.peakSpeed).toBeCloseTo(A * w, 3);
    expect(segment!.notes).toEqual([]);
    const light = { ...file0.joints[0]!, link: { name: 'flail', mass_kg: m, centre_mm: [300, 0, 0] } };
    const noted = study({ ...file0, joints: [light as never] });
    expect(noted.segments[0]!.notes.join()).toContain('point masses');
    expect(noted.segments[0]!.notes.join()).toContain('“flail”');
  });

  it('lets a load of a slow path be that at rest', () => {
    const slow = spit({ duty: whole({ path: sinePath(40, 10_000) }) });
    for (const load of loads(slow)) expect(load).toBeCloseTo(1000, 6);
  });
});

describe('what a case leaves free along a path', () => {
  const gently = sinePath(20, 20);
  const pushed = (direction: 'any' | { base: [number, number, number] }): ArmFile =>
    spit({ cases: [{ name: 'own weight', tip_force: { force_N: 500, direction } }], duty: whole({ path: gently }) });

  it('a tip force of any direction adds where it hurts: (2000 + 500)/2 on each bearing, not together with its thrust on A', () => {
    const [A, B] = study(pushed('any')).bearings as [DutyBearing, DutyBearing];
    expect(B.life!.load).toBeCloseTo(1250, 2);
    // A also takes the worst thrust of 500 N: never less than the radial load alone.
    expect(A.life!.load).toBeGreaterThanOrEqual(1250 - 1e-3);
    const down = study(pushed({ base: [0, 0, -1] })).bearings;
    expect(down[1]!.life!.load).toBeCloseTo(1250, 2);
    expect(A.life!.load).toBeGreaterThanOrEqual(down[0]!.life!.load * (1 - 1e-9));
    const along = study(pushed({ base: [1, 0, 0] })).bearings;
    expect(A.life!.load).toBeGreaterThanOrEqual(along[0]!.life!.load * (1 - 1e-9));
  });

  it('a case with motion is never lighter than the path alone, and says when the path is faster than it', () => {
    const joint = {
      link: {
        name: 'roast',
        mass_kg: 20,
        centre_mm: [0, 80, 0] as [number, number, number],
        inertia_kg_m2: { xx: 0.05, yy: 0.05, zz: 0.05, xy: 0, xz: 0, yz: 0 },
      },
    };
    const make = (motion: { speed_deg_s: number[]; accel_deg_s2: number[] } | null, path = gently) =>
      spit({ joint, cases: [{ name: 'own weight', ...(motion ? { motion } : {}) }], duty: whole({ path }) });
    const still = loads(make(null));
    const stopping = study(make({ speed_deg_s: [100], accel_deg_s2: [2000] }));
    stopping.bearings.forEach((one, b) => {
      expect(one.life!.load).toBeGreaterThan(still[b]! * 1.1);
    });
    expect(stopping.segments[0]!.notes.join()).not.toContain('faster');
    const fast = study(make({ speed_deg_s: [1], accel_deg_s2: [1] }, sinePath(20, 0.2)));
    expect(fast.segments[0]!.notes.join()).toContain('faster than the motion of its case in spit');
    const alone = loads(make(null, sinePath(20, 0.2)));
    fast.bearings.forEach((one, b) => {
      expect(one.life!.load).toBeGreaterThanOrEqual(alone[b]! * (1 - 1e-9));
    });
  });
});

describe('monotonicity', () => {
  it('more load never lengthens a life, nor do more swings, nor a longer share of a hard case (factors 0.2 to 3)', () => {
    const make = (factor: number, cycles: number, share: number) =>
      spit({
        travel: [-100, 40],
        joint: { link: { name: 'roast', mass_kg: 40, centre_mm: [30, 60, 0] } },
        cases: [{ name: 'easy' }, { name: 'hard', factor }],
        duty: [
          { case: 'easy', share: 1 - share, path: sinePath(35, 3) },
          { case: 'hard', share, anywhere: { cycles_per_min: [cycles] } },
        ],
      });
    const falls = (values: readonly (readonly number[])[]) => {
      for (let k = 1; k < values.length; k++) {
        for (let b = 0; b < 2; b++) expect(values[k]![b]!).toBeLessThanOrEqual(values[k - 1]![b]! * (1 + 1e-12));
      }
      expect(values.at(-1)![0]!).toBeLessThan(values[0]![0]!);
    };
    falls([0.2, 0.5, 1, 1.5, 2, 3].map((factor) => lives(make(factor, 10, 0.3))));
    falls([1, 2, 5, 20, 60].map((cycles) => lives(make(2, cycles, 0.3))));
    falls([0.05, 0.2, 0.5, 0.9].map((share) => lives(make(3, 40, share))));
  });

  it('a larger rating never shortens a life', () => {
    const values = [5000, 8000, 12000].map((C) =>
      lives(spit({ bearing: { ...BALL, C_N: C }, duty: whole({ path: sinePath(45, 2) }) })),
    );
    expect(values[0]![0]!).toBeLessThan(values[1]![0]!);
    expect(values[1]![0]!).toBeLessThan(values[2]![0]!);
  });
});

describe('the arm as a whole', () => {
  it('two equal bearings reach together their life times 2^(-9/10)', () => {
    const duty = study(spit({ duty: whole({ path: sinePath(60, 2) }) }));
    const one = duty.bearings[0]!.life!.basic;
    expect(duty.system.basic / (one * 2 ** -0.9)).toBeCloseTo(1, 9);
    expect(duty.system.bearings).toBe(2);
  });

  it('a bearing that is not known leaves the life of the arm unassessed and names it', () => {
    const open = spit({
      duty: whole({ path: sinePath(60, 2) }),
      joint: {
        support: { arrangement: 'clevis', hub_mm: 0, span_mm: 100, thrust: 'A', bearings: { A: 'one', B: 'none' } },
      },
    });
    const list = rows(open);
    expect(list.map((row) => [row.check, row.bearing, row.verdict])).toEqual([
      ['life', 'A', 'pass'],
      ['life', 'B', 'unassessed'],
      ['system life', null, 'unassessed'],
    ]);
    expect(list[1]!.reason).toContain('none');
    expect(list[2]!.reason).toContain('spit B');
    expect(Number.isNaN(list[1]!.value)).toBe(true);
  });
});

describe('rows', () => {
  it('hold the life asked for over the life reached against 1', () => {
    const make = (life_h: number) => ({ ...spit({ duty: whole({ path: sinePath(30, 1) }) }), targets: { life_h } });
    const [row] = rows(make(800_000));
    expect(row).toMatchObject({
      check: 'life',
      unit: 's',
      bearing: 'A',
      verdict: 'pass',
      case: 'own weight',
      bound: null,
    });
    expect(row!.value / HOUR / 833333.3).toBeCloseTo(1, 4);
    expect(row!.utilisation).toBeCloseTo(0.96, 4);
    expect(row!.allowable! / HOUR).toBeCloseTo(800_000, 6);
    expect(rows(make(900_000))[0]).toMatchObject({ verdict: 'over' });
  });

  it('use the reliability asked for', () => {
    const make = (reliability: number) => ({
      ...spit({ duty: whole({ path: sinePath(30, 1) }) }),
      targets: { reliability },
    });
    expect(rows(make(0.99))[0]!.value / rows(make(0.9))[0]!.value).toBeCloseTo(0.2483317, 6);
  });

  it('say that there is no duty, what does not turn, and what cannot carry its load', () => {
    expect(rows(spit()).map((row) => [row.check, row.verdict, row.reason])).toEqual([
      ['life', 'unassessed', 'no duty in the file: fill in `duty`'],
      ['life', 'unassessed', 'no duty in the file: fill in `duty`'],
      ['system life', 'unassessed', 'no duty in the file: fill in `duty`'],
    ]);
    const still = rows(spit({ duty: whole({ anywhere: { cycles_per_min: [0] } }) }));
    expect(still.map((row) => row.verdict)).toEqual(['unassessed', 'unassessed', 'unassessed']);
    expect(still[0]!.reason).toContain('does not turn');
    // A roller bearing that is to take the weight as thrust.
    const upright = rows(
      spit({
        bearing: { ...BALL, kind: 'cylindrical-roller' },
        joint: { axis: [0, 0, 1] },
        duty: whole({ path: sinePath(30, 1) }),
      }),
    );
    expect(upright[0]).toMatchObject({
      bearing: 'A',
      value: 0,
      verdict: 'over',
      utilisation: Number.POSITIVE_INFINITY,
    });
  });

  it('pass anywhere in travel by the certain life alone: found enough but not certain stays unassessed', () => {
    // In motion the bound is wide: no inertia is known to help.
    const file = (life_h: number): ArmFile => ({
      ...spit({
        travel: [-90, 90],
        joint: {
          link: {
            name: 'roast',
            mass_kg: 20,
            centre_mm: [0, 150, 0],
            inertia_kg_m2: { xx: 0.1, yy: 0.1, zz: 0.1, xy: 0, xz: 0, yz: 0 },
          },
        },
        cases: [{ name: 'own weight', motion: { speed_deg_s: [200], accel_deg_s2: [3000] } }],
        duty: whole({ anywhere: { cycles_per_min: [20] } }),
      }),
      targets: { life_h },
    });
    const [row] = rows(file(1));
    const [found, certain] = [row!.value / HOUR, row!.bound! / HOUR];
    expect(certain).toBeLessThan(found * 0.999);
    expect(certain).toBeGreaterThan(found / 60);
    expect(rows(file(certain * 0.99))[0]!.verdict).toBe('pass');
    const between = rows(file((certain + found) / 2))[0]!;
    expect(between.verdict).toBe('unassessed');
    expect(between.reason).toContain('not by those that are certain');
    expect(rows(file(found * 1.01))[0]!.verdict).toBe('over');
  });

  it('say what was taken of the path: one that does not come back keeps its verdict, one that leaves the travel never passes', () => {
    const through = (degrees: readonly number[], travel: [number, number], life_h = 10): ArmFile => ({
      ...spit({
        travel,
        duty: whole({ path: degrees.map((angle, k) => ({ time_s: k, pose_deg: [angle] })) }),
      }),
      targets: { life_h },
    });
    const open = rows(through([0, 40, 60], [-90, 90]));
    expect(open.map((row) => [row.check, row.verdict])).toEqual([
      ['life', 'pass'],
      ['life', 'pass'],
      ['system life', null],
    ]);
    for (const row of open) expect(row.reason).toContain('the way back is not counted');
    const outside = rows(through([0, 90, 90, 0], [0, 90]));
    expect(outside.map((row) => row.verdict)).toEqual(['unassessed', 'unassessed', 'unassessed']);
    for (const row of outside) {
      expect(row.reason).toContain('leaves the travel of spit');
      expect(row.reason).not.toContain('the way back');
      expect(row.value).toBeGreaterThan(0);
    }
    const worn = rows(through([0, 90, 90, 0], [0, 90], 1e9));
    expect(worn[0]).toMatchObject({ verdict: 'over', reason: expect.stringContaining('leaves the travel') });
  });

  it('name the case of a note that is not of all segments, and leave out segments that do not count', () => {
    const file = spit({
      cases: [{ name: 'out' }, { name: 'to and fro' }, { name: 'still' }],
      duty: [
        { case: 'out', share: 0.4, path: [0, 30, 60].map((angle, k) => ({ time_s: k, pose_deg: [angle] })) },
        { case: 'to and fro', share: 0.4, path: sinePath(30, 1) },
        { case: 'still', share: 0.2, anywhere: { cycles_per_min: [0] } },
      ],
    });
    const { reason } = rows(file)[0]!;
    expect(reason).toContain('the way back is not counted (out)');
    expect(reason).toContain('accelerated as point masses, for want of `inertia_kg_m2`: “roast”');
    expect(reason).not.toContain('anywhere');
    expect(reason!.split('point masses').length).toBe(2);
  });

  it('beyond half of C or C0 no life passes, by the loads found or the bound; over stays over', () => {
    const make = (bearing: BearingFile, life_h: number, part: Pick<SegmentFile, 'path' | 'anywhere'>): ArmFile => ({
      ...spit({ bearing, travel: [-30, 30], duty: whole(part) }),
      targets: { life_h },
    });
    const path = { path: sinePath(30, 1) };
    const anywhere = { anywhere: { cycles_per_min: [60] } };
    for (const part of [path, anywhere]) {
      for (const bearing of [
        { ...BALL, C_N: 1900 },
        { ...BALL, C0_N: 900 },
      ]) {
        const list = rows(make(bearing, 100, part));
        expect(list[0]!.utilisation).toBeLessThan(1);
        expect(list.map((row) => row.verdict)).toEqual(['unassessed', 'unassessed', 'unassessed']);
        for (const row of list) expect(row.reason).toContain('load above half of C');
        expect(list[2]!.reason).toContain('of spit A, spit B: ');
        expect(rows(make(bearing, 1e9, part))[0]!.verdict).toBe('over');
      }
      expect(rows(make({ ...BALL, C_N: 2100 }, 100, part)).map((row) => row.verdict)).toEqual(['pass', 'pass', null]);
    }
  });

  it('never call the life of all bearings certified where it has a bound', () => {
    const system = rows(spit({ duty: whole({ anywhere: { cycles_per_min: [60] } }) })).at(-1)!;
    expect(system).toMatchObject({ check: 'system life', certified: false });
    expect(system.gap).toBeCloseTo(1 - system.bound! / system.value, 12);
    expect(system.bound).toBeLessThanOrEqual(system.value);
    const path = rows(spit({ duty: whole({ path: sinePath(30, 1) }) })).at(-1)!;
    expect(path).toMatchObject({ bound: null, gap: null, certified: null });
  });

  it('warn of small arcs with their share, and not of large ones', () => {
    const small = study(spit({ duty: whole({ path: sinePath(5, 1) }) }));
    expect(small.bearings[0]!.warnings.join()).toContain('false brinelling');
    expect(small.bearings[0]!.warnings.join()).toContain('100 %');
    const large = study(spit({ duty: whole({ path: sinePath(60, 1) }) }));
    expect(large.bearings[0]!.warnings.join()).not.toContain('brinelling');
    expect(rows(spit({ duty: whole({ path: sinePath(5, 1) }) }))[0]).toMatchObject({
      verdict: 'pass',
      reason: expect.stringContaining('false brinelling'),
    });
    const anywhere = study(spit({ travel: [-4, 4], duty: whole({ anywhere: { cycles_per_min: [3] } }) }));
    expect(anywhere.bearings[0]!.warnings.join()).toContain('false brinelling');
  });
});

describe('bounds given by the caller', () => {
  it('take the place of the built-in ones: twice the load, an eighth of the certain life', () => {
    const arm = armOf(spit({ travel: [-30, 30], duty: whole({ anywhere: { cycles_per_min: [60] } }) }));
    const chain = flattenArm(arm);
    const plain = dutyStudy(arm, chain)!.bearings[1]!;
    const bounds: TravelBounds = (of, load, checks) => sphereBounds(of, load, checks).map((bound) => 2 * bound);
    const doubled = dutyStudy(arm, chain, { bounds })!.bearings[1]!;
    expect(doubled.life!.life / plain.life!.life).toBeCloseTo(1 / 8, 9);
    expect(doubled.attainedLife!.life).toBe(plain.attainedLife!.life);
    // What is no bound cannot make the life longer than what was found.
    const none: TravelBounds = (_, __, checks) => checks.map(() => 0);
    expect(dutyStudy(arm, chain, { bounds: none })!.bearings[1]!.life!.life).toBe(plain.attainedLife!.life);
    const unknown: TravelBounds = (_, __, checks) => checks.map(() => Number.NaN);
    expect(dutyStudy(arm, chain, { bounds: unknown })!.bearings[1]!.unassessed).not.toBeNull();
  });
});

describe('plain bushings', () => {
  const bushing: BearingFile = {
    kind: 'plain-bushing',
    bore_mm: 20,
    outer_mm: 26,
    width_mm: 25,
    pv_limit_MPa_m_s: 0.1,
    speed_limit_m_s: 0.5,
  };
  const swinging = (bearing: BearingFile): ArmFile => spit({ bearing, duty: whole({ path: sinePath(30, 1) }) });

  it('mean of pressure times speed by hand: 1000 N on 20 × 25 mm, ±30° a second: 2 MPa × 0.02094 m/s', () => {
    const [row, speed] = rows(swinging(bushing));
    // mean speed 2 θ f d = 2 · 0.5236 · 0.02
    expect(row!.value / (2e6 * 2 * (Math.PI / 6) * 0.02)).toBeCloseTo(1, 5);
    expect(row).toMatchObject({ check: 'pv', unit: 'Pa·m/s', verdict: 'pass' });
    expect(row!.utilisation).toBeCloseTo(row!.value / 1e5, 12);
    // fastest π θ f d
    expect(speed).toMatchObject({ check: 'speed', verdict: 'pass' });
    expect(speed!.value / (Math.PI * (Math.PI / 6) * 0.02)).toBeCloseTo(1, 4);
  });

  it('anywhere in travel gives the same for the same swing', () => {
    const anywhere = spit({ bearing: bushing, travel: [-30, 30], duty: whole({ anywhere: { cycles_per_min: [60] } }) });
    const [path] = rows(swinging(bushing));
    const [swing] = rows(anywhere);
    expect(swing!.value / path!.value).toBeCloseTo(1, 4);
    expect(swing!.bound! / path!.value).toBeCloseTo(1, 4);
  });

  it('says of PV and wear that the way back of a path is not counted', () => {
    const bushing: BearingFile = {
      kind: 'plain-bushing',
      bore_mm: 20,
      outer_mm: 26,
      width_mm: 25,
      pv_limit_MPa_m_s: 1,
      speed_limit_m_s: 1,
      wear_factor_mm3_N_m: 1e-9,
      wear_depth_mm: 0.1,
    };
    const path = [0, 40, 60].map((angle, k) => ({ time_s: k, pose_deg: [angle] }));
    const list = rows({ ...spit({ bearing: bushing, duty: whole({ path }) }), targets: { life_h: 1 } });
    const mine = list.filter((row) => row.bearing === 'A');
    expect(mine.map((row) => [row.check, row.verdict])).toEqual([
      ['pv', 'pass'],
      ['speed', 'pass'],
      ['wear life', 'pass'],
    ]);
    for (const row of mine) expect(row.reason).toContain('the way back is not counted');
  });

  it('takes the hardest segment, and says what to fill in', () => {
    const file = spit({
      bearing: bushing,
      cases: [{ name: 'light' }, { name: 'heavy', factor: 3 }],
      duty: [
        { case: 'light', share: 0.9, path: sinePath(30, 1) },
        { case: 'heavy', share: 0.1, path: sinePath(30, 1) },
      ],
    });
    const duty = study(file);
    expect(duty.bearings[0]!.bushing!.segment).toBe(1);
    const light = study(swinging(bushing)).bearings[0]!.bushing!;
    expect(duty.bearings[0]!.bushing!.pv / light.pv).toBeCloseTo(3, 9);
    expect(duty.bearings[0]!.bushing!.wearRate / light.pv).toBeCloseTo(0.9 + 0.3, 9);
    const bare: BearingFile = { kind: 'plain-bushing', bore_mm: 20, outer_mm: 26, width_mm: 25 };
    expect(rows(swinging(bare))[0]).toMatchObject({
      verdict: 'unassessed',
      reason: expect.stringMatching(/^fill in `pv_limit_MPa_m_s` of the bushing; /),
    });
  });

  it('wears by hand: 1 mm³/(N·km) under 2 MPa at 0.02094 m/s, 0.1 mm deep after 663 h', () => {
    const worn: BearingFile = { ...bushing, wear_factor_mm3_N_m: 1e-6, wear_depth_mm: 0.1 };
    const life = (bearing: BearingFile, file: Partial<ArmFile> = {}) =>
      rows({ ...swinging(bearing), ...file }).find((row) => row.check === 'wear life' && row.bearing === 'A')!;
    // K p v = 1e-15 /Pa · 2e6 Pa · 0.0209440 m/s = 4.1888e-11 m/s; 1e-4 m / that = 2.38732e6 s = 663.1 h.
    const row = life(worn, { targets: { life_h: 500 } });
    expect(row.value / 2.38732e6).toBeCloseTo(1, 4);
    expect(row).toMatchObject({ unit: 's', allowable: 500 * 3600, verdict: 'pass' });
    expect(row.utilisation).toBeCloseTo((500 * 3600) / row.value, 12);
    expect(life(worn, { targets: { life_h: 700 } }).verdict).toBe('over');
    // Twice the factor, half the depth or twice the load halve it.
    expect(life({ ...worn, wear_factor_mm3_N_m: 2e-6 }).value / row.value).toBeCloseTo(0.5, 12);
    expect(life({ ...worn, wear_depth_mm: 0.05 }).value / row.value).toBeCloseTo(0.5, 12);
    expect(life(worn, { cases: [{ name: 'own weight', factor: 2 }] }).value / row.value).toBeCloseTo(0.5, 9);
  });

  it('without a wear factor or depth its wear is unassessed and says what to fill in', () => {
    const reasonOf = (bearing: BearingFile) => rows(swinging(bearing)).find((row) => row.check === 'wear life')!;
    expect(reasonOf(bushing)).toMatchObject({ verdict: 'unassessed' });
    expect(reasonOf(bushing).reason).toContain('wear_factor_mm3_N_m');
    expect(reasonOf({ ...bushing, wear_factor_mm3_N_m: 1e-6 }).reason).toContain('wear_depth_mm');
  });

  it('slides on its flange too, where it has one and locates: 500 N on 20 to 32 mm at 26 mm mean diameter', () => {
    const flanged: BearingFile = { ...bushing, flange_outer_mm: 32, wear_factor_mm3_N_m: 1e-6, wear_depth_mm: 0.1 };
    const file = swinging(flanged);
    const pushed = {
      ...file,
      cases: [
        { name: 'own weight', tip_force: { force_N: 500, direction: { base: [1, 0, 0] as [number, number, number] } } },
      ],
    };
    const all = rows(pushed);
    const of = (check: string) => all.filter((row) => row.check === check).map((row) => row.bearing);
    // A locates; B floats and its flange touches nothing.
    expect(of('flange pv')).toEqual(['A']);
    expect(of('flange wear life')).toEqual(['A']);
    const pv = all.find((row) => row.check === 'flange pv')!;
    const area = (Math.PI / 4) * (0.032 ** 2 - 0.02 ** 2);
    expect(pv.value / ((500 / area) * 2 * (Math.PI / 6) * 0.026)).toBeCloseTo(1, 5);
    const wear = all.find((row) => row.check === 'flange wear life')!;
    expect(wear.value / (1e-4 / (1e-15 * pv.value))).toBeCloseTo(1, 9);
    // Without thrust it does not wear at all.
    expect(rows(file).find((row) => row.check === 'flange wear life')).toMatchObject({
      value: Number.POSITIVE_INFINITY,
      utilisation: 0,
      verdict: 'pass',
    });
  });
});
