import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Drive } from '../../../src/arm/arm.ts';
import {
  type BushingLoad,
  bushingPressure,
  bushingSentence,
  bushingTilt,
  bushingUse,
  COUPLE_SPAN,
  edgePressureForms,
  singleBushingWarnings,
  swingSpeed,
  turningSpeed,
} from '../../../src/capacity/plain/index.ts';
import { seededRandom } from '../../../src/math/random.ts';
import { shaftLoads } from '../../../src/mechanics/beamForms.ts';
import { ringChecks } from '../../../src/mechanics/bearingPair.ts';
import { checkValue } from '../../../src/mechanics/form.ts';

const near = (value: number, expected: number, relative: number) =>
  expect(Math.abs(value - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));

function pressure(load: BushingLoad, bore: number, length: number) {
  const result = bushingPressure(load, bore, length);
  if ('unassessed' in result) throw new Error(result.unassessed);
  return result.value;
}

const value = (result: { value: number } | { unassessed: string }) => ('value' in result ? result.value : Number.NaN);

describe('plain bushing: published example', () => {
  // Wentzell, Machine Design, Example 19.1, p. 417 (verified)
  const [F, d, omega, limit] = [88.96443, 0.01905, (500 * 2 * Math.PI) / 60, 105076.1];

  it('pressure, sliding speed and PV', () => {
    const p = pressure({ fx: F, fy: 0, mx: 0, my: 0 }, d, 0.022225);
    const v = value(turningSpeed(omega, d));
    near(p.mean, 210125.9, 0.002);
    near(v, 0.4987278, 0.002);
    near(p.edge * v, 104795.7, 0.002);
    const use = bushingUse(p.edge, v, v, { pressureLimit: null, speedLimit: null, pvLimit: limit });
    near(value(use.pv), 104795.7 / limit, 0.002);
    expect(use.pressure).toHaveProperty('unassessed');
    expect(use.speed).toHaveProperty('unassessed');
  });

  it('the least length 0.02216568 m stands at the limit', () => {
    const p = pressure({ fx: 0, fy: -F, mx: 0, my: 0 }, d, 0.02216568);
    const v = value(turningSpeed(-omega, d));
    const use = bushingUse(p.edge, v, v, { pressureLimit: 1e6, speedLimit: 1, pvLimit: limit });
    near(value(use.pv), 1, 0.002);
  });
});

describe('plain bushing: the couple over its length', () => {
  it('line load summed along the length gives back force and couple; its largest value is the edge pressure (seed 101)', () => {
    const random = seededRandom(101);
    for (let trial = 0; trial < 50; trial++) {
      const [d, L] = [random.between(0.005, 0.05), random.between(0.005, 0.1)];
      const load = {
        fx: random.between(-500, 500),
        fy: random.between(-500, 500),
        mx: random.between(-20, 20),
        my: random.between(-20, 20),
      };
      const found = pressure(load, d, L);
      // Straight line load q(s) with the ends' values, integrated by the midpoint rule.
      const steps = 4000;
      let [fx, fy, mx, my, most] = [0, 0, 0, 0, 0];
      for (let i = 0; i <= steps; i++) {
        const s = -L / 2 + (L * i) / steps;
        const q = [load.fx / L + (12 * s * load.my) / L ** 3, load.fy / L - (12 * s * load.mx) / L ** 3] as const;
        const w = (i === 0 || i === steps ? 0.5 : 1) * (L / steps);
        fx += w * q[0];
        fy += w * q[1];
        // s z × q
        mx -= w * s * q[1];
        my += w * s * q[0];
        most = Math.max(most, Math.hypot(...q) / d);
      }
      expect(fx).toBeCloseTo(load.fx, 6);
      expect(fy).toBeCloseTo(load.fy, 6);
      expect(mx).toBeCloseTo(load.mx, 5);
      expect(my).toBeCloseTo(load.my, 5);
      near(found.edge, most, 1e-9);
    }
  });

  it('a pure couple: two triangles whose resultants stand 2/3 of the length apart', () => {
    const [d, L, M] = [0.02, 0.03, 5];
    const found = pressure({ fx: 0, fy: 0, mx: M, my: 0 }, d, L);
    expect(found.mean).toBe(0);
    near(found.edge, (6 * M) / (d * L * L), 1e-12);
    near(found.coupleForce * COUPLE_SPAN * L, M, 1e-12);
    // Area of one triangle: half of the length, height edge·d
    near(found.coupleForce, (found.edge * d * L) / 4, 1e-12);
    expect(found.changesSide).toBe(true);
  });

  it('force and couple in one plane: F/(dL) + 6M/(dL²); at right angles: their hypotenuse', () => {
    const [d, L] = [0.02, 0.03];
    near(pressure({ fx: 100, fy: 0, mx: 0, my: 0.4 }, d, L).edge, 100 / (d * L) + 2.4 / (d * L * L), 1e-12);
    near(pressure({ fx: 100, fy: 0, mx: 0.4, my: 0 }, d, L).edge, Math.hypot(100 / (d * L), 2.4 / (d * L * L)), 1e-12);
    expect(pressure({ fx: 100, fy: 0, mx: 0.49, my: 0 }, d, L).changesSide).toBe(false);
    expect(pressure({ fx: 100, fy: 0, mx: 0.51, my: 0 }, d, L).changesSide).toBe(true);
  });

  it('more load never lowers the edge pressure; a longer bushing never raises it', () => {
    const size = fc.double({ min: -1e3, max: 1e3, noNaN: true });
    const k = fc.double({ min: 1, max: 10, noNaN: true });
    fc.assert(
      fc.property(size, size, size, size, k, (fx, fy, mx, my, more) => {
        const base = pressure({ fx, fy, mx, my }, 0.02, 0.03).edge;
        expect(
          pressure({ fx: more * fx, fy: more * fy, mx: more * mx, my: more * my }, 0.02, 0.03).edge,
        ).toBeGreaterThanOrEqual(base * (1 - 1e-12));
        expect(pressure({ fx, fy, mx, my }, 0.02, 0.03 * more).edge).toBeLessThanOrEqual(base * (1 + 1e-12));
      }),
      { seed: 102, numRuns: 300 },
    );
  });

  it.each([null, { kind: 'gear', station: -0.05, radius: 0.03, pressureAngle: 0.349, mesh: 1.1 } as Drive])(
    'the convex forms equal the pressure at a pose (seed 103), drive %o',
    (drive) => {
      const random = seededRandom(103);
      const [station, d, L] = [0.04, 0.02, 0.03];
      const checks = ringChecks(0, station, drive);
      const forms = (check: string) => checks.find((c) => c.check === check)!.forms;
      const edge = {
        check: 'edge pressure',
        joint: 0,
        bearing: 'ring',
        unit: 'Pa',
        forms: edgePressureForms(forms('radial'), forms('moment'), d, L),
      } as const;
      for (let trial = 0; trial < 50; trial++) {
        const w = Array.from({ length: 6 }, () => random.between(-100, 100));
        // All loads moved to the middle of the bushing by plain statics: M = Σ m + (s - station) z × f.
        const load = shaftLoads({ hub: 0.1, drive }, w, 0).reduce(
          (sum, l) => ({
            fx: sum.fx + l.fx,
            fy: sum.fy + l.fy,
            mx: sum.mx + l.mx - (l.station - station) * l.fy,
            my: sum.my + l.my + (l.station - station) * l.fx,
          }),
          { fx: 0, fy: 0, mx: 0, my: 0 },
        );
        near(checkValue(edge, w, 0), pressure(load, d, L).edge, 1e-9);
      }
    },
  );

  it('refuses broken dimensions and loads', () => {
    const load = { fx: 1, fy: 0, mx: 0, my: 0 };
    for (const [d, L] of [
      [0, 0.01],
      [0.01, 0],
      [-1, 0.01],
      [0.01, Number.NaN],
      [Number.POSITIVE_INFINITY, 0.01],
    ] as const) {
      expect(bushingPressure(load, d, L)).toHaveProperty('unassessed');
    }
    for (const field of ['fx', 'fy', 'mx', 'my']) {
      expect(bushingPressure({ ...load, [field]: Number.NaN }, 0.01, 0.01)).toHaveProperty('unassessed');
    }
  });
});

