/** From the shaft of an arm to beam parts and to the sections worth checking. */
import type { Drive, PairSupport, Shaft, Support } from '../../arm/arm.ts';
import type { BeamPart } from '../../mechanics/beamStepped.ts';
import { type Material, shearModulus } from '../materials.ts';
import type { Notch } from './fatigue.ts';
import { type RoundSection, roundSection, shearShare } from './section.ts';
import { NO_NOTCH } from './stress.ts';

/** Diameter and bore at a station inside a stretch that no step interrupts: the first section covering it, else the uniform shaft's. */
function sizeAt(shaft: Shaft, station: number): { diameter: number; bore: number } {
  return shaft.sections.find((part) => part.from < station && station < part.to) ?? shaft;
}

/** Stations where the section may change between `from` and `to`, both included, rising. */
function cuts(shaft: Shaft, from: number, to: number): number[] {
  const inside = shaft.sections.flatMap((part) => [part.from, part.to]).filter((s) => s > from && s < to);
  return [...new Set([from, ...inside, to])].sort((a, b) => a - b);
}

/** The shaft from station `from` to `to` (m) as parts of constant stiffness, with shear stiffness κGA. */
export function shaftParts(shaft: Shaft, material: Material, from: number, to: number): BeamPart[] {
  const ends = cuts(shaft, from, to);
  return ends.slice(1).map((end, i) => {
    const start = ends[i]!;
    const { diameter, bore } = sizeAt(shaft, (start + end) / 2);
    const section = roundSection(diameter, bore);
    return {
      from: start,
      to: end,
      EI: material.E * section.I,
      GA: shearShare(diameter, bore, material.poisson) * shearModulus(material) * section.area,
    };
  });
}

export interface ShaftPoint {
  readonly station: number;
  /** The weaker of the sections that meet here. */
  readonly section: RoundSection;
  readonly notch: Notch;
}

/**
 * Sections to check: the stations given (bearings, hub, drive) and every end of a section between `from` and `to`. At the end `to`
 * of a section stand its stress-concentration factors; where several end at one station the largest count.
 */
export function criticalPoints(shaft: Shaft, from: number, to: number, stations: readonly number[]): ShaftPoint[] {
  if (!(to > from)) return [];
  const ends = cuts(shaft, from, to);
  const wanted = [...new Set([...ends, ...stations])].filter((s) => s >= from && s <= to).sort((a, b) => a - b);
  return wanted.map((station) => {
    const before = ends.filter((end) => end < station).at(-1);
    const after = ends.find((end) => end > station);
    const sections = [before, after]
      .filter((end) => end !== undefined)
      .map((end) => sizeAt(shaft, (end + station) / 2))
      .map(({ diameter, bore }) => roundSection(diameter, bore));
    const section = sections.reduce((weak, other) => (other.W < weak.W ? other : weak));
    const ending = shaft.sections.filter((part) => part.to === station);
    const radii = ending.map((part) => part.notchRadius);
    return {
      station,
      section,
      notch: {
        factors: {
          bending: Math.max(NO_NOTCH.bending, ...ending.map((part) => part.bendingFactor)),
          torsion: Math.max(NO_NOTCH.torsion, ...ending.map((part) => part.torsionFactor)),
        },
        radius: radii.length === 0 || radii.includes(null) ? null : Math.max(...radii.map(Number)),
      },
    };
  });
}

const between = (station: number, a: number, b: number) => station >= Math.min(a, b) && station <= Math.max(a, b);

/**
 * 1 where the section carries the joint's torque, else 0. A shaft that stays with the housing carries none; one that turns with the
 * link carries it from the hub to the drive, and anywhere when no drive is given (safe side).
 */
export function torqueShare(shaft: Shaft, hub: number, drive: Drive | null, station: number): 0 | 1 {
  if (shaft.turnsWith === 'housing') return 0;
  return drive === null || between(station, hub, drive.station) ? 1 : 0;
}

/** 1 where the section carries the joint's thrust: from the hub to the bearing that takes it (either, for `both`), else 0. */
export function thrustShare(support: Support, station: number): 0 | 1 {
  if (support.arrangement === 'ring') return between(station, support.hub, support.station) ? 1 : 0;
  return locating(support).some((bearing) => between(station, support.hub, bearing)) ? 1 : 0;
}

function locating(support: PairSupport): number[] {
  if (support.thrust === 'both') return [support.stationA, support.stationB];
  return [support.thrust === 'A' ? support.stationA : support.stationB];
}
