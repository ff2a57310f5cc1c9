import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findMaterial, MATERIALS, type Material, shearModulus } from '../../../src/capacity/materials.ts';
import {
  elliptic,
  enduranceStrength,
  fatigueFactors,
  fatigueSafety,
  gerber,
  goodman,
  type LoadCycle,
  NO_NOTCH,
  notchSensitivity,
  reliabilityFactor,
  roundSection,
  sectionStress,
  shearShare,
  sizeFactor,
  soderberg,
  stressCycle,
  surfaceFactor,
  yieldSafety,
} from '../../../src/capacity/shaft/index.ts';

const near = (value: number, expected: number, relative: number) =>
  expect(Math.abs(value - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));

function material(key: string): Material {
  const found = findMaterial(key);
  if ('unassessed' in found) throw new Error(found.unassessed);
  return found.value;
}

/** Shigley 9th ed., Example 7-1, pp. 370-371 (verified); numbers of the example, not of the product's table. */
const EXAMPLE = {
  section: roundSection(0.02794, 0),
  Kf: { bending: 1.578, torsion: 1.3696 },
  cycle: { momentAmplitude: 142.3609, momentMean: 0, torqueAmplitude: 0, torqueMean: 124.2833 },
  strengths: { Se: 202016400, Sut: 723949500, Sy: 565370100 },
};
const KPSI = 6894757;

describe('round section', () => {
  it('solid: πd⁴/64, πd³/32, πd³/16; hollow is the difference of two solids and tends to the solid', () => {
    const solid = roundSection(0.02, 0);
    near(solid.I, (Math.PI * 0.02 ** 4) / 64, 1e-15);
    near(solid.W, (Math.PI * 0.02 ** 3) / 32, 1e-15);
    near(solid.Wp, (Math.PI * 0.02 ** 3) / 16, 1e-15);
    near(roundSection(0.02, 0.012).I, solid.I - roundSection(0.012, 0).I, 1e-12);
    near(roundSection(0.02, 1e-6).W, solid.W, 1e-12);
    near(shearShare(0.02, 1e-6, 0.3), shearShare(0.02, 0, 0.3), 1e-6);
  });

  it('thin tube: I = πr³t; shear share 2(1+ν)/(4+3ν), solid 6(1+ν)/(7+6ν) (Cowper)', () => {
    const [r, t] = [0.05, 1e-5];
    near(roundSection(2 * r + t, 2 * r - t).I, Math.PI * r ** 3 * t, 1e-6);
    near(shearShare(1, 1 - 1e-9, 0.29), (2 * 1.29) / (4 + 3 * 0.29), 1e-8);
    near(shearShare(1, 0, 0.29), (6 * 1.29) / (7 + 6 * 0.29), 1e-12);
  });

  it.each([
    [0, 0],
    [-0.01, 0],
    [0.01, 0.01],
    [0.01, -0.001],
    [0.01, Number.NaN],
    [Number.NaN, 0],
    [Number.POSITIVE_INFINITY, 0],
  ])('diameter %f, bore %f: no section', (diameter, bore) => {
    const section = roundSection(diameter, bore);
    for (const value of [section.area, section.I, section.J, section.W, section.Wp]) expect(value).toBeNaN();
    const load = { moment: 1, torque: 1, axial: 1, shear: 1 };
    expect(yieldSafety(load, section, NO_NOTCH, 3e8)).toHaveProperty('unassessed');
  });
});

