/**
 * Plain solids made from the arm file alone: for each link its hub, its shaft, a tapered bar to the next joint and the housing that
 * carries the next joint's bearings. Lengths in m, canonical link frame (z is the joint axis); the ground's part in the base frame.
 */
import { BoxGeometry, type BufferGeometry, CylinderGeometry, Matrix4, Quaternion, Vector3 } from 'three';
import { mergeGeometries } from 'three/addons/utils/BufferGeometryUtils.js';
import type { Arm, Joint } from '../../arm/arm.ts';
import type { Chain } from '../../mechanics/chain.ts';
import { sectionShape } from '../figures/sectionGeometry.ts';

const Z = new Vector3(0, 0, 1);
const Y = new Vector3(0, 1, 0);
const ROUND = 40;

/** What a joint looks like about its axis; stations and radii in m. */
export interface JointLook {
  readonly hub: { readonly from: number; readonly to: number; readonly radius: number };
  readonly shaft: { readonly from: number; readonly to: number; readonly radius: number } | null;
  readonly rings: readonly {
    readonly name: 'A' | 'B' | 'ring';
    readonly station: number;
    readonly width: number;
    readonly bore: number;
    readonly outer: number;
  }[];
  readonly clevis: boolean;
  readonly drive: { readonly station: number; readonly radius: number; readonly width: number } | null;
}

export function jointLook(joint: Joint, arm: Arm, size: number): JointLook {
  const { support } = joint;
  if (!support) {
    const r = size * 0.035;
    return { hub: { from: -r, to: r, radius: r }, shaft: null, rings: [], clevis: false, drive: null };
  }
  const shape = sectionShape(support, joint.drive, arm.bearings);
  // The part of the hub that reaches furthest out carries the link.
  const plate = shape.hub.reduce((most, box) => (box.r1 > most.r1 ? box : most));
  const outer = Math.max(...shape.bearings.map((box) => box.outer)) / 1000;
  const pieces = shape.shaft;
  return {
    hub: { from: plate.s0 / 1000, to: plate.s1 / 1000, radius: outer * 0.52 },
    shaft:
      pieces.length > 0
        ? {
            from: Math.min(...pieces.map((part) => part.s0)) / 1000,
            to: Math.max(...pieces.map((part) => part.s1)) / 1000,
            radius: Math.max(...pieces.map((part) => part.radius)) / 1000,
          }
        : null,
    rings: shape.bearings.map((box) => ({
      name: box.name,
      station: box.station / 1000,
      width: box.width / 1000,
      bore: box.bore / 2000,
      outer: box.outer / 2000,
    })),
    clevis: support.arrangement === 'clevis',
    drive: joint.drive ? { station: joint.drive.station, radius: joint.drive.radius, width: outer * 0.14 } : null,
  };
}

/** Rough size of an arm, m: the way from the first joint to the tip along the joints; where its base frame lies is no part of it. */
export function armSize(chain: Chain): number {
  let size = Math.hypot(chain.tipOrigin[0]!, chain.tipOrigin[1]!, chain.tipOrigin[2]!);
  for (let i = 1; i < chain.n; i++) {
    size += Math.hypot(chain.origin[3 * i]!, chain.origin[3 * i + 1]!, chain.origin[3 * i + 2]!);
  }
  return Math.max(size, 0.05);
}

/** Where the housing of joint i stands in link i-1. */
export function housingMatrix(chain: Chain, i: number): Matrix4 {
  const r = chain.rotation.subarray(9 * i, 9 * i + 9);
  const o = chain.origin.subarray(3 * i, 3 * i + 3);
  return new Matrix4().set(
    r[0]!, r[1]!, r[2]!, o[0]!,
    r[3]!, r[4]!, r[5]!, o[1]!,
    r[6]!, r[7]!, r[8]!, o[2]!,
    0, 0, 0, 1,
  ); // biome-ignore format: a matrix
}

function turned(geometry: BufferGeometry, axis: Vector3, middle: Vector3, spin = 0): BufferGeometry {
  const turn = new Quaternion().setFromUnitVectors(Y, axis.clone().normalize());
  if (spin !== 0) geometry.applyMatrix4(new Matrix4().makeRotationY(spin));
  geometry.applyMatrix4(new Matrix4().compose(middle, turn, new Vector3(1, 1, 1)));
  return geometry;
}

