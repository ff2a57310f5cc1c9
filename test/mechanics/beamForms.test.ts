import { describe, expect, it } from 'vitest';
import type { Drive } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { shaftForms, shaftLoads, vonMisesForms } from '../../src/mechanics/beamForms.ts';
import { peakMoment, shaftLines } from '../../src/mechanics/beamLines.ts';
import { beamStateAt, prepareBeam, type ShaftSolution, solveShaft } from '../../src/mechanics/beamStepped.ts';
import { type CheckForm, checkValue, type Form } from '../../src/mechanics/form.ts';

const parts = [
  { from: -0.06, to: 0.02, EI: 900, GA: 4e6 },
  { from: 0.02, to: 0.12, EI: 2500, GA: Number.POSITIVE_INFINITY },
];
const supports = [
  { station: -0.02, stiffness: 4e7, tiltStiffness: 0 },
  { station: 0.06, stiffness: 9e7, tiltStiffness: 0 },
];
const HUB = 0.1;
const drives: (Drive | null)[] = [
  null,
  { kind: 'gear', station: -0.05, radius: 0.03, pressureAngle: 0.349, mesh: 1.1 },
  { kind: 'belt', station: 0.02, radius: 0.04, pull: -0.7, pretension: 120, tensionRatio: 1.6 },
];

const asCheck = (forms: readonly Form[] | { unassessed: string }): CheckForm => {
  if ('unassessed' in forms) throw new Error(forms.unassessed);
  return { check: 'shaft', joint: 0, bearing: null, unit: '', forms };
};

function beamOf(drive: Drive | null) {
  const beam = prepareBeam(parts, supports, drive ? [HUB, drive.station] : [HUB]);
  if ('unassessed' in beam) throw new Error(beam.unassessed);
  return beam;
}

function solution(drive: Drive | null, w: readonly number[]): ShaftSolution {
  const result = solveShaft(beamOf(drive), shaftLoads({ hub: HUB, drive }, w, 0));
  if ('unassessed' in result) throw new Error(result.unassessed);
  return result;
}

const wrenches = (seed: number) => {
  const random = seededRandom(seed);
  return Array.from({ length: 40 }, () => [
    ...[0, 1, 2].map(() => random.between(-500, 500)),
    ...[0, 1, 2].map(() => random.between(-60, 60)),
  ]);
};

describe('shaft answers as convex forms of the joint load', () => {
  it.each(drives)('equal the beam solved at the pose (seed 61), drive %o', (drive) => {
    for (const answer of ['slope', 'deflection', 'momentBefore', 'momentAfter', 'shearAfter'] as const) {
      for (const station of [-0.02, 0.01, 0.06, HUB]) {
        const check = asCheck(shaftForms(beamOf(drive), { hub: HUB, drive }, station, answer));
        for (const w of wrenches(61)) {
          const { x, y } = solution(drive, w);
          const direct = Math.hypot(beamStateAt(x, station)[answer], beamStateAt(y, station)[answer]);
          const scale = answer === 'deflection' || answer === 'slope' ? 1e-9 : 1e-7;
          expect(Math.abs(checkValue(check, w, 0) - direct)).toBeLessThan(1e-9 * direct + 1e-4 * scale);
        }
      }
    }
  });

  it('moments at a section are those of the joint load there, worked by statics: cantilever beyond the near bearing', () => {
    // Between near bearing and hub only the joint load acts: |m - s z × f| at the section s.
    const s = 0.08;
    const check = asCheck(shaftForms(beamOf(null), { hub: HUB, drive: null }, s, 'momentAfter'));
    for (const w of wrenches(62)) {
      expect(checkValue(check, w, 0)).toBeCloseTo(Math.hypot(w[3]! + s * w[1]!, w[4]! - s * w[0]!), 7);
    }
  });

  it('von Mises forms never lie below the stress at the worst fibre, and equal it without thrust (seed 63)', () => {
    const section = { W: 1e-6, Wp: 2e-6, area: 3e-4 };
    const drive = drives[1]!;
    const moment = shaftForms(beamOf(drive), { hub: HUB, drive }, 0.06, 'momentBefore');
    if ('unassessed' in moment) throw new Error(moment.unassessed);
    const bound = asCheck(vonMisesForms(moment, section, 1, 1));
    const without = asCheck(vonMisesForms(moment, section, 1, 0));
    const bending = asCheck(moment);
    for (const w of wrenches(63)) {
      const sigma = checkValue(bending, w, 0) / section.W;
      const tau = Math.abs(w[5]!) / section.Wp;
      const push = Math.abs(w[2]!) / section.area;
      const exact = Math.hypot(sigma + push, Math.sqrt(3) * tau);
      expect(checkValue(bound, w, 0)).toBeGreaterThanOrEqual(exact * (1 - 1e-12));
      expect(checkValue(bound, w, 0)).toBeLessThanOrEqual(Math.hypot(sigma, Math.sqrt(3) * tau) + push + 1);
      expect(checkValue(without, w, 0) / Math.hypot(sigma, Math.sqrt(3) * tau)).toBeCloseTo(1, 9);
    }
  });

  it('refuses a station off the shaft and a hub that is no node; NaN in, NaN out', () => {
    expect(shaftForms(beamOf(null), { hub: HUB, drive: null }, 0.5, 'slope')).toHaveProperty('unassessed');
    expect(shaftForms(beamOf(null), { hub: 0.11, drive: null }, 0.06, 'slope')).toHaveProperty('unassessed');
    const check = asCheck(shaftForms(beamOf(null), { hub: HUB, drive: null }, 0.06, 'slope'));
    expect(checkValue(check, [0, Number.NaN, 0, 0, 0, 0], 0)).toBeNaN();
  });
});

describe('lines of the shaft', () => {
  const w = [300, -120, 40, 9, 4, 20];
  it('doubled at every break, start and end without moment, shear the slope of the moment, deflection that of the slope', () => {
    const solved = solution(drives[1]!, w);
    const lines = shaftLines(solved, 8);
    const breaks = solved.x.beam.nodes.length;
    expect(lines.x.station).toHaveLength(2 * breaks + 7 * (breaks - 1));
    expect(lines.y.station).toEqual(lines.x.station);
    for (const plane of [lines.x, lines.y]) {
      const last = plane.station.length - 1;
      expect(plane.moment[0]).toBe(0);
      expect(plane.shear[0]).toBe(0);
      expect(plane.moment[last]!).toBeCloseTo(0, 9);
      expect(plane.shear[last]!).toBeCloseTo(0, 8);
      for (let i = 1; i <= last; i++) {
        const h = plane.station[i]! - plane.station[i - 1]!;
        expect(h).toBeGreaterThanOrEqual(0);
        if (h === 0) continue;
        expect(plane.moment[i]! - plane.moment[i - 1]!).toBeCloseTo(h * plane.shear[i - 1]!, 9);
      }
    }
    lines.resultant.moment.forEach((moment, i) => {
      expect(moment).toBe(Math.hypot(lines.x.moment[i]!, lines.y.moment[i]!));
    });
  });

  it('the peak moment is never passed on a fine sampling and is attained at a node', () => {
    const solved = solution(drives[2]!, w);
    const peak = peakMoment(solved);
    const lines = shaftLines(solved, 50).resultant;
    expect(Math.max(...lines.moment)).toBe(peak.moment);
    expect(lines.moment[lines.station.indexOf(peak.station)]! <= peak.moment).toBe(true);
    expect(Array.from(solved.x.beam.nodes)).toContain(peak.station);
    solved.x.momentAfter[1] = Number.NaN;
    expect(peakMoment(solved).moment).toBeNaN();
  });
});
