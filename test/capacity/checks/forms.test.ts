/** The convex form of every check against the demand itself: equal, or above it by no more than is told; never below. */
import { describe, expect, it } from 'vitest';
import type { ArmFile, BearingFile } from '../../../src/arm/armFile.ts';
import { isRingParts, jointParts, SUM_MARGIN } from '../../../src/capacity/index.ts';
import { isUnassessed, staticEquivalent, staticForm, staticRating } from '../../../src/capacity/rolling/index.ts';
import { jointShaft, sectionStress, shaftSupports } from '../../../src/capacity/shaft/index.ts';
import { fatigueFactors } from '../../../src/capacity/shaft/notch.ts';
import { seededRandom } from '../../../src/math/random.ts';
import { shaftLoads } from '../../../src/mechanics/beamForms.ts';
import { solveShaft } from '../../../src/mechanics/beamStepped.ts';
import { at, CLEVIS, GROOVE, listed, oneJoint, type RevoluteFile } from './oneJoint.ts';

const SIZE = { bore_mm: 20, outer_mm: 42, width_mm: 12 } as const;
const KINDS: Record<string, BearingFile> = {
  'deep groove': GROOVE,
  'deep groove without ratings': { kind: 'deep-groove', ...SIZE },
  'cylindrical roller': { kind: 'cylindrical-roller', ...SIZE, C0_N: 14000 },
  needle: { kind: 'needle', bore_mm: 20, outer_mm: 28, width_mm: 13, C0_N: 12000 },
  'self-aligning': { kind: 'self-aligning-ball', ...SIZE, C0_N: 3200, e: 0.3 },
  'angular contact, two rows': { kind: 'angular-contact', ...SIZE, rows: 2, contact_angle_deg: 30, C0_N: 9000 },
  'four point': { kind: 'four-point', ...SIZE, contact_angle_deg: 35, C0_N: 9000 },
};
const GEAR: RevoluteFile['drive'] = {
  kind: 'gear',
  station_mm: 70,
  radius_mm: 25,
  pressure_angle_deg: 20,
  mesh_deg: 40,
};
const BELT: RevoluteFile['drive'] = {
  kind: 'belt',
  station_mm: -65,
  radius_mm: 30,
  pull_deg: 10,
  pretension_N: 200,
  tension_ratio: 1.5,
};

/** Random joint loads: N and N·m; now and then without a part, to stand at the limits. */
function* wrenches(seed: number, count: number): Generator<number[]> {
  const random = seededRandom(seed);
  for (let k = 0; k < count; k++) {
    const some = () => (random.next() < 0.15 ? 0 : 1);
    const force = random.direction().map((v) => v * 800 * some());
    const moment = random.direction().map((v) => v * 60 * some());
    yield [...force, ...moment];
  }
}

/** Radial loads by moments about the other bearing, with the force of the drive: a route of its own. */
function radialByMoments(w: readonly number[], zA: number, zB: number, drive: readonly [number, number, number]) {
  const [dx, dy, s] = drive;
  const about = (z: number) => [w[4]! - z * w[0]! + (s - z) * dx, -w[3]! - z * w[1]! + (s - z) * dy] as const;
  const [ax, ay] = about(zB);
  const [bx, by] = about(zA);
  return { A: Math.hypot(ax / (zA - zB), ay / (zA - zB)), B: Math.hypot(bx / (zB - zA), by / (zB - zA)) };
}