describe('plain bushing: warnings, speed, tilt', () => {
  it('warns only where it stands alone under a couple, more plainly where it is short or the couple is large', () => {
    const [d, L] = [0.02, 0.04];
    expect(singleBushingWarnings(pressure({ fx: 50, fy: 0, mx: 0, my: 0 }, d, L), d, L)).toEqual([]);
    expect(singleBushingWarnings(pressure({ fx: 50, fy: 0, mx: 0.1, my: 0 }, d, L), d, L)).toEqual([
      'single-bushing-couple',
    ]);
    expect(singleBushingWarnings(pressure({ fx: 50, fy: 0, mx: 5, my: 0 }, d, 0.02), d, 0.02)).toEqual([
      'single-bushing-couple',
      'short-bushing-couple',
      'couple-changes-side',
    ]);
    expect(bushingSentence('short-bushing-couple')).toContain('bore');
  });

  it('swing: path over time (mean), derivative at mid swing (peak); a swing of ±π twice a turn', () => {
    const [theta, f, d] = [0.6, 1.5, 0.03];
    const result = swingSpeed(theta, f, d);
    if ('unassessed' in result) throw new Error(result.unassessed);
    const angle = (t: number) => theta * Math.sin(2 * Math.PI * f * t);
    let path = 0;
    const steps = 20000;
    for (let i = 0; i < steps; i++) path += Math.abs(angle((i + 1) / steps / f) - angle(i / steps / f));
    near(result.value.mean, (path * d * f) / 2, 1e-6);
    near(result.value.peak, (((angle(1e-6) - angle(-1e-6)) / 2e-6) * d) / 2, 1e-8);
    // ±90° once a cycle covers one full turn a cycle.
    const turn = swingSpeed(Math.PI / 2, f, d);
    near('value' in turn ? turn.value.mean : Number.NaN, value(turningSpeed(2 * Math.PI * f, d)), 1e-12);
    expect(swingSpeed(-1, 1, 1)).toHaveProperty('unassessed');
    expect(swingSpeed(1, Number.NaN, 1)).toHaveProperty('unassessed');
    expect(turningSpeed(1, 0)).toHaveProperty('unassessed');
    expect(turningSpeed(Number.NaN, 1)).toHaveProperty('unassessed');
  });

  it('tilt: the journal touches opposite sides at both ends', () => {
    const [c, L] = [4e-5, 0.02];
    const tilt = value(bushingTilt(c, L));
    near((tilt * L) / 2, c / 2, 1e-12);
    expect(bushingTilt(0, L)).toEqual({ value: 0 });
    expect(bushingTilt(null, L)).toHaveProperty('unassessed');
    expect(bushingTilt(c, 0)).toHaveProperty('unassessed');
    expect(bushingTilt(Number.NaN, L)).toHaveProperty('unassessed');
  });
});
