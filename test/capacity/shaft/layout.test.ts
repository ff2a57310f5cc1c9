import { describe, expect, it } from 'vitest';
import type { Bearing, PairSupport, RollingBearing, Shaft } from '../../../src/arm/arm.ts';
import { findMaterial } from '../../../src/capacity/materials.ts';
import {
  criticalPoints,
  roundSection,
  shaftParts,
  slopeLimit,
  thrustShare,
  torqueShare,
} from '../../../src/capacity/shaft/index.ts';
import { beamStateAt, prepareBeam, solveBeam } from '../../../src/mechanics/beamStepped.ts';

const material = (() => {
  const found = findMaterial('steel-c45');
  if ('unassessed' in found) throw new Error(found.unassessed);
  return found.value;
})();

const plain: Shaft = {
  diameter: 0.02,
  bore: 0.008,
  material: 'steel-c45',
  turnsWith: 'link',
  finish: 'machined',
  sections: [],
};
const step = { bore: 0, bendingFactor: 1.8, torsionFactor: 1.3, notchRadius: 0.0005 };
const stepped: Shaft = {
  ...plain,
  sections: [
    { from: 0, to: 0.03, diameter: 0.017, ...step },
    { from: 0.03, to: 0.05, diameter: 0.025, ...step, bendingFactor: 2.2, notchRadius: null },
  ],
};

describe('shaft parts', () => {
  it('a uniform shaft is one part; sections cut it, gaps take the uniform size', () => {
    const whole = shaftParts(plain, material, -0.05, 0.08);
    expect(whole).toHaveLength(1);
    expect(whole[0]!.EI).toBeCloseTo(207e9 * roundSection(0.02, 0.008).I, 9);
    const parts = shaftParts(stepped, material, -0.02, 0.08);
    expect(parts.map((p) => [p.from, p.to])).toEqual([
      [-0.02, 0],
      [0, 0.03],
      [0.03, 0.05],
      [0.05, 0.08],
    ]);
    expect(parts.map((p) => p.EI / 207e9)).toEqual(
      [roundSection(0.02, 0.008), roundSection(0.017, 0), roundSection(0.025, 0), roundSection(0.02, 0.008)].map(
        (s) => s.I,
      ),
    );
    for (const part of parts) expect(part.GA).toBeGreaterThan(0);
  });

  it('hollow tends to solid, in the deflection of the overhung tip', () => {
    const tip = (bore: number) => {
      const parts = shaftParts({ ...plain, bore }, material, 0, 0.1);
      const supports = [0, 0.05].map((station) => ({ station, stiffness: Number.POSITIVE_INFINITY, tiltStiffness: 0 }));
      const beam = prepareBeam(parts, supports, []);
      if ('unassessed' in beam) throw new Error(beam.unassessed);
      const solution = solveBeam(beam, [{ station: 0.1, force: -500, couple: 0 }]);
      if ('unassessed' in solution) throw new Error(solution.unassessed);
      return beamStateAt(solution, 0.1).deflection;
    };
    const solid = tip(0);
    let last = Number.POSITIVE_INFINITY;
    for (const bore of [0.015, 0.01, 0.005, 0.001, 0.0001]) {
      const difference = tip(bore) / solid - 1;
      expect(difference).toBeGreaterThan(0);
      expect(difference).toBeLessThan(last);
      last = difference;
    }
    expect(last).toBeLessThan(1e-4);
  });

  it('a bore as wide as the shaft makes a beam that is refused', () => {
    const parts = shaftParts({ ...plain, bore: 0.02 }, material, 0, 0.1);
    expect(prepareBeam(parts, [], [])).toHaveProperty('unassessed');
  });
});

