import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { RollingBearing } from '../../../src/arm/arm.ts';
import {
  BALL_SHARE,
  ballApproach,
  ROLLER_SHARE,
  radialStiffness,
  rollerApproach,
} from '../../../src/capacity/play/index.ts';

const BEARING: RollingBearing = {
  kind: 'deep-groove',
  bore: 0.02,
  outer: 0.042,
  width: 0.012,
  C: null,
  C0: null,
  contactAngle: null,
  e: null,
  Y: null,
  Y0: null,
  f0: null,
  pitchDiameter: 0.031,
  ballDiameter: 0.00635,
  balls: 9,
  rows: 1,
  clearance: 'CN',
  shaftFit: null,
  housingFit: null,
  misalignment: null,
  stiffness: null,
  source: null,
};

const of = (change: Partial<RollingBearing>, load: number): number => {
  const result = radialStiffness({ ...BEARING, ...change }, load);
  return 'value' in result ? result.value.stiffness : Number.NaN;
};

/** Exact Hertz approach of an elliptical contact: elliptic integrals by quadrature, axis ratio by bisection. */
function exactApproach(Q: number, along: number, across: number): number {
  const E = 207e9 / (1 - 0.09);
  const integral = (f: (sine2: number) => number) => {
    const steps = 4000;
    let sum = 0;
    for (let i = 0; i < steps; i++) sum += f(Math.sin(((i + 0.5) / steps) * (Math.PI / 2)) ** 2);
    return (sum * Math.PI) / 2 / steps;
  };
  const first = (m: number) => integral((s) => 1 / Math.sqrt(1 - m * s));
  const second = (m: number) => integral((s) => Math.sqrt(1 - m * s));
  const tau = (along - across) / (along + across);
  let [low, high] = [1 + 1e-6, 1e3];
  for (let i = 0; i < 60; i++) {
    const k = Math.sqrt(low * high);
    const [K, e] = [first(1 - 1 / k ** 2), second(1 - 1 / k ** 2)];
    if (((k * k + 1) * e - 2 * K) / ((k * k - 1) * e) < tau) low = k;
    else high = k;
  }
  const k = Math.sqrt(low * high);
  const [K, e] = [first(1 - 1 / k ** 2), second(1 - 1 / k ** 2)];
  // a: long half axis; δ = 3 Q K/(π a E) with E = 207 GPa/(1-ν²) for two steel bodies
  const a = Math.cbrt((6 * k * k * e * Q) / (Math.PI * (along + across) * E));
  return (3 * Q * K) / (Math.PI * a * E);
}

