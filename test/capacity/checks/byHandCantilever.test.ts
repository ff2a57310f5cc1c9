/**
 * A turntable on an adjusted pair below its hub, worked by hand from the joint load to every verdict. Invented, no maker's data.
 *
 * File: axis z upwards, hub plane at 0, cantilever on side `-`, overhang 30 mm, span 60 mm: A at -30 mm, B at -90 mm. Two angular contact
 * bearings 20 × 42 × 12 mm of 40°, back to back, C0 6000 N. Shaft 20 mm solid of C45. Link 50 kg, its centre 300 mm off the axis and
 * 200 mm up. Gravity 10 m/s². Case `standing`; case `pressed` has 4000 N straight down on the axis besides.
 *
 * Joint load at q = 0:   f = (0, 0, -500) N,  m = (0.3, 0, 0.2) × f = (0, 0.3·500, 0) = (0, 150, 0) N·m; pressed: f = (0, 0, -4500) N.
 *
 * Pressure centres: dpw = (20 + 42)/2 = 31 mm, (31/2) tan 40° = 15.5·0.8390996 = 13.00604 mm outwards:
 *   A at -16.99396 mm, B at -103.00604 mm, span 86.01209 mm.
 * Radial loads: no radial force, couple 150 N·m: 150/0.08601209 = 1743.941 N on each.
 * Induced thrust, e = 1.14 at 40°: SA = SB = 1.14·1743.941 = 1988.093 N.
 * The shaft turns with the link and is pushed down. A lies above B, so that is from A towards B, which back to back loads A: Ka = 500 N.
 *   FaA = max(1988.093, 1988.093 + 500) = 2488.093 N      FaB = max(1988.093, 1988.093 - 500) = 1988.093 N
 *   pressed, Ka = 4500: FaA = 6488.093 N, FaB = 1988.093 N
 * Static, X0 = 0.5, Y0 = 0.26:
 *   standing A: max(1743.941, 871.9705 + 0.26·2488.093 = 1518.875) = 1743.941 N
 *   pressed A:  871.9705 + 0.26·6488.093 = 2558.875 N
 *   B, both:    max(1743.941, 871.9705 + 516.9042) = 1743.941 N
 *   allowable 6000/1.5 = 4000 N: 0.435985, 0.639719, 0.435985, pass.
 * Dynamic, X = 0.35, Y = 0.57 beyond e: A standing Fa/Fr = 1.427 > e: 0.35·1743.941 + 0.57·2488.093 = 2028.592 N; B at e: P = Fr = 1743.941 N.
 *
 * Shaft, W = 7.853982e-7 m³, A = 3.141593e-4 m²: the couple of 150 N·m runs from the hub to the pressure centre of A, then falls to 0 at B.
 *   σ = 150/W = 190.9859 MPa; thrust 500/A = 1.591549 MPa added in full: 192.5775 MPa at the hub; pressed 190.9859 + 14.32394 = 205.3099
 *   allowable 310/1.5 = 206.6667 MPa: 0.931826 and 0.993435, pass. No torque: weights along the axis.
 *
 * Slope, EI = 1625.774 N·m², κGA = 2.229120e7 N (as in the clevis by hand), L = 0.08601209 m, u = 13.00604 mm:
 *   at the pressure centres ML/3EI = 2.645266e-3 and -ML/6EI = -1.322633e-3; over u the bending takes (150/EI)(u - u²/2L) = 1.109260e-3 at A
 *   and adds (150/EI) u²/2L = 9.072620e-5 at B; the shear 1743.941 N adds 7.823450e-5 everywhere:
 *   A: 2.645266e-3 - 1.109260e-3 + 7.823450e-5 = 1.614241e-3      B: -1.322633e-3 + 9.072620e-5 + 7.823450e-5 = -1.153672e-3
 *   allowable one arc minute, 2.908882e-4: 5.549351 and 3.966033, over: this shaft is too thin for the bearings.
 *
 * Fatigue over a full turn: the couple goes round with the link.
 *   Shaft turning with the link: its fibres see no change; σm = 190.9859 MPa. Goodman 570/190.9859 = 2.984513, elliptic 310/190.9859 =
 *   1.623156, the lower; target 1.5: utilisation 1.5/1.623156 = 0.924125, pass.
 *   Shaft fixed to the housing: fully reversed, σa = 190.9859 MPa. Se = 285·0.839208·0.901901·0.814 = 175.589 MPa (machined, 20 mm, 99 %);
 *   safety 175.589/190.9859 = 0.919383, utilisation 1.631528, over.
 */
