/**
 * A tray on a horizontal pin between two cheeks, worked by hand from the joint load to every verdict. Invented, no maker's data.
 *
 * File: axis y, hub plane at 0, cheeks with deep groove bearings 80 mm apart, shaft 20 mm solid of C45 that turns with the link, nothing drives
 * it. Link 100 kg, its centre 100 mm out along x and 20 mm along the axis. Gravity taken as 10 m/s².
 *
 * Joint load at q = 0, file's housing frame:   f = (0, 0, -1000) N
 *   m = r × f = (0.1, 0.02, 0) × (0, 0, -1000) = (0.02·(-1000) - 0, 0 - 0.1·(-1000), 0) = (-20, 100, 0) N·m
 *   torque about the axis 100 N·m, tilting moment 20 N·m, thrust 0.
 *
 * Bearings (A at y = -40 mm, B at y = +40 mm), sizes of the vertical loads:
 *   mid-span force: 500 N each; couple 20 N·m over 0.08 m: 250 N, towards B (the mass stands on B's side)
 *   FrA = 500 - 250 = 250 N          FrB = 500 + 250 = 750 N
 *
 * Static: Fa = 0, so P0 = Fr. Allowable C0/s0 = 2400/1.5 = 1600 N.
 *   A: 250/1600 = 0.15625 pass       B: 750/1600 = 0.46875 pass
 *   With factor 2.5: B 1875/1600 = 1.171875, over.
 *
 * Shaft: I = π 0.02⁴/64 = 7.853982e-9 m⁴, W = 2I/d = 7.853982e-7 m³, Wp = 1.570796e-6 m³, A = 3.141593e-4 m².
 *   Bending moment at the hub: 250·0.04 = 10 N·m on A's side, 750·0.04 = 30 N·m on B's side (their difference is the couple of 20).
 *   σ = 30/W = 38.19719 MPa, τ = 100/Wp = 63.66198 MPa
 *   σv = √(38.19719² + 3·63.66198²) = √(1459.025 + 12158.54) = 116.6943 MPa
 *   neutral fibre: 4·750/(3A) = 3.183099 MPa of transverse shear; √3 (3.183099 + 63.66198) = 115.7790 MPa, less.
 *   Allowable 310/1.5 = 206.6667 MPa; utilisation 0.564650, pass.
 *
 * Slope at the bearings, E = 207 GPa, EI = 1625.774 N·m²:
 *   mid force: F L²/(16 EI) = 1000·0.0064/26012.39 = 2.460366e-4 at both ends, opposite in sense
 *   couple in the middle: C L/(24 EI) = 20·0.08/39018.58 = 4.100611e-5 at both ends, one sense
 *   the couple's shear V = 250 N turns every section by V/(κGA), against the sense of the ends: G = 207/(2·1.292) = 80.10836 GPa,
 *   κ = 6·1.292/(7 + 6·0.292) = 0.8857404, κGA = 0.8857404·80.10836e9·3.141593e-4 = 2.229120e7 N, V/κGA = 1.121519e-5, so together
 *   4.100611e-5 - 1.121519e-5 = 2.979092e-5
 *   A: 2.460366e-4 - 2.979092e-5 = 2.162457e-4     B: 2.460366e-4 + 2.979092e-5 = 2.758275e-4
 *   Allowable 0.001 (deep groove, lower figure): 0.216246 and 0.275828, pass.
 *
 * Deflection at the hub: F L³/(48 EI) + F L/(4 κGA) = 1000·5.12e-4/78037.15 + 80/(8.91648e7) = 6.560977e-6 + 8.97215e-7 = 7.458192e-6 m;
 * the couple in the middle adds nothing there.
 */
import { describe, expect, it } from 'vitest';
import { flattenArm } from '../../../src/mechanics/chain.ts';
import { armCapacity, assessPose } from '../../../src/studies/assess.ts';
import type { CheckRow } from '../../../src/studies/results.ts';
import { CLEVIS, oneJoint } from './oneJoint.ts';

const arm = oneJoint({
  axis: [0, 1, 0],
  travel: [-60, 60],
  link: { name: 'tray', mass_kg: 100, centre_mm: [100, 20, 0] },
  support: CLEVIS,
  cases: [{ name: 'tray' }, { name: 'dropped tray', factor: 2.5 }],
  targets: { static_safety: 1.5, shaft_yield_safety: 1.5 },
});
const chain = flattenArm(arm);
const assessed = assessPose(arm, chain, armCapacity(arm, chain), [0]);
const row = (check: string, bearing: CheckRow['bearing'], load = 'tray') =>
  assessed.find((one) => one.case === load)!.rows.find((one) => one.check === check && one.bearing === bearing)!;

describe('a tray on a clevis, by hand', () => {
  it('has the joint load of the hand', () => {
    const { wrench } = row('static', 'A');
    for (const [k, value] of [0, 0, -1000].entries()) expect(wrench.force[k]).toBeCloseTo(value, 9);
    for (const [k, value] of [-20, 100, 0].entries()) expect(wrench.moment[k]).toBeCloseTo(value, 9);
  });

  it('passes its bearings statically, and fails the harder one when the tray drops', () => {
    expect(row('static', 'A').value).toBeCloseTo(250, 9);
    expect(row('static', 'B').value).toBeCloseTo(750, 9);
    expect(row('static', 'A')).toMatchObject({ allowable: 1600, verdict: 'pass' });
    expect(row('static', 'A').utilisation).toBeCloseTo(0.15625, 12);
    expect(row('static', 'B').utilisation).toBeCloseTo(0.46875, 12);
    expect(row('static', 'B').verdict).toBe('pass');
    expect(row('static', 'A', 'dropped tray').verdict).toBe('pass');
    expect(row('static', 'B', 'dropped tray').value).toBeCloseTo(1875, 9);
    expect(row('static', 'B', 'dropped tray').utilisation).toBeCloseTo(1.171875, 12);
    expect(row('static', 'B', 'dropped tray').verdict).toBe('over');
  });

  it('stresses the shaft most at the hub, within its yield', () => {
    const stress = row('stress', null);
    expect(stress.where).toBe('hub');
    expect(stress.value / 116.6943e6).toBeCloseTo(1, 6);
    expect(stress.allowable! / 206.6667e6).toBeCloseTo(1, 6);
    expect(stress.utilisation).toBeCloseTo(0.56465, 5);
    expect(stress.verdict).toBe('pass');
  });

  it('slopes the shaft in its bearings as the hand has it', () => {
    expect(row('slope', 'A').value / 2.162457e-4).toBeCloseTo(1, 6);
    expect(row('slope', 'B').value / 2.758275e-4).toBeCloseTo(1, 6);
    expect(row('slope', 'A').allowable).toBe(0.001);
    expect(row('slope', 'B').utilisation).toBeCloseTo(0.275828, 5);
    expect(row('slope', 'B').verdict).toBe('pass');
  });

  it('reports the deflection at the hub without a verdict', () => {
    const deflection = row('deflection', null);
    expect(deflection.value / 7.458192e-6).toBeCloseTo(1, 6);
    expect(deflection).toMatchObject({ allowable: null, utilisation: null, verdict: null, reason: null });
  });

  it('has nothing unassessed', () => {
    expect(assessed.flatMap(({ rows }) => rows).filter(({ verdict }) => verdict === 'unassessed')).toEqual([]);
  });
});
