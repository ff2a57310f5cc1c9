import { describe, expect, it } from 'vitest';
import type { Joint, PairSupport, Shaft } from '../../../src/arm/arm.ts';
import type { Assessed } from '../../../src/capacity/rule.ts';
import {
  deflectionForms,
  fatigueFactors,
  type JointShaft,
  jointShaft,
  loadCycles,
  momentForms,
  sectionHistory,
  sectionStress,
  shaftSupports,
  slopeForms,
  stressForms,
} from '../../../src/capacity/shaft/index.ts';
import { seededRandom } from '../../../src/math/random.ts';
import { shaftLoads } from '../../../src/mechanics/beamForms.ts';
import { beamStateAt, solveShaft } from '../../../src/mechanics/beamStepped.ts';
import { checkValue, type Form } from '../../../src/mechanics/form.ts';

function taken<T>(result: Assessed<T>): T {
  if ('unassessed' in result) throw new Error(result.unassessed);
  return result.value;
}

const valueAt = (forms: readonly Form[], w: readonly number[]) =>
  checkValue({ check: 'shaft', joint: 0, bearing: null, unit: '', forms }, w, 0);

// Invented: a glasshouse arm's elbow, cantilever to the - side, gear beyond the far bearing, a step and a groove on the shaft.
const SHAFT: Shaft = {
  diameter: 0.02,
  bore: 0.006,
  material: 'steel-1045-cd',
  turnsWith: 'link',
  finish: 'machined',
  sections: [
    {
      from: -0.09,
      to: -0.05,
      diameter: 0.017,
      bore: 0.006,
      bendingFactor: 1.9,
      torsionFactor: 1.4,
      notchRadius: 0.0008,
    },
    { from: 0.0, to: 0.012, diameter: 0.018, bore: 0.006, bendingFactor: 1.6, torsionFactor: 1.2, notchRadius: null },
  ],
};
const SUPPORT: PairSupport = {
  arrangement: 'cantilever',
  hub: 0.012,
  span: 0.05,
  offset: 0,
  overhang: 0.022,
  side: '-',
  stationA: -0.01,
  stationB: -0.06,
  thrust: 'A',
  adjusted: null,
  bearingA: null,
  bearingB: null,
  shaft: SHAFT,
};
const JOINT: Joint = {
  name: 'elbow',
  kind: 'revolute',
  placement: { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
  axis: [0, 0, 1],
  travel: { from: -2, to: 2, full: false },
  link: { name: 'forearm', mass: 1, centre: [0, 0, 0], inertia: null },
  support: SUPPORT,
  drive: { kind: 'gear', station: -0.085, radius: 0.03, pressureAngle: 0.349, mesh: 0.8 },
};
const RIGID = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
const build = (joint: Joint, stiffness = RIGID) => jointShaft(joint, shaftSupports(joint.support!, stiffness));

const wrenches = (seed: number, thrust: boolean) => {
  const random = seededRandom(seed);
  return Array.from({ length: 60 }, () => [
    random.between(-300, 300),
    random.between(-300, 300),
    thrust ? random.between(-300, 300) : 0,
    ...[0, 1, 2].map(() => random.between(-25, 25)),
  ]);
};

describe('the shaft of a joint', () => {
  it('reaches over hub, drive, supports and sections; checks each of them and every section end', () => {
    const shaft = taken(build(JOINT));
    const stations = shaft.points.map((point) => point.station);
    expect(stations).toEqual([-0.09, -0.085, -0.06, -0.05, -0.01, 0, 0.012]);
    expect(shaft.torque).toEqual([0, 1, 1, 1, 1, 1, 1]);
    expect(shaft.thrust).toEqual([0, 0, 0, 0, 1, 1, 1]);
    expect(shaft.points[3]!.section.diameter).toBe(0.017);
  });

  it('moments at a point are those worked by hand', () => {
    const shaft = taken(build({ ...JOINT, drive: null }));
    // Between near bearing and hub only the joint load acts: at station 0 the moment is the joint's own.
    const at = shaft.points.findIndex((point) => point.station === 0);
    expect(valueAt(taken(momentForms(shaft, at)), [10, 20, 5, 3, -4, 7])).toBeCloseTo(5, 9);
    // At the near bearing: m - s z × f with s = -0.01: (3 - 0.01·20, -4 + 0.01·10).
    const near = shaft.points.findIndex((point) => point.station === -0.01);
    expect(valueAt(taken(momentForms(shaft, near)), [10, 20, 5, 3, -4, 7])).toBeCloseTo(Math.hypot(2.8, -3.9), 9);
  });

  function exactStress(shaft: JointShaft, point: number, w: readonly number[]): number {
    const solution = solveShaft(shaft.beam, shaftLoads(shaft.loading, w, 0));
    if ('unassessed' in solution) throw new Error(solution.unassessed);
    const { station, section, notch } = shaft.points[point]!;
    const [x, y] = [beamStateAt(solution.x, station), beamStateAt(solution.y, station)];
    const Kf = fatigueFactors(shaft.material, notch.factors, notch.radius);
    const stress = (side: 'Before' | 'After') =>
      sectionStress(
        {
          moment: Math.hypot(x[`moment${side}`], y[`moment${side}`]),
          torque: shaft.torque[point]! * Math.abs(w[5]!),
          axial: shaft.thrust[point]! * Math.abs(w[2]!),
          shear: Math.hypot(x[`shear${side}`], y[`shear${side}`]),
        },
        section,
        Kf,
      ).vonMises;
    // Bending and shear of the two sides each with their own, as the forms have them.
    return Math.max(stress('Before'), stress('After'));
  }

  it('stress forms equal the stress of the pose without thrust, and are a close upper bound with it (seed 131)', () => {
    const shaft = taken(build(JOINT));
    for (let point = 0; point < shaft.points.length; point++) {
      const forms = taken(stressForms(shaft, point));
      for (const w of wrenches(131, false)) {
        const exact = exactStress(shaft, point, w);
        expect(Math.abs(valueAt(forms, w) - exact)).toBeLessThan(1e-9 * exact + 1e-3);
      }
      for (const w of wrenches(132, true)) {
        const exact = exactStress(shaft, point, w);
        const push = (shaft.thrust[point]! * Math.abs(w[2]!)) / shaft.points[point]!.section.area;
        expect(valueAt(forms, w)).toBeGreaterThanOrEqual(exact * (1 - 1e-9) - 1e-3);
        expect(valueAt(forms, w)).toBeLessThanOrEqual(exact + push + 1e-3);
      }
    }
  });

  it('slope at the bearings and deflection at the hub equal the beam; soft bearings never stiffen the hub', () => {
    const [stiff, soft] = [taken(build(JOINT)), taken(build(JOINT, [4e7, 4e7]))];
    for (const w of wrenches(133, true)) {
      const solution = solveShaft(soft.beam, shaftLoads(soft.loading, w, 0));
      if ('unassessed' in solution) throw new Error(solution.unassessed);
      for (const station of [-0.01, -0.06]) {
        const [x, y] = [beamStateAt(solution.x, station), beamStateAt(solution.y, station)];
        expect(valueAt(taken(slopeForms(soft, station)), w)).toBeCloseTo(Math.hypot(x.slope, y.slope), 12);
      }
      expect(valueAt(taken(momentForms(soft, 4)), w)).toBeCloseTo(valueAt(taken(momentForms(stiff, 4)), w), 8);
    }
    const overhung = [0, -100, 0, 0, 0, 0];
    expect(valueAt(taken(deflectionForms(soft, 0.012)), overhung)).toBeGreaterThan(
      valueAt(taken(deflectionForms(stiff, 0.012)), overhung),
    );
  });

  it('fatigue history: a load fixed in space reverses on a shaft that turns right round, not on a standing one', () => {
    const angles = Array.from({ length: 361 }, (_, i) => (i * Math.PI) / 180);
    const load = [0, -100, 0, 2, 0, 0];
    const flat = Float64Array.from(angles.flatMap(() => load));
    const shaft = taken(build({ ...JOINT, drive: null }));
    const at = shaft.points.findIndex((point) => point.station === -0.01);
    const history = taken(sectionHistory(shaft, at, 'momentAfter', flat, angles));
    const moment = valueAt(taken(momentForms(shaft, at)), load);
    const amplitudes = (turnsWith: 'link' | 'housing') =>
      taken(loadCycles(history, turnsWith)).map((cycle) => cycle.momentAmplitude);
    expect(Math.max(...amplitudes('link'))).toBeCloseTo(moment, 2);
    expect(Math.min(...amplitudes('link'))).toBeCloseTo(moment, 2);
    expect(Math.max(...amplitudes('housing'))).toBe(0);
    // A load downwards beyond the bearing pulls the upper fibre: at 90° from x the moment is positive.
    const cycles = taken(loadCycles(history, 'housing'));
    const top = cycles[cycles.length / 4]!;
    // m - s z × f at s = -0.01: 2 + (-0.01)(-100) = 3 about x
    expect(top.momentMean).toBeCloseTo(3, 2);
  });

  it('a ring bearing holds the axis alone', () => {
    const ring = {
      arrangement: 'ring',
      hub: 0.03,
      station: 0,
      bearing: null,
      shaft: { ...SHAFT, sections: [] },
    } as const;
    const shaft = taken(build({ ...JOINT, support: ring, drive: null }, [Number.POSITIVE_INFINITY]));
    expect(valueAt(taken(momentForms(shaft, 0)), [0, 0, 0, 3, 4, 0])).toBeCloseTo(5, 9);
    expect(valueAt(taken(slopeForms(shaft, 0)), [0, 0, 0, 3, 4, 0])).toBe(0);
  });

  it('unassessed without support, shaft, material, length, span; with broken numbers', () => {
    const shaft = (change: Partial<Shaft>) => ({ ...JOINT, support: { ...SUPPORT, shaft: { ...SHAFT, ...change } } });
    expect(jointShaft({ ...JOINT, support: null }, [])).toHaveProperty('unassessed');
    expect(build({ ...JOINT, support: { ...SUPPORT, shaft: null } })).toHaveProperty('unassessed');
    expect(build(shaft({ material: null }))).toHaveProperty('unassessed');
    expect(build(shaft({ material: 'cheese' }))).toHaveProperty('unassessed');
    expect(build(shaft({ diameter: Number.NaN }))).toHaveProperty('unassessed');
    expect(build({ ...JOINT, support: { ...SUPPORT, stationB: -0.01 } })).toHaveProperty('unassessed');
    expect(build(JOINT, [1e8])).toHaveProperty('unassessed');
    expect(build(JOINT, [1e8, -1])).toHaveProperty('unassessed');
    const blunt = shaft({ sections: [{ ...SHAFT.sections[0]!, bendingFactor: 0.5 }] });
    expect(taken(build(blunt)).points.every((point) => point.notch.factors.bending >= 1)).toBe(true);
    const alone = {
      arrangement: 'ring',
      hub: 0,
      station: 0,
      bearing: null,
      shaft: { ...SHAFT, sections: [] },
    } as const;
    expect(build({ ...JOINT, support: alone, drive: null }, [1e8])).toHaveProperty('unassessed');
  });
});