describe('stress and yield', () => {
  it('bending, torsion and greatest shear of a gear shaft (Wentzell, Machine Design, ex. 17.1, 17.2; verified)', () => {
    const load = { moment: 40.57963, torque: 20.33727, axial: 0, shear: 0 };
    const stress = sectionStress(load, roundSection(0.01905, 0), NO_NOTCH);
    near(stress.bending, 59789270, 0.005);
    near(stress.torsion, 14982280, 0.005);
    near(stress.greatestShear, 33438870, 0.005);
  });

  it('von Mises stress and yield safety (Shigley ex. 7-1; verified)', () => {
    const load = { moment: 142.3609, torque: 124.2833, axial: 0, shear: 0 };
    near(sectionStress(load, EXAMPLE.section, EXAMPLE.Kf).vonMises, 125481100, 0.005);
    const safety = yieldSafety(load, EXAMPLE.section, EXAMPLE.Kf, EXAMPLE.strengths.Sy);
    near('value' in safety ? safety.value : Number.NaN, 4.505618, 0.005);
  });

  it('principal stresses give the same von Mises stress', () => {
    const load = { moment: 31, torque: 44, axial: 900, shear: 0 };
    const stress = sectionStress(load, roundSection(0.018, 0.006), NO_NOTCH);
    const sigma = stress.bending + stress.axial;
    const middle = sigma / 2;
    const radius = Math.hypot(middle, stress.torsion);
    const [s1, s2] = [middle + radius, middle - radius];
    near(stress.vonMises, Math.sqrt(s1 * s1 - s1 * s2 + s2 * s2), 1e-12);
    near(stress.greatestShear, radius, 1e-12);
  });

  it('transverse shear: 4V/3A solid, 2V/A thin tube, V Q / I b between', () => {
    const shear = (d: number, b: number) =>
      sectionStress({ moment: 0, torque: 0, axial: 0, shear: 1000 }, roundSection(d, b), NO_NOTCH).shear;
    near(shear(0.02, 0), 4000 / (3 * roundSection(0.02, 0).area), 1e-12);
    near(shear(0.02, 0.02 - 1e-8), 2000 / roundSection(0.02, 0.02 - 1e-8).area, 1e-6);
    const [R, r] = [0.01, 0.006];
    const Q = (2 / 3) * (R ** 3 - r ** 3);
    near(shear(2 * R, 2 * r), (1000 * Q) / (roundSection(2 * R, 2 * r).I * 2 * (R - r)), 1e-12);
  });

  it('a short pin is governed by shear at its neutral axis: √3 τ', () => {
    const section = roundSection(0.01, 0);
    const stress = sectionStress({ moment: 0.1, torque: 0, axial: 0, shear: 5000 }, section, NO_NOTCH);
    near(stress.vonMises, (Math.sqrt(3) * 20000) / (3 * section.area), 1e-12);
  });

  it('more load never raises the safety; none gives Infinity; broken numbers never a value', () => {
    const part = fc.double({ min: 0, max: 1e4, noNaN: true });
    fc.assert(
      fc.property(
        part,
        part,
        part,
        part,
        fc.double({ min: 1, max: 5, noNaN: true }),
        (moment, torque, axial, shear, k) => {
          const section = roundSection(0.02, 0.005);
          const safety = (f: number, which: string) => {
            const load = { moment, torque, axial, shear, [which]: f * { moment, torque, axial, shear }[which]! };
            const result = yieldSafety(load, section, NO_NOTCH, 3e8);
            return 'value' in result ? result.value : Number.NaN;
          };
          for (const which of ['moment', 'torque', 'axial', 'shear']) {
            expect(safety(k, which)).toBeLessThanOrEqual(safety(1, which) * (1 + 1e-12));
          }
        },
      ),
      { seed: 71, numRuns: 200 },
    );
    const none = { moment: 0, torque: 0, axial: 0, shear: 0 };
    const section = roundSection(0.02, 0);
    expect(yieldSafety(none, section, NO_NOTCH, 3e8)).toEqual({ value: Number.POSITIVE_INFINITY });
    for (const broken of [Number.NaN, -1]) {
      for (const which of ['moment', 'torque', 'axial', 'shear']) {
        expect(yieldSafety({ ...none, [which]: broken }, section, NO_NOTCH, 3e8)).toHaveProperty('unassessed');
      }
      expect(yieldSafety(none, section, NO_NOTCH, broken)).toHaveProperty('unassessed');
      expect(yieldSafety(none, section, { bending: broken, torsion: 1 }, 3e8)).toHaveProperty('unassessed');
    }
  });
});