/** A round bar along z. */
function round(from: number, to: number, radius: number): BufferGeometry {
  const length = Math.max(to - from, 1e-5);
  return turned(new CylinderGeometry(radius, radius, length, ROUND), Z, new Vector3(0, 0, (from + to) / 2));
}

/** A tapered four-sided bar between two points. */
function bar(from: Vector3, to: Vector3, thick0: number, thick1: number): BufferGeometry | null {
  const way = to.clone().sub(from);
  const length = way.length();
  if (!(length > 1e-6)) return null;
  const middle = from.clone().add(to).multiplyScalar(0.5);
  const root = Math.SQRT1_2;
  return turned(new CylinderGeometry(thick1 * root, thick0 * root, length, 4), way, middle, Math.PI / 4);
}

/** The housing that carries a joint's bearings, in the housing's frame, reached from `toward` (a point in that frame). */
function housing(look: JointLook, toward: Vector3): { parts: BufferGeometry[]; root: Vector3 } {
  const { rings } = look;
  if (rings.length === 0) {
    return { parts: [], root: new Vector3(0, 0, (look.hub.from + look.hub.to) / 2) };
  }
  const outer = Math.max(...rings.map((ring) => ring.outer));
  const stations = rings.map((ring) => ring.station);
  const middle = (Math.min(...stations) + Math.max(...stations)) / 2;
  if (!look.clevis) {
    const from = Math.min(...rings.map((ring) => ring.station - ring.width / 2));
    const to = Math.max(...rings.map((ring) => ring.station + ring.width / 2));
    return { parts: [round(from, to, outer * 0.9)], root: new Vector3(0, 0, middle) };
  }
  // A fork: two ears, and behind the hub a bridge that the bar of the link runs into.
  const back = new Vector3(toward.x, toward.y, 0);
  if (!(back.length() > 1e-6)) back.set(-1, 0, 0);
  back.normalize();
  const reach = Math.max(outer * 1.15, look.hub.radius * 1.2) + outer * 0.25;
  const parts: BufferGeometry[] = [];
  const ends: Vector3[] = [];
  for (const ring of rings) {
    parts.push(round(ring.station - ring.width * 0.36, ring.station + ring.width * 0.36, ring.outer * 0.92));
    const end = back.clone().multiplyScalar(reach).setZ(ring.station);
    ends.push(end);
    parts.push(slab(new Vector3(0, 0, ring.station), end, ring.width * 0.72, outer * 1.25, back));
  }
  const [a, b] = ends as [Vector3, Vector3];
  const over = Math.sign(b.z - a.z) * rings[0]!.width * 0.36;
  parts.push(slab(a.clone().setZ(a.z - over), b.clone().setZ(b.z + over), outer * 0.5, outer * 1.25, Z));
  return { parts, root: a.clone().add(b).multiplyScalar(0.5) };
}

/** A flat bar from `from` to `to` (both in a plane with the joint axis): `thin` in that plane, `wide` square to it. */
function slab(from: Vector3, to: Vector3, thin: number, wide: number, along: Vector3): BufferGeometry {
  const way = to.clone().sub(from);
  const length = way.length();
  const x = way.clone().normalize();
  const other = along === Z ? new Vector3(from.x, from.y, 0).normalize() : Z.clone();
  const y = other;
  const z = x.clone().cross(y);
  const geometry = new BoxGeometry(length, thin, wide);
  const frame = new Matrix4().makeBasis(x, y, z).setPosition(from.clone().add(to).multiplyScalar(0.5));
  return geometry.applyMatrix4(frame);
}

function merged(parts: readonly (BufferGeometry | null)[]): BufferGeometry | null {
  const real = parts.filter((part): part is BufferGeometry => part !== null);
  return real.length > 0 ? mergeGeometries(real.map((part) => part.toNonIndexed())) : null;
}

