/**
 * Bending moment, slope and deflection of a joint's shaft as convex forms of the joint load (`form.ts`), so that the worst pose,
 * its bound and its shares come from the same machinery as the bearing loads.
 *
 * The joint load acts on the shaft at the hub, the drive at its own station; bearings hold the shaft. With a, b, g
 * the answer at a station to a unit force and a unit couple at the hub and a unit force at the drive (`beamInfluence`),
 *
 *     x:  a fx + b (my - h fx) + g dx          y:  a fy - b (mx + h fy) + g dy
 *
 * where h is the hub's station and d the drive's force. Frame and signs as in `beam.ts`.
 */

import type { Drive } from '../arm/arm.ts';
import type { BeamState, Refused, ShaftLoad } from './beam.ts';
import { beamInfluence, type SteppedBeam } from './beamStepped.ts';
import { type DriveBranch, driveBranches } from './bearingPair.ts';
import { type Form, form } from './form.ts';

/** Where the loads enter the shaft; both stations must be nodes of the beam. */
export interface ShaftLoading {
  readonly hub: number;
  readonly drive: Drive | null;
}

/** What to read at a station. The moment has two sides where a couple enters (at the hub): both count. */
export type ShaftAnswer = 'slope' | 'deflection' | 'momentBefore' | 'momentAfter' | 'shearBefore' | 'shearAfter';

/** The loads on the shaft at one wrench w[at..at+5] (force N, moment N·m about the joint origin, housing frame). */
export function shaftLoads(loading: ShaftLoading, w: ArrayLike<number>, at: number): ShaftLoad[] {
  const h = loading.hub;
  const fx = w[at]!;
  const fy = w[at + 1]!;
  const loads = [{ station: h, fx, fy, mx: w[at + 3]! + h * fy, my: w[at + 4]! - h * fx }];
  if (!loading.drive) return loads;
  const torque = w[at + 5]!;
  const branch = driveBranches(loading.drive).find((b) => torque >= b.from && torque <= b.to);
  const pull = (i: 0 | 1) => (branch ? branch.k[i] * torque + branch.c[i] : Number.NaN);
  loads.push({ station: loading.drive.station, fx: pull(0), fy: pull(1), mx: 0, my: 0 });
  return loads;
}

function oneForm(h: number, a: number, b: number, g: number, branch: DriveBranch): Form {
  return form({
    P: [
      [a - h * b, 0, 0, 0, b, g * branch.k[0]],
      [0, a - h * b, 0, -b, 0, g * branch.k[1]],
    ],
    c: [g * branch.c[0], g * branch.c[1]],
    torque: [branch.from, branch.to],
  });
}

/** Forms of the size of one answer at one station: rad, m, N·m or N by `answer`. */
export function shaftForms(
  beam: SteppedBeam,
  loading: ShaftLoading,
  station: number,
  answer: ShaftAnswer,
): readonly Form[] | Refused {
  const atHub = beamInfluence(beam, loading.hub, station);
  if ('unassessed' in atHub) return atHub;
  let perDrive = 0;
  if (loading.drive) {
    const atDrive = beamInfluence(beam, loading.drive.station, station);
    if ('unassessed' in atDrive) return atDrive;
    perDrive = atDrive.perForce[answer];
  }
  const read = (state: BeamState) => state[answer];
  const a = read(atHub.perForce);
  const b = read(atHub.perCouple);
  if (!Number.isFinite(a + b + perDrive)) return { unassessed: 'the station lies off the shaft' };
  return driveBranches(loading.drive).map((branch) => oneForm(loading.hub, a, b, perDrive, branch));
}

/**
 * Forms of an upper bound of the von Mises stress, Pa, at a section of modulus W (bending, m³), Wp (torsion, m³) and area (m²):
 * `sqrt((M/W)² + 3 (share·T/Wp)²) + |fz|·thrustShare/area`, never less than the stress at the worst fibre
 * `sqrt((M/W + N/A)² + 3τ²)`. `torqueShare`, `thrustShare` are 1 where the section carries the joint's torque and thrust, else 0.
 */
export function vonMisesForms(
  moment: readonly Form[],
  section: { readonly W: number; readonly Wp: number; readonly area: number },
  torqueShare: number,
  thrustShare: number,
): readonly Form[] {
  return moment.flatMap((f) => {
    const bend = (row: number) => Array.from(f.P.subarray(6 * row, 6 * row + 6), (value) => value / section.W);
    const twist = [0, 0, 0, 0, 0, (Math.sqrt(3) * torqueShare) / section.Wp];
    const push = thrustShare / section.area;
    return (push === 0 ? [0] : [push, -push]).map((l) =>
      form({
        P: [bend(0), bend(1), twist],
        c: [f.c[0]! / section.W, f.c[1]! / section.W, 0],
        l: [0, 0, l, 0, 0, 0],
        torque: [f.torqueFrom, f.torqueTo],
      }),
    );
  });
}