describe('endurance strength', () => {
  it('Marin factors (Shigley ex. 7-1; verified)', () => {
    const Sut = 105 * KPSI;
    near(surfaceFactor('machined', Sut), 0.7865903, 0.002);
    near(sizeFactor(1.1 * 0.0254), 0.8702078, 0.002);
    expect(reliabilityFactor(0.99)).toBe(0.814);
    const steel: Material = { ...material('steel-1050-cd'), Sut };
    const result = enduranceStrength(steel, 1.1 * 0.0254, 'machined', 0.99);
    near('value' in result ? result.value.Se : Number.NaN, 29.25198 * KPSI, 0.002);
    near('value' in result ? result.value.specimen : Number.NaN, 361974800, 1e-6);
  });

  it('factors stay within (0, 1], fall with strength and size, and do not jump where the formula changes', () => {
    for (const finish of ['ground', 'machined', 'hot-rolled', 'forged'] as const) {
      let last = 1;
      for (let Sut = 200e6; Sut <= 2000e6; Sut += 50e6) {
        const ka = surfaceFactor(finish, Sut);
        expect(ka).toBeGreaterThan(0);
        expect(ka).toBeLessThanOrEqual(last);
        last = ka;
      }
    }
    let last = 1;
    for (let mm = 1; mm <= 254; mm += 0.5) {
      const kb = sizeFactor(mm / 1e3);
      expect(kb).toBeGreaterThan(0.6);
      expect(kb).toBeLessThanOrEqual(last);
      last = kb;
    }
    near(sizeFactor(0.0510001), sizeFactor(0.051), 0.003);
  });

  it('finish ranks: ground, machined, hot-rolled, forged', () => {
    const ranks = (['ground', 'machined', 'hot-rolled', 'forged'] as const).map((f) => surfaceFactor(f, 700e6));
    expect([...ranks].sort((a, b) => b - a)).toEqual(ranks);
  });

  it('reliability: ke is 1 - 0.08 z of the normal quantile z (table against formula)', () => {
    // Tail of the normal density beyond z, by the midpoint rule.
    for (const R of [0.9, 0.95, 0.99, 0.999, 0.9999]) {
      const z = (1 - reliabilityFactor(R)) / 0.08;
      let tail = 0;
      const steps = 20000;
      for (let i = 0; i < steps; i++) {
        const x = z + ((i + 0.5) / steps) * 10;
        tail += ((Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI)) * 10) / steps;
      }
      // three digits of ke leave 3 % of the tail
      expect(Math.abs(tail / (1 - R) - 1)).toBeLessThan(0.03);
    }
    expect(reliabilityFactor(0.97)).toBe(reliabilityFactor(0.99));
    expect(reliabilityFactor(0.9999999)).toBeNaN();
    expect(reliabilityFactor(Number.NaN)).toBeNaN();
  });

  it('aluminium: a strength for 5·10⁸ cycles, said so; steel above 1400 MPa is capped at 700', () => {
    const aluminium = enduranceStrength(material('aluminium-6061-t6'), 0.02, 'machined', 0.9);
    expect('value' in aluminium && aluminium.value.cycles).toBe(5e8);
    expect('value' in aluminium && aluminium.value.specimen).toBe(97e6);
    const hard = enduranceStrength(material('steel-4140-qt-205'), 0.02, 'ground', 0.9);
    expect('value' in hard && hard.value.specimen).toBe(700e6);
  });

  it('unassessed beyond 254 mm, for a reliability out of range, for broken numbers', () => {
    const steel = material('steel-c45');
    for (const d of [0.3, 0, -1, Number.NaN]) {
      expect(enduranceStrength(steel, d, 'machined', 0.9)).toHaveProperty('unassessed');
    }
    for (const R of [1, -0.1, Number.NaN]) {
      expect(enduranceStrength(steel, 0.02, 'machined', R)).toHaveProperty('unassessed');
    }
    expect(enduranceStrength({ ...steel, Sut: Number.NaN }, 0.02, 'machined', 0.9)).toHaveProperty('unassessed');
  });
});