/** The solid of link i, in its canonical frame. */
export function linkSolid(chain: Chain, looks: readonly JointLook[], i: number, size: number): BufferGeometry | null {
  const { hub, shaft, drive } = looks[i]!;
  const parts: (BufferGeometry | null)[] = [round(hub.from, hub.to, hub.radius)];
  if (shaft) parts.push(round(shaft.from, shaft.to, shaft.radius));
  if (drive) parts.push(round(drive.station - drive.width / 2, drive.station + drive.width / 2, drive.radius));
  const start = new Vector3(0, 0, (hub.from + hub.to) / 2);
  const thick = Math.min(hub.radius * 1.25, (hub.to - hub.from) * 0.95);
  if (i + 1 < chain.n) {
    const place = housingMatrix(chain, i + 1);
    const look = looks[i + 1]!;
    const { parts: around, root } = housing(look, start.clone().applyMatrix4(place.clone().invert()));
    parts.push(...around.map((part) => part.applyMatrix4(place)));
    const next = Math.max(0.008 * size, ...look.rings.map((ring) => ring.outer * 1.1));
    parts.push(bar(start, root.applyMatrix4(place), Math.max(thick, next * 0.7), next));
  } else {
    const tip = new Vector3(chain.tipOrigin[0], chain.tipOrigin[1], chain.tipOrigin[2]);
    parts.push(bar(start, tip, thick, thick * 0.6));
  }
  return merged(parts);
}

/** Where the ground is drawn: the middle of its plate and the way out of it, in the base frame. */
export interface Mount {
  readonly at: Vector3;
  readonly out: Vector3;
}

/**
 * The first joint's housing on a short foot with a plate: the file says where the joint stands, not what carries it. The foot points to
 * the base's origin where that is near; else away from the hub, where the housing has its back.
 */
export function groundMount(chain: Chain, looks: readonly JointLook[], size: number) {
  const place = housingMatrix(chain, 0);
  const look = looks[0]!;
  const origin = new Vector3().setFromMatrixPosition(place);
  const near = origin.length() > 1e-6 && origin.length() < 0.6 * size;
  const middle = look.rings.reduce((sum, ring) => sum + ring.station / look.rings.length, 0);
  const side = middle - (look.hub.from + look.hub.to) / 2;
  const back = new Vector3(0, 0, look.clevis || side === 0 ? -1 : side).transformDirection(place);
  const way = near || look.clevis ? origin.clone().negate() : back;
  if (!(way.length() > 1e-6)) way.copy(back);
  way.normalize();
  const { parts, root } = housing(look, origin.clone().addScaledVector(way, size).applyMatrix4(place.clone().invert()));
  const foot = root.applyMatrix4(place);
  const thick = Math.max(0.012 * size, ...look.rings.map((ring) => ring.outer * 1.1));
  const length = near ? Math.max(origin.length() - foot.distanceTo(origin), thick * 2) : thick * 4;
  const at = foot.clone().addScaledVector(way, length);
  const plate = new CylinderGeometry(thick * 1.7, thick * 1.7, thick * 0.16, ROUND);
  const solid = merged([
    ...parts.map((part) => part.applyMatrix4(place)),
    bar(foot, at, thick, thick),
    turned(plate, way, at),
  ]);
  return { solid, mount: { at, out: way } as Mount, radius: thick * 1.7 };
}

/** Slanting strokes behind a plate, as drawings mark the ground: ends of line segments, m. */
export function groundStrokes({ at, out }: Mount, radius: number): number[] {
  const side = Math.abs(out.x) < 0.9 ? new Vector3(1, 0, 0) : new Vector3(0, 1, 0);
  const u = side.cross(out).normalize();
  const v = out.clone().cross(u);
  const points: number[] = [];
  const strokes = 20;
  for (let k = 0; k < strokes; k++) {
    const angle = (2 * Math.PI * k) / strokes;
    const rim = at
      .clone()
      .addScaledVector(u, radius * Math.cos(angle))
      .addScaledVector(v, radius * Math.sin(angle));
    const end = rim
      .clone()
      .addScaledVector(out, radius * 0.3)
      .addScaledVector(u, -radius * 0.22)
      .addScaledVector(v, -radius * 0.12);
    points.push(...rim.toArray(), ...end.toArray());
  }
  return points;
}