describe('sections to check', () => {
  it('the weaker of the sections that meet, the notch at the end of a section, factor 1 elsewhere', () => {
    const points = criticalPoints(stepped, -0.02, 0.08, [0.01, 0.03]);
    const at = (station: number) => points.find((point) => point.station === station)!;
    expect(points.map((point) => point.station)).toEqual([-0.02, 0, 0.01, 0.03, 0.05, 0.08]);
    expect(at(0).section.diameter).toBe(0.017);
    expect(at(0).notch).toEqual({ factors: { bending: 1, torsion: 1 }, radius: null });
    expect(at(0.03).section.diameter).toBe(0.017);
    expect(at(0.03).notch).toEqual({ factors: { bending: 1.8, torsion: 1.3 }, radius: 0.0005 });
    expect(at(0.05).section.diameter).toBe(0.02);
    expect(at(0.05).notch).toEqual({ factors: { bending: 2.2, torsion: 1.3 }, radius: null });
    expect(criticalPoints(stepped, 0.08, 0.08, [])).toEqual([]);
  });

  const pair: PairSupport = {
    arrangement: 'cantilever',
    hub: 0.06,
    span: 0.04,
    offset: 0,
    overhang: 0.02,
    side: '-',
    stationA: 0.04,
    stationB: 0,
    thrust: 'B',
    adjusted: null,
    bearingA: null,
    bearingB: null,
    shaft: plain,
  };

  it('torque flows from hub to drive on a shaft that turns with the link, nowhere on a standing one', () => {
    const drive = { kind: 'gear', station: -0.02, radius: 0.03, pressureAngle: 0.35, mesh: 0 } as const;
    expect([-0.03, -0.02, 0.05, 0.06, 0.07].map((s) => torqueShare(plain, 0.06, drive, s))).toEqual([0, 1, 1, 1, 0]);
    expect(torqueShare(plain, 0.06, null, 0.07)).toBe(1);
    expect(torqueShare({ ...plain, turnsWith: 'housing' }, 0.06, drive, 0.03)).toBe(0);
  });

  it('thrust flows from the hub to the bearing that takes it', () => {
    expect([-0.01, 0, 0.05, 0.07].map((s) => thrustShare(pair, s))).toEqual([0, 1, 1, 0]);
    expect([0.01, 0.05].map((s) => thrustShare({ ...pair, thrust: 'A' }, s))).toEqual([0, 1]);
    expect(thrustShare({ ...pair, thrust: 'both' }, 0.01)).toBe(1);
    const ring = { arrangement: 'ring', hub: 0, station: 0.02, bearing: null, shaft: plain } as const;
    expect([0.01, 0.03].map((s) => thrustShare(ring, s))).toEqual([1, 0]);
  });
});

describe('slope at the bearings', () => {
  const bearing: RollingBearing = {
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
    pitchDiameter: null,
    ballDiameter: null,
    balls: null,
    rows: 1,
    clearance: 'CN',
    shaftFit: null,
    housingFit: null,
    misalignment: null,
    stiffness: null,
    source: null,
  };
  const limit = (b: Bearing) => {
    const result = slopeLimit(b);
    return 'value' in result ? result.value.limit : result.unassessed;
  };

  it('given, else by kind (Shigley 9th ed., Table 7-2, lower figures, verified), else what to fill in', () => {
    expect(limit({ ...bearing, misalignment: 0.002 })).toBe(0.002);
    expect(limit(bearing)).toBe(0.001);
    expect(limit({ ...bearing, kind: 'tapered-roller' })).toBe(0.0005);
    expect(limit({ ...bearing, kind: 'cylindrical-roller' })).toBe(0.0008);
    expect(limit({ ...bearing, kind: 'self-aligning-ball' })).toBe(0.026);
    expect(limit({ ...bearing, kind: 'needle' })).toBeCloseTo(0.000290888, 9);
    expect(limit({ ...bearing, kind: 'four-point' })).toMatch(/fill in/);
    expect(slopeLimit({ ...bearing, misalignment: Number.NaN })).toHaveProperty('unassessed');
  });

  it('a bushing bears its clearance over its length', () => {
    const bushing = {
      kind: 'plain-bushing',
      bore: 0.02,
      outer: 0.026,
      width: 0.02,
      pressureLimit: null,
      speedLimit: null,
      pvLimit: null,
      flangeOuter: null,
      wearFactor: null,
      wearDepth: null,
      clearance: 4e-5,
      stiffness: null,
      source: null,
    } as const;
    expect(limit(bushing)).toBeCloseTo(0.002, 12);
    expect(limit({ ...bushing, clearance: null })).toContain('clearance');
  });
});