describe('notch sensitivity', () => {
  it('Shigley ex. 7-1: q = 0.85 and 0.88, Kf = 1.578 and 1.3696 (verified; fillet of 0.11 in from memory)', () => {
    const steel: Material = { ...material('steel-1050-cd'), Sut: 105 * KPSI };
    near(notchSensitivity(steel, 0.11 * 0.0254, 'bending'), 0.85, 0.006);
    near(notchSensitivity(steel, 0.11 * 0.0254, 'torsion'), 0.88, 0.006);
    const Kf = fatigueFactors(steel, { bending: 1.68, torsion: 1.42 }, 0.11 * 0.0254);
    near(Kf.bending, 1.578, 0.002);
    near(Kf.torsion, 1.3696, 0.002);
  });

  it('from 0 at a crack to 1 at a wide fillet, rising with radius and strength', () => {
    const soft = material('steel-1018-cd');
    const hard = material('steel-4140-qt-425');
    for (const load of ['bending', 'torsion'] as const) {
      expect(notchSensitivity(soft, 0, load)).toBe(0);
      let last = 0;
      for (const r of [1e-4, 5e-4, 1e-3, 5e-3, 1]) {
        const q = notchSensitivity(soft, r, load);
        expect(q).toBeGreaterThan(last);
        expect(q).toBeLessThan(1);
        expect(notchSensitivity(hard, r, load)).toBeGreaterThan(q);
        last = q;
      }
    }
  });

  it('unknown sensitivity counts the full factor: no radius, aluminium, strength out of range', () => {
    const aluminium = material('aluminium-7075-t6');
    const steel = material('steel-c45');
    const factors = { bending: 2.1, torsion: 1.6 };
    expect(fatigueFactors(steel, factors, null)).toEqual(factors);
    expect(fatigueFactors(aluminium, factors, 0.001)).toEqual(factors);
    expect(fatigueFactors(material('steel-4140-qt-205'), factors, 0.001)).toEqual(factors);
    expect(fatigueFactors(steel, { bending: 0.9, torsion: 1 }, null).bending).toBeNaN();
    expect(fatigueFactors(steel, { bending: 2, torsion: 1 }, -1).bending).toBeNaN();
  });
});