/** Force of the drive on the shaft: tangential and separating, or the pull of the strands. */
function driveForce(drive: RevoluteFile['drive'], torque: number): readonly [number, number, number] {
  if (!drive) return [0, 0, 0];
  const station = drive.station_mm / 1000;
  const radius = drive.radius_mm / 1000;
  if (drive.kind === 'gear') {
    const mesh = (drive.mesh_deg * Math.PI) / 180;
    const tangential = torque / radius;
    const away = (Math.abs(torque) / radius) * Math.tan((drive.pressure_angle_deg * Math.PI) / 180);
    return [
      tangential * Math.sin(mesh) - away * Math.cos(mesh),
      -tangential * Math.cos(mesh) - away * Math.sin(mesh),
      station,
    ];
  }
  const pull = Math.max(drive.pretension_N, ((drive.tension_ratio ?? 1) * Math.abs(torque)) / radius);
  const angle = (drive.pull_deg * Math.PI) / 180;
  return [pull * Math.cos(angle), pull * Math.sin(angle), station];
}

describe('static check of a pair', () => {
  for (const [name, bearing] of Object.entries(KINDS)) {
    for (const thrust of ['A', 'B', 'both'] as const) {
      for (const [driven, drive] of [
        ['', undefined],
        [', gear', GEAR],
        [', belt', BELT],
      ] as const) {
        it(`${name}, thrust ${thrust}${driven}: equals the rule at 200 random loads, seed 11`, () => {
          const arm = oneJoint({ support: { ...CLEVIS, thrust }, drive, bearings: { left: bearing, right: bearing } });
          const { of } = listed(arm);
          const part = arm.bearings.left!;
          if (part.kind === 'plain-bushing') throw new Error('a rolling bearing is wanted');
          const factors = staticForm(part);
          if (isUnassessed(factors)) throw new Error(factors.unassessed);
          const rating = staticRating(part);
          if (isUnassessed(rating)) throw new Error(rating.unassessed);
          for (const w of wrenches(11, 200)) {
            const radial = radialByMoments(w, -0.04, 0.04, driveForce(drive, w[5]!));
            for (const side of ['A', 'B'] as const) {
              const fz = w[2]!;
              const carried =
                thrust === 'both' ? (side === 'A' ? Math.max(0, fz) : Math.min(0, fz)) : thrust === side ? fz : 0;
              // The load along a bearing that takes none is the business of the check `thrust`.
              const Fa = factors.value.radialOnly ? 0 : carried;
              const P0 = staticEquivalent(factors.value, radial[side], Fa);
              const found = at(of('static', side), w);
              expect(found.demand / P0 || 0).toBeCloseTo(P0 > 0 ? 1 : 0, 9);
              expect(found.form).toBe(found.demand);
            }
          }
          // Nothing is known of starts and stops: one and a half times the guide value.
          const usual = ['cylindrical-roller', 'needle'].includes(part.kind) ? 1.5 : 1;
          expect(of('static', 'A').allowable).toBeCloseTo(rating.value / (1.5 * usual), 9);
        });
      }
    }
  }
});

const RING: RevoluteFile['support'] = { arrangement: 'ring', hub_mm: 0, station_mm: 15, bearing: 'ring' };
const ring = (drive?: RevoluteFile['drive']) =>
  oneJoint({
    support: RING,
    drive,
    bearings: {
      ring: { kind: 'crossed-roller', bore_mm: 60, outer_mm: 100, width_mm: 13, pitch_diameter_mm: 80, C0_N: 50000 },
    },
  });

describe('static check of a ring', () => {
  it('gives the published example: 1000 N, 500 N and 120 N·m on a pitch circle of 80 mm make 4220 N', () => {
    // The moment about the ring's centre, 15 mm along the axis: m - z × f·0.015 has the size 120.
    const w = [1000, 0, 500, 0, 120 + 0.015 * 1000, 0];
    expect(at(listed(ring()).of('static', 'ring'), w).demand).toBeCloseTo(4220, 9);
  });

  it.each([
    ['alone', undefined],
    ['with a gear', GEAR],
    ['with a belt', BELT],
  ] as const)(
    '%s: the form is never below the demand and above it by at most the margin of the radial load; 500 random loads, seed 5',
    (_, drive) => {
      const check = listed(ring(drive)).of('static', 'ring');
      let most = 0;
      for (const w of wrenches(5, 500)) {
        const [dx, dy] = driveForce(drive, w[5]!);
        const radial = Math.hypot(w[0]! + dx, w[1]! + dy);
        const { demand, form } = at(check, w);
        expect(form).toBeGreaterThanOrEqual(demand * (1 - 1e-12));
        expect(form).toBeLessThanOrEqual(demand + SUM_MARGIN * radial + 1e-9 * demand);
        most = Math.max(most, radial > 0 ? (form - demand) / radial : 0);
      }
      // The margin is used, so it is not there for nothing.
      expect(most).toBeGreaterThan(0.3 * SUM_MARGIN);
    },
  );

  it('has no slope to check: the ring holds the axis', () => {
    expect(listed(ring()).has('slope', 'ring')).toBe(false);
  });
});