describe('radial stiffness of a bearing', () => {
  it('the fits of the ball contact stay within 3 % of Hertz by elliptic integrals', () => {
    for (const gamma of [0.1, 0.2, 0.3]) {
      for (const groove of [0.515, 0.52, 0.53]) {
        for (const along of [2 / (1 - gamma), 2 / (1 + gamma)]) {
          const [a, c] = [along / 0.00635, (2 - 1 / groove) / 0.00635];
          expect(Math.abs(ballApproach(300, a, c) / exactApproach(300, a, c) - 1)).toBeLessThan(0.03);
        }
      }
    }
  });

  it('ball on a sphere: within 6 % of the closed form of a circular contact, (9 Q² / (16 E*² R))^(1/3), E* = E/2(1-ν²)', () => {
    const curvature = 400;
    const Estar = 207e9 / (2 * (1 - 0.09));
    const exact = Math.cbrt((9 * 250 ** 2 * curvature) / (16 * Estar ** 2));
    expect(Math.abs(ballApproach(250, curvature, curvature) / exact - 1)).toBeLessThan(0.06);
  });

  it('load shares are the integrals of the load zone', () => {
    const share = (n: number) => {
      let sum = 0;
      const steps = 20000;
      for (let i = 0; i < steps; i++) sum += Math.cos(((i + 0.5) / steps - 0.5) * Math.PI) ** (n + 1) / steps;
      return sum / 2;
    };
    expect(share(1.5)).toBeCloseTo(BALL_SHARE, 4);
    expect(share(10 / 9)).toBeCloseTo(ROLLER_SHARE, 4);
  });

  it('deep groove against the handbook form δ = 4.36e-4 (Q²/Dw)^(1/3), Q = 5F/Z (N, mm; Palmgren, from memory)', () => {
    for (const F of [100, 500, 2000]) {
      const Q = (5 * F) / 9;
      const delta = (4.36e-4 * Math.cbrt(Q ** 2 / 6.35)) / 1e3;
      expect(Math.abs((of({}, F) * delta) / F - 1)).toBeLessThan(0.2);
    }
  });

  it('roller contact against the line contact of Lundberg: 2Q(1-ν²)/(πEl) ln(πEl²/(Q(1-ν²)(1∓γ))) (from memory)', () => {
    const compliance = (1 - 0.09) / (Math.PI * 207e9);
    for (const [Q, l] of [
      [200, 0.006],
      [1000, 0.01],
      [3000, 0.012],
    ] as const) {
      const lundberg = ((2 * Q * compliance) / l) * Math.log((l * l) / (Q * compliance));
      expect(Math.abs(rollerApproach(Q, l) / lundberg - 1)).toBeLessThan(0.2);
    }
  });

  it('summed over the balls, the approach found carries the load (statics of the load zone)', () => {
    // Many balls make the sum an integral: F = Σ Q cos ψ with Q = Qmax cos^1.5 ψ.
    const F = 700;
    const k = of({}, F);
    const Qmax = F / (9 * BALL_SHARE);
    let sum = 0;
    const fine = 9000;
    for (let i = 0; i < fine; i++) {
      const c = Math.cos((2 * Math.PI * i) / fine);
      if (c > 0) sum += ((Qmax * c ** 1.5 * c) / fine) * 9;
    }
    expect(sum / F).toBeCloseTo(1, 3);
    expect(F / k).toBeGreaterThan(1e-6);
    expect(F / k).toBeLessThan(2e-5);
  });

  it('stiffer with load (cube root for balls), more elements, rollers; softer when oblique', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 1e4, noNaN: true }),
        fc.double({ min: 1, max: 8, noNaN: true }),
        (F, more) => {
          expect(of({}, F * more) / of({}, F)).toBeCloseTo(Math.cbrt(more), 9);
          expect(of({ balls: 8 }, F)).toBeLessThan(of({ balls: 9 }, F));
          expect(of({ kind: 'angular-contact', contactAngle: 0.44 }, F)).toBeLessThan(of({}, F));
        },
      ),
      { seed: 121, numRuns: 50 },
    );
    const free = { pitchDiameter: null, ballDiameter: null, balls: null };
    expect(of({ kind: 'cylindrical-roller', ...free }, 500)).toBeGreaterThan(of({ ...free }, 500));
    expect(of({ kind: 'self-aligning-ball', contactAngle: 0.15, rows: 2, ...free }, 500)).toBeGreaterThan(0);
  });

  it('given stiffness as it stands; estimates say so; rings, bushings, no load and broken numbers are unassessed', () => {
    expect(radialStiffness({ ...BEARING, stiffness: 5e7 }, 0)).toEqual({ value: { stiffness: 5e7, estimated: false } });
    expect(radialStiffness(BEARING, 100)).toMatchObject({ value: { estimated: true } });
    expect(of({ stiffness: -1 }, 100)).toBeNaN();
    expect(of({ stiffness: Number.NaN }, 100)).toBeNaN();
    expect(of({ kind: 'crossed-roller' }, 100)).toBeNaN();
    for (const load of [0, -5, Number.NaN, Number.POSITIVE_INFINITY]) expect(of({}, load)).toBeNaN();
    expect(of({ ballDiameter: 0.02 }, 100)).toBeNaN();
    expect(of({ bore: Number.NaN, pitchDiameter: null }, 100)).toBeNaN();
  });
});