describe('fatigue criteria', () => {
  it('Shigley ex. 7-1: Goodman, Gerber, ASME elliptic, Soderberg (verified)', () => {
    const stress = stressCycle(EXAMPLE.cycle, EXAMPLE.section, EXAMPLE.Kf);
    near(goodman(stress, EXAMPLE.strengths), 1.627579, 0.005);
    near(gerber(stress, EXAMPLE.strengths), 1.865041, 0.005);
    near(elliptic(stress, EXAMPLE.strengths), 1.874763, 0.005);
    near(soderberg(stress, EXAMPLE.strengths), 1.559863, 0.005);
  });

  it('the formulas with 16/πd³ of the source give the same (second route)', () => {
    const { Kf, cycle, strengths, section } = EXAMPLE;
    const load = { ...cycle, momentMean: 37, torqueAmplitude: 21 };
    const k = 16 / (Math.PI * section.diameter ** 3);
    const a =
      k * Math.sqrt(4 * (Kf.bending * load.momentAmplitude) ** 2 + 3 * (Kf.torsion * load.torqueAmplitude) ** 2);
    const m = k * Math.sqrt(4 * (Kf.bending * load.momentMean) ** 2 + 3 * (Kf.torsion * load.torqueMean) ** 2);
    const stress = stressCycle(load, section, Kf);
    near(goodman(stress, strengths), 1 / (a / strengths.Se + m / strengths.Sut), 1e-12);
    near(elliptic(stress, strengths), 1 / Math.sqrt((a / strengths.Se) ** 2 + (m / strengths.Sy) ** 2), 1e-12);
    // Gerber as the parabola n σa/Se + (n σm/Sut)² = 1
    const n = gerber(stress, strengths);
    near((n * a) / strengths.Se + ((n * m) / strengths.Sut) ** 2, 1, 1e-12);
  });

  it('pure amplitude n = Se/σa, pure mean n = Sut/σm or Sy/σm; Soderberg lowest; all Infinity without load', () => {
    const { strengths } = EXAMPLE;
    for (const criterion of [goodman, elliptic, soderberg, gerber]) {
      near(criterion({ amplitude: 1e8, mean: 0 }, strengths), strengths.Se / 1e8, 1e-12);
      expect(criterion({ amplitude: 0, mean: 0 }, strengths)).toBe(Number.POSITIVE_INFINITY);
      expect(criterion({ amplitude: Number.NaN, mean: 0 }, strengths)).toBeNaN();
      expect(criterion({ amplitude: 1, mean: 0 }, { ...strengths, Se: 0 })).toBeNaN();
      expect(criterion({ amplitude: 1, mean: 0 }, { ...strengths, Sut: Number.NaN })).toBeNaN();
    }
    near(goodman({ amplitude: 0, mean: 1e8 }, strengths), strengths.Sut / 1e8, 1e-12);
    near(gerber({ amplitude: 0, mean: 1e8 }, strengths), strengths.Sut / 1e8, 1e-12);
    near(elliptic({ amplitude: 0, mean: 1e8 }, strengths), strengths.Sy / 1e8, 1e-12);
    near(soderberg({ amplitude: 0, mean: 1e8 }, strengths), strengths.Sy / 1e8, 1e-12);
  });

  it('more amplitude or mean never raises a safety', () => {
    const size = fc.double({ min: 0, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(size, size, size, size, (amplitude, mean, more, moreMean) => {
        for (const criterion of [goodman, elliptic, soderberg, gerber]) {
          const base = criterion({ amplitude, mean }, EXAMPLE.strengths);
          const loaded = criterion({ amplitude: amplitude + more, mean: mean + moreMean }, EXAMPLE.strengths);
          expect(loaded).toBeLessThanOrEqual(base * (1 + 1e-12));
        }
      }),
      { seed: 72, numRuns: 300 },
    );
  });

  it('the worst fibre governs, and broken cycles are unassessed', () => {
    const steel = material('steel-c45');
    const cycle = (momentAmplitude: number, momentMean = 0): LoadCycle => ({
      momentAmplitude,
      momentMean,
      torqueAmplitude: 0,
      torqueMean: 3,
    });
    const notch = { factors: { bending: 1.8, torsion: 1.4 }, radius: 0.001 };
    const section = roundSection(0.015, 0);
    const assess = (cycles: LoadCycle[]) => fatigueSafety(cycles, section, notch, 'machined', steel, 0.99);
    const alone = assess([cycle(12)]);
    const among = assess([cycle(2, 5), cycle(12), cycle(9)]);
    if (!('value' in alone && 'value' in among)) throw new Error('unassessed');
    expect(among.value.safety).toBe(alone.value.safety);
    expect(among.value.governing).toEqual(cycle(12));
    expect(among.value.safety).toBe(Math.min(among.value.goodman, among.value.elliptic));
    expect(assess([])).toHaveProperty('unassessed');
    expect(assess([cycle(12), cycle(Number.NaN)])).toHaveProperty('unassessed');
    expect(assess([cycle(-12)])).toHaveProperty('unassessed');
    const hole = roundSection(0.015, 0.02);
    expect(fatigueSafety([cycle(1)], hole, notch, 'machined', steel, 0.99)).toHaveProperty('unassessed');
  });
});

describe('materials', () => {
  it('keys are unique, every row has a source, yield below tensile strength, steel near 200 GPa', () => {
    expect(new Set(MATERIALS.map((m) => m.key)).size).toBe(MATERIALS.length);
    for (const m of MATERIALS) {
      expect(m.source).not.toBe('');
      expect(m.Sy).toBeLessThan(m.Sut);
      expect(m.Sy).toBeGreaterThan(2e8);
      if (m.fatigue === 'steel') expect(m.E / 2e11).toBeCloseTo(1, 1);
      expect(shearModulus(m)).toBeGreaterThan(0.36 * m.E);
      expect(shearModulus(m)).toBeLessThan(0.4 * m.E);
    }
  });

  it('a key without a condition has the weakest figures of its alloy', () => {
    const weakest = (prefix: string, field: 'Sy' | 'Sut') =>
      Math.min(...MATERIALS.filter((m) => m.key.startsWith(prefix)).map((m) => m[field]));
    expect(material('steel-c45').Sut).toBe(weakest('steel-1045', 'Sut'));
    expect(material('steel-c45').Sy).toBe(weakest('steel-1045', 'Sy'));
    expect(material('steel-42crmo4').Sy).toBe(weakest('steel-4140', 'Sy'));
  });

  it('spot values (Shigley Table A-20, verified)', () => {
    expect([material('steel-1045-cd').Sy, material('steel-1045-cd').Sut]).toEqual([530e6, 630e6]);
    expect([material('steel-1018-hr').Sy, material('steel-1018-hr').Sut]).toEqual([220e6, 400e6]);
  });

  it('an unknown or missing material says what to fill in', () => {
    expect(findMaterial(null)).toEqual({ unassessed: expect.stringContaining('material') });
    expect(findMaterial('unobtainium')).toEqual({ unassessed: expect.stringContaining('steel-c45') });
    expect(findMaterial('constructor')).toHaveProperty('unassessed');
  });
});