const row = (kind: 'angular-contact' | 'tapered-roller', angle: number): BearingFile =>
  kind === 'angular-contact'
    ? { kind, ...SIZE, contact_angle_deg: angle, C_N: 12000, C0_N: 7000 }
    : { kind, bore_mm: 20, outer_mm: 42, width_mm: 15, contact_angle_deg: angle, C_N: 24000, C0_N: 27000 };

describe('static check of an adjusted pair', () => {
  for (const adjusted of ['back-to-back', 'face-to-face'] as const) {
    for (const [name, bearing, tight] of [
      ['balls of 40°', row('angular-contact', 40), true],
      ['balls of 15°, whose induced thrust follows the load', row('angular-contact', 15), false],
      ['tapered rollers', row('tapered-roller', 14), true],
    ] as const) {
      it(`${adjusted}, ${name}: the form is never below the demand; 300 random loads, seed 8`, () => {
        const arm = oneJoint({
          support: { ...CLEVIS, thrust: 'both', adjusted },
          bearings: { left: bearing, right: bearing },
        });
        const { of, chain } = listed(arm);
        const parts = jointParts(arm, chain, 0);
        if (!parts || isRingParts(parts)) throw new Error('a pair is wanted');
        const { stationA, stationB } = parts.points;
        for (const w of wrenches(8, 300)) {
          const radial = radialByMoments(w, stationA, stationB, [0, 0, 0]);
          for (const side of ['A', 'B'] as const) {
            const { demand, form } = at(of('static', side), w);
            expect(form).toBeGreaterThanOrEqual(demand * (1 - 1e-12));
            // The thrust that the other row induces counts Y0 c times its radial load, less than a third of it.
            const margin = (SUM_MARGIN / 3) * radial[side === 'A' ? 'B' : 'A'];
            if (tight) expect(form).toBeLessThanOrEqual(demand + margin + 1e-9 * demand);
          }
        }
      });
    }
  }

  it('turns the way of the thrust with the part that the load enters by', () => {
    const pair = (turns_with: 'link' | 'housing') =>
      listed(
        oneJoint({
          support: { ...CLEVIS, thrust: 'both', adjusted: 'back-to-back', shaft: { ...CLEVIS.shaft, turns_with } },
          bearings: { left: row('angular-contact', 40), right: row('angular-contact', 40) },
        }),
      );
    const w = [0, 0, 3000, 0, 0, 0];
    // Back to back a shaft pushed from A to B loads A; outer rings pushed so load B. Y0 = 0.26.
    expect(at(pair('link').of('static', 'A'), w).demand).toBeCloseTo(0.26 * 3000, 9);
    expect(at(pair('link').of('static', 'B'), w).demand).toBe(0);
    expect(at(pair('housing').of('static', 'B'), w).demand).toBeCloseTo(0.26 * 3000, 9);
    expect(pair('housing').of('static', 'B').notes.join()).toContain('thrust along + axis loads B');
  });
});

