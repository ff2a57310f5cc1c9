/** Two bearings from load to life, every number worked on paper in the comments. Invented loads and ratings. */
import { describe, expect, test } from 'vitest';
import {
  dynamicEquivalent,
  dynamicForm,
  factorsInForce,
  inducedThrust,
  lifeRevolutions,
  lifeSeconds,
  pressureCentreOffset,
  pressureCentres,
  reliabilityFactor,
  sharedThrust,
  staticEquivalent,
  staticForm,
  staticSafety,
  swingRate,
  thrustOnA,
} from '../../../src/capacity/rolling/index.ts';
import { bearing, DEGREE, known } from './bearings.ts';

function near(found: number, byHand: number): void {
  expect(Math.abs(found / byHand - 1), `${found} against ${byHand}`).toBeLessThan(5e-4);
}

test('a deep groove bearing at a swinging joint', () => {
  // C 12.7 kN, C0 6.2 kN, f0 13.1. Fr 900 N, Fa 620 N. Swing ±60°, 6 there and back a minute. 95 % reliability.
  const b = bearing('deep-groove', { C: 12700, C0: 6200, f0: 13.1 });

  // P0 = max(900, 0.6 · 900 + 0.5 · 620) = max(900, 850) = 900 N; s0 = 6200/900 = 6.889.
  const P0 = staticEquivalent(known(staticForm(b)), 900, 620);
  near(staticSafety(6200, P0), 6.889);

  // f0 Fa/C0 = 13.1 · 620/6200 = 1.31, between 1.03 and 1.38 at (1.31-1.03)/0.35 = 0.8.
  // e = 0.28 + 0.8 · 0.02 = 0.296; Fa/Fr = 0.689 > e; Y = 1.55 - 0.8 · 0.10 = 1.47.
  const form = known(dynamicForm(b));
  const force = factorsInForce(form, 900, 620);
  near(force.e, 0.296);
  near(force.Y, 1.47);
  // P = 0.56 · 900 + 1.47 · 620 = 504 + 911.4 = 1415.4 N.
  const P = dynamicEquivalent(form, 900, 620);
  near(P, 1415.4);

  // L10 = (12700/1415.4)³ = 8.97273³ = 722.38 million revolutions.
  const L10 = lifeRevolutions(12700, P, 3);
  near(L10 / 1e6, 722.38);
  // One swing sweeps 4 · 60° = 240° = 2/3 revolution; 6 a minute: 4 revolutions a minute.
  // a1 at 95 %: 0.6379. 0.6379 · 722.38e6/4 = 1.15202e8 min = 1 920 030 h.
  const hours = lifeSeconds(known(reliabilityFactor(0.95)) * L10, swingRate(60 * DEGREE, 6 / 60)) / 3600;
  near(hours, 1920030);
});

describe('an angular contact pair back to back, 25°, overhung load', () => {
  // 20 × 47 × 14, C 13.3 kN, C0 7.6 kN, dpw 33.5 mm. A at 0, B at 40 mm (ring centres). Radial load 1000 N at -30 mm, thrust 300 N along +
  // axis on the shaft.
  const b = bearing('angular-contact', { C: 13300, C0: 7600, contactAngle: 25 * DEGREE });

  test('supports, radial loads, thrust, equivalent loads, life', () => {
    // Offset 16.75 · tan 25° = 7.8107 mm: pressure centres at -7.8107 and 47.8107 mm, span 55.6213 mm instead of 40.
    const offset = known(pressureCentreOffset(b));
    const centres = known(pressureCentres('back-to-back', 0, 0.04, offset, offset));
    near(centres.span, 0.0556213);

    // Overhang to A's centre 30 - 7.8107 = 22.1893 mm. FrB = 1000 · 22.1893/55.6213 = 398.94 N; FrA = 1398.94 N.
    // With the ring centres it would have been 750 and 1750 N.
    const FrB = (1000 * (-0.03 - centres.stationA)) / -centres.span;
    const FrA = 1000 + FrB;
    near(FrB, 398.94);
    near(FrA, 1398.94);

    // Back to back, a shaft pushed from A towards B loads A: Ka = +300 N. SA = 0.68 · 1398.94 = 951.28, SB = 0.68 · 398.94 = 271.28 N.
    // SB + Ka = 571.28 < SA: A carries 951.28 N, B carries 951.28 - 300 = 651.28 N.
    const Ka = thrustOnA('back-to-back', 0, 0.04, 300, 'shaft');
    expect(Ka).toBe(300);
    const law = known(inducedThrust(b));
    const thrust = sharedThrust(law, law, FrA, FrB, Ka);
    near(thrust.FaA, 951.28);
    near(thrust.FaB, 651.28);

    // A: Fa/Fr = 0.68 = e: P = Fr = 1398.94 N (0.41 · 1398.94 + 0.87 · 951.28 = 1401.18 by the other line, which is taken).
    // B: Fa/Fr = 1.633 > e: P = 0.41 · 398.94 + 0.87 · 651.28 = 730.18 N.
    const form = known(dynamicForm(b));
    near(dynamicEquivalent(form, FrA, thrust.FaA), 1401.18);
    near(dynamicEquivalent(form, FrB, thrust.FaB), 730.18);
    // L10 of A = (13300/1401.18)³ = 855.2 million revolutions.
    near(lifeRevolutions(13300, dynamicEquivalent(form, FrA, thrust.FaA), 3) / 1e6, 855.2);

    // Static, A: max(1398.94, 0.5 · 1398.94 + 0.38 · 951.28 = 1060.96) = 1398.94 N; s0 = 5.433.
    near(staticSafety(7600, staticEquivalent(known(staticForm(b)), FrA, thrust.FaA)), 5.4327);

    // Thrust the other way: Ka = -300: SB + Ka < SA still; A 951.28 N, B 1251.28 N.
    const reversed = sharedThrust(law, law, FrA, FrB, -300);
    near(reversed.FaA, 951.28);
    near(reversed.FaB, 1251.28);
  });
});