import { describe, expect, it } from 'vitest';
import { flattenArm } from '../../../src/mechanics/chain.ts';
import { armCapacity, assessPose } from '../../../src/studies/assess.ts';
import { fatigueRows } from '../../../src/studies/assessFatigue.ts';
import type { CheckRow } from '../../../src/studies/results.ts';
import { oneJoint } from './oneJoint.ts';

const turntable = (turns_with: 'link' | 'housing') =>
  oneJoint({
    travel: [-180, 180],
    link: { name: 'turntable', mass_kg: 50, centre_mm: [300, 0, 200] },
    support: {
      arrangement: 'cantilever',
      hub_mm: 0,
      span_mm: 60,
      overhang_mm: 30,
      side: '-',
      thrust: 'both',
      adjusted: 'back-to-back',
      bearings: { A: 'row', B: 'row' },
      shaft: { diameter_mm: 20, material: 'steel-c45', turns_with },
    },
    bearings: {
      row: {
        kind: 'angular-contact',
        bore_mm: 20,
        outer_mm: 42,
        width_mm: 12,
        contact_angle_deg: 40,
        C_N: 14000,
        C0_N: 6000,
      },
    },
    cases: [{ name: 'standing' }, { name: 'pressed', tip_force: { force_N: 4000, direction: { base: [0, 0, -1] } } }],
    targets: { static_safety: 1.5, shaft_yield_safety: 1.5, shaft_fatigue_safety: 1.5 },
  });

const arm = turntable('link');
const chain = flattenArm(arm);
const assessed = assessPose(arm, chain, armCapacity(arm, chain), [0]);
const row = (check: string, bearing: CheckRow['bearing'], load = 'standing') =>
  assessed.find((one) => one.case === load)!.rows.find((one) => one.check === check && one.bearing === bearing)!;

describe('a turntable on a cantilever, by hand', () => {
  it.each([
    ['standing', 'A', 1743.941, 0.435985],
    ['pressed', 'A', 2558.875, 0.639719],
    ['standing', 'B', 1743.941, 0.435985],
    ['pressed', 'B', 1743.941, 0.435985],
  ] as const)('%s: static load on %s', (load, bearing, value, utilisation) => {
    const found = row('static', bearing, load);
    expect(found.value / value).toBeCloseTo(1, 6);
    expect(found.allowable).toBe(4000);
    expect(found.utilisation).toBeCloseTo(utilisation, 5);
    expect(found.verdict).toBe('pass');
  });

  it('has the dynamic equivalent loads of the hand, without a verdict', () => {
    expect(row('equivalent', 'A').value / 2028.592).toBeCloseTo(1, 6);
    expect(row('equivalent', 'B').value / 1743.941).toBeCloseTo(1, 6);
    expect(row('equivalent', 'A').verdict).toBeNull();
  });

  it('stresses the shaft at the hub, the thrust included', () => {
    expect(row('stress', null).value / 192.5775e6).toBeCloseTo(1, 6);
    expect(row('stress', null).utilisation).toBeCloseTo(0.931826, 5);
    expect(row('stress', null, 'pressed').value / 205.3099e6).toBeCloseTo(1, 6);
    expect(row('stress', null, 'pressed').utilisation).toBeCloseTo(0.993435, 5);
    expect(row('stress', null, 'pressed')).toMatchObject({ verdict: 'pass' });
    // Between the two the moment is the same.
    expect(['hub', 'pressure centre A']).toContain(row('stress', null, 'pressed').where);
  });

  it('slopes too much in both bearings', () => {
    expect(row('slope', 'A').value / 1.614241e-3).toBeCloseTo(1, 5);
    expect(row('slope', 'A').utilisation).toBeCloseTo(5.54935, 4);
    expect(row('slope', 'B').value / 1.153672e-3).toBeCloseTo(1, 5);
    expect(row('slope', 'B').utilisation).toBeCloseTo(3.96603, 4);
    for (const side of ['A', 'B'] as const) expect(row('slope', side).verdict).toBe('over');
  });

  it('sees no alternating stress in a shaft that goes round with the load', () => {
    const [fatigue] = fatigueRows(arm, chain);
    expect(fatigue!.utilisation! / 0.924125).toBeCloseTo(1, 3);
    expect(fatigue!.verdict).toBe('pass');
    expect(fatigue!.reason).toContain('from sampled poses only');
  });

  it('sees a full reversal in a shaft that stands still under it', () => {
    const still = turntable('housing');
    const [fatigue] = fatigueRows(still, flattenArm(still));
    expect(fatigue!.utilisation! / 1.631528).toBeCloseTo(1, 3);
    expect(fatigue!.verdict).toBe('over');
    expect(fatigue!.value / 190.9859e6).toBeCloseTo(1, 3);
  });
});