const stepped: NonNullable<RevoluteFile['support']> = {
  ...CLEVIS,
  shaft: {
    diameter_mm: 20,
    bore_mm: 6,
    material: 'steel-c45',
    turns_with: 'link',
    sections: [
      { from_mm: -60, to_mm: -10, diameter_mm: 20 },
      { from_mm: -10, to_mm: 25, diameter_mm: 26, bending_factor: 1.9, torsion_factor: 1.5, notch_radius_mm: 1 },
      { from_mm: 25, to_mm: 80, diameter_mm: 20 },
    ],
  },
};

describe('checks of the shaft', () => {
  it.each([
    ['alone', undefined],
    ['with a gear', GEAR],
  ] as const)(
    '%s: the stress is that of the solved shaft at every section, worst taken, thrust apart; 60 random loads, seed 3',
    (_, drive) => {
      const arm = oneJoint({ support: stepped, drive });
      const check = listed(arm).of('stress');
      const joint = arm.joints[0]!;
      const shaft = jointShaft(
        joint,
        shaftSupports(joint.support!, [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY]),
      );
      if ('unassessed' in shaft) throw new Error(shaft.unassessed);
      const { beam, loading, material, points, torque, thrust } = shaft.value;
      for (const w of wrenches(3, 60)) {
        const solved = solveShaft(beam, shaftLoads(loading, w, 0));
        if ('unassessed' in solved) throw new Error(solved.unassessed);
        let worst = 0;
        points.forEach(({ station, section, notch }, k) => {
          const node = [...beam.nodes].findIndex((z) => Math.abs(z - station) < 1e-12);
          for (const side of ['Before', 'After'] as const) {
            const M = Math.hypot(solved.x[`moment${side}`][node]!, solved.y[`moment${side}`][node]!);
            const V = Math.hypot(solved.x[`shear${side}`][node]!, solved.y[`shear${side}`][node]!);
            const load = {
              moment: M,
              torque: torque[k]! * Math.abs(w[5]!),
              axial: thrust[k]! * Math.abs(w[2]!),
              shear: V,
            };
            const Kf = fatigueFactors(material, notch.factors, notch.radius);
            worst = Math.max(worst, sectionStress(load, section, Kf).vonMises);
          }
        });
        const { demand } = at(check, w);
        const push = Math.abs(w[2]!) / Math.min(...points.map(({ section }) => section.area));
        expect(demand).toBeGreaterThanOrEqual(worst * (1 - 1e-9));
        expect(demand).toBeLessThanOrEqual(worst + push + 1e-9 * worst);
        if (w[2] === 0) expect(demand / worst || 1).toBeCloseTo(1, 9);
      }
    },
  );

  it('slopes and deflects as a uniform shaft does in closed form', () => {
    const check = listed(oneJoint({ support: CLEVIS }));
    const EI = (207e9 * Math.PI * 0.02 ** 4) / 64;
    const slope = at(check.of('slope', 'A'), [900, 0, 0, 0, 0, 0]).demand;
    expect(slope).toBeCloseTo((900 * 0.08 ** 2) / (16 * EI), 12);
    const { demand } = at(check.of('deflection'), [900, 0, 0, 0, 0, 0]);
    // The rest is shear, a seventh of it on so short a shaft.
    expect(demand).toBeGreaterThan((900 * 0.08 ** 3) / (48 * EI));
    expect(demand).toBeLessThan((1.2 * 900 * 0.08 ** 3) / (48 * EI));
  });

  it('takes bearings with a stiffness as springs, others as rigid, and says so', () => {
    const soft: BearingFile = { ...GROOVE, stiffness_N_um: 50 };
    const pair = (left: BearingFile) => listed(oneJoint({ support: CLEVIS, bearings: { left, right: GROOVE } }));
    const w = [900, 0, 0, 0, 0, 0];
    const rigid = at(pair(GROOVE).of('deflection'), w).demand;
    // A gives way by 450 N over 50 N/µm = 9 µm, half of it at mid span.
    expect(at(pair(soft).of('deflection'), w).demand).toBeCloseTo(rigid + 4.5e-6, 10);
    // The axis tilts by 9 µm over 80 mm towards A: with the shaft's bend at B, against it at A.
    const slope = (left: BearingFile, side: 'A' | 'B') => at(pair(left).of('slope', side), w).demand;
    expect(slope(soft, 'B') - slope(GROOVE, 'B')).toBeCloseTo(9e-6 / 0.08, 10);
    expect(slope(soft, 'A') - slope(GROOVE, 'A')).toBeCloseTo(-9e-6 / 0.08, 10);
    expect(pair(GROOVE).of('slope', 'A').notes.join()).toContain('bearings taken as rigid');
    expect(pair(soft).of('slope', 'A').notes.join()).toContain('one bearing taken as rigid');
  });

  it('holds the slope to the smaller of target and bearing, and names it', () => {
    const targets: ArmFile['targets'] = { slope_mrad: 0.4 };
    expect(listed(oneJoint({ support: CLEVIS, targets })).of('slope', 'A')).toMatchObject({
      allowable: 0.0004,
      source: 'target of the arm file',
    });
    const loose = listed(oneJoint({ support: CLEVIS, targets: { slope_mrad: 5 } })).of('slope', 'A');
    expect(loose.allowable).toBe(0.001);
    expect(loose.source).toContain('Shigley');
  });

  it('holds the slope of a bushing to its clearance, or to the target alone where that is not known', () => {
    const bush: BearingFile = { kind: 'plain-bushing', bore_mm: 20, outer_mm: 26, width_mm: 20, clearance_um: 30 };
    const { clearance_um: _, ...bare } = bush;
    const slope = (left: BearingFile, targets?: ArmFile['targets']) =>
      listed(oneJoint({ support: CLEVIS, bearings: { left, right: GROOVE }, targets })).of('slope', 'A');
    expect(slope(bush).allowable).toBeCloseTo(0.0015, 12);
    expect(slope(bare)).toMatchObject({ allowable: null, unassessed: 'fill in the running clearance of the bushing' });
    expect(slope(bare, { slope_mrad: 0.8 })).toMatchObject({ allowable: 0.0008, unassessed: null });
    expect(slope(bare, { slope_mrad: 0.8 }).source).toContain('target of the arm file alone');
  });

  it('comes from hollow to solid as the bore closes', () => {
    const bored = (bore_mm: number) => {
      const { of } = listed(oneJoint({ support: { ...CLEVIS, shaft: { ...CLEVIS.shaft, bore_mm } } }));
      const w = [300, 200, 100, 5, 8, 20];
      return [of('stress'), of('slope', 'A'), of('deflection')].map((check) => at(check, w).demand);
    };
    const solid = bored(0);
    bored(0.01).forEach((value, k) => {
      expect(value / solid[k]!).toBeCloseTo(1, 5);
    });
    bored(16).forEach((value, k) => {
      expect(value).toBeGreaterThan(1.3 * solid[k]!);
    });
  });
});

