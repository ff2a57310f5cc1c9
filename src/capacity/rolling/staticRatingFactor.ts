/**
 * The factor f0 of the basic static rating of ball bearings, from Hertz.
 *
 *     f0 = 0.2 Q / Dw²      Q: the ball load that raises the peak pressure of its worse contact to 4200 MPa (self-aligning: 4600)
 *
 * Elliptical contact of ball and groove: curvature sum Σρ, difference τ = ((κ²+1)E - 2K)/((κ²-1)E) with K, E the complete elliptic
 * integrals at m = 1 - 1/κ²; half axis a = (6 κ² E Q/(π Σρ E'))^(1/3), b = a/κ, peak 1.5 Q/(π a b). Hence
 *
 *     Q = p³ · 36 π κ E² / (1.5³ (Σρ E')²),   E' = 207 GPa / (1 - 0.3²)
 *
 * Grooves 0.52 Dw inside, 0.53 Dw outside; self-aligning: 0.53 Dw inside, a sphere outside.
 * Source: ISO 76:2006 table 1 and ISO/TR 10657; recomputed (all 41 rows of the groove ball table within 0.06). The self-aligning
 * form is from memory.
 */
import type { Rule } from './rule.ts';

export const STATIC_FACTOR_RULE: Rule = {
  name: 'f0 of the static rating',
  formula: 'f0 = 0.2 Q/Dw², Q at a Hertz pressure of 4200 MPa (self-aligning 4600 MPa)',
  source: 'ISO 76:2006, table 1',
  trust: 'recomputed',
  units: 'N/mm²',
  range: 'γ 0 to 0.40',
};

/** Complete elliptic integrals of parameter m in [0, 1) by the arithmetic-geometric mean (Abramowitz and Stegun 17.6). */
function ellipticIntegrals(m: number): readonly [K: number, E: number] {
  let a = 1;
  let b = Math.sqrt(1 - m);
  let sum = m / 2;
  let weight = 0.5;
  for (let i = 0; i < 40 && a - b > 1e-16 * a; i++) {
    const c = (a - b) / 2;
    const mean = (a + b) / 2;
    b = Math.sqrt(a * b);
    a = mean;
    weight *= 2;
    sum += weight * c * c;
  }
  const K = Math.PI / (2 * a);
  return [K, K * (1 - sum)];
}

/** Axis ratio κ ≥ 1 of the contact ellipse whose curvature difference is τ in [0, 1), by bisection in log κ. */
function axisRatio(tau: number): number {
  const difference = (kappa: number) => {
    const [K, E] = ellipticIntegrals(1 - 1 / (kappa * kappa));
    return ((kappa * kappa + 1) * E - 2 * K) / ((kappa * kappa - 1) * E);
  };
  // A ball on a sphere touches in a circle; the formula above is 0/0 there.
  if (tau < 1e-6) return 1;
  let low = 1 + 1e-7;
  let high = 1e4;
  for (let i = 0; i < 64; i++) {
    const middle = Math.sqrt(low * high);
    if (difference(middle) < tau) low = middle;
    else high = middle;
  }
  return Math.sqrt(low * high);
}

/**
 * Ball load over Dw², N/mm², that brings the peak to `pressure` MPa. `along`: curvature of the race in the rolling direction times Dw
 * (positive inside, negative outside); `groove`: groove radius over Dw.
 */
function ballLoad(along: number, groove: number, pressure: number): number {
  const modulus = 207_000 / (1 - 0.3 * 0.3);
  const sum = 4 - 1 / groove + along;
  const kappa = axisRatio(Math.abs(1 / groove + along) / sum);
  const [, E] = ellipticIntegrals(1 - 1 / (kappa * kappa));
  return (pressure ** 3 * 36 * Math.PI * kappa * E * E) / (1.5 ** 3 * (sum * modulus) ** 2);
}

/** f0, N/mm², of groove ball bearings (radial and angular contact); NaN unless 0 ≤ γ < 1. */
export function grooveStaticFactor(gamma: number): number {
  if (!(gamma >= 0 && gamma < 1)) return Number.NaN;
  const inner = ballLoad((2 * gamma) / (1 - gamma), 0.52, 4200);
  const outer = ballLoad((-2 * gamma) / (1 + gamma), 0.53, 4200);
  return 0.2 * Math.min(inner, outer);
}

/** f0, N/mm², of self-aligning ball bearings; NaN unless 0 < γ < 1. From memory (pressure and grooves). */
export function selfAligningStaticFactor(gamma: number): number {
  if (!(gamma > 0 && gamma < 1)) return Number.NaN;
  const inner = ballLoad((2 * gamma) / (1 - gamma), 0.53, 4600);
  const outer = ballLoad((-2 * gamma) / (1 + gamma), 0.5 * (1 / gamma + 1), 4600);
  return 0.2 * Math.min(inner, outer);
}