describe('pressure of a bushing', () => {
  const bush: BearingFile = { kind: 'plain-bushing', bore_mm: 20, outer_mm: 26, width_mm: 25, pressure_limit_MPa: 12 };
  it('is the radial load over the projected area, against the smaller of limit and target', () => {
    const arm = oneJoint({ support: CLEVIS, bearings: { left: bush, right: GROOVE }, targets: { pressure_MPa: 9 } });
    const { of, has } = listed(arm);
    // 600 N at mid span: 300 N on 20 × 25 mm.
    expect(at(of('pressure', 'A'), [600, 0, 0, 0, 0, 0]).demand).toBeCloseTo(300 / (0.02 * 0.025), 6);
    expect(of('pressure', 'A')).toMatchObject({ allowable: 9e6, source: 'target of the arm file' });
    expect(has('static', 'A')).toBe(false);
    expect(has('pressure', 'B')).toBe(false);
    expect(
      listed(oneJoint({ support: CLEVIS, bearings: { left: bush, right: GROOVE } })).of('pressure', 'A').allowable,
    ).toBe(12e6);
  });

  it('is unassessed without a limit, and says what to fill in', () => {
    const { pressure_limit_MPa: _, ...bare } = bush;
    const check = listed(oneJoint({ support: CLEVIS, bearings: { left: bare, right: GROOVE } })).of('pressure', 'A');
    expect(check).toMatchObject({ allowable: null, unassessed: 'fill in `pressure_limit_MPa` of the bushing' });
    expect(at(check, [600, 0, 0, 0, 0, 0]).demand).toBeGreaterThan(0);
  });
});

describe('pressure on the flange of a bushing', () => {
  const bush: BearingFile = {
    kind: 'plain-bushing',
    bore_mm: 20,
    outer_mm: 26,
    width_mm: 25,
    flange_outer_mm: 32,
    pressure_limit_MPa: 12,
  };
  const pair = (thrust: 'A' | 'B' | 'both', left: BearingFile = bush) =>
    listed(
      oneJoint({ support: { ...CLEVIS, thrust }, bearings: { left, right: GROOVE }, targets: { pressure_MPa: 9 } }),
    );

  it('is the thrust over the ring from bore to flange, whichever way it points, against the smaller of limit and target', () => {
    const check = pair('A').of('flange pressure', 'A');
    // π/4 (32² - 20²) = 490.09 mm²; 300 N make 0.61213 MPa.
    for (const Fa of [300, -300]) expect(at(check, [50, 70, Fa, 1, 2, 3]).demand).toBeCloseTo(300 / 490.0885e-6, -2);
    expect(check).toMatchObject({ allowable: 9e6, source: 'target of the arm file', unit: 'Pa' });
    expect(at(check, [900, 0, 0, 0, 0, 0]).demand).toBe(0);
  });

  it('stands in for the thrust that a bushing without a flange must not see', () => {
    expect(pair('A').has('thrust', 'A')).toBe(false);
    expect(pair('B').has('flange pressure', 'A')).toBe(false);
    const { flange_outer_mm: _, ...bare } = bush;
    expect(pair('A', bare).has('flange pressure', 'A')).toBe(false);
    expect(pair('A', bare).has('thrust', 'A')).toBe(true);
    // By its direction: A takes what points along + axis alone.
    const both = pair('both').of('flange pressure', 'A');
    expect(at(both, [0, 0, -300, 0, 0, 0]).demand).toBe(0);
    expect(at(both, [0, 0, 300, 0, 0, 0]).demand).toBeGreaterThan(6e5);
  });
});

describe('thrust', () => {
  const roller: BearingFile = { kind: 'cylindrical-roller', ...SIZE, C0_N: 14000 };
  it('is checked only where the bearing that locates takes none', () => {
    const pair = (thrust: 'A' | 'B' | 'both') =>
      listed(oneJoint({ support: { ...CLEVIS, thrust }, bearings: { left: roller, right: GROOVE } }));
    expect(pair('B').has('thrust', 'A')).toBe(false);
    expect(pair('A').has('thrust', 'A')).toBe(true);
    expect(at(pair('A').of('thrust', 'A'), [0, 0, -40, 0, 0, 0]).demand).toBe(40);
    // By its direction: A takes what points along + axis.
    expect(at(pair('both').of('thrust', 'A'), [0, 0, -40, 0, 0, 0]).demand).toBe(0);
    expect(at(pair('both').of('thrust', 'A'), [0, 0, 40, 0, 0, 0]).demand).toBe(40);
    expect(pair('both').has('thrust', 'B')).toBe(false);
    expect(pair('A').of('thrust', 'A')).toMatchObject({ allowable: 0, beyond: null });
  });
});
