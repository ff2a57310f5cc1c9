/**
 * The section through a joint along its axis, in mm: s along the joint axis (to the right), r square to it (upwards). The link stands
 * upwards, the housing downwards. What the file does not give (housing walls, hub width, an unnamed bearing) is drawn at a plain
 * nominal size and marked `nominal`; stations, span, bearings and shaft are true.
 */
import type { Bearing, Drive, PairSupport, RingSupport, ShaftSection, Support } from '../../arm/arm.ts';

export interface Box {
  readonly s0: number;
  readonly s1: number;
  readonly r0: number;
  readonly r1: number;
}

export interface BearingBox {
  readonly name: 'A' | 'B' | 'ring';
  readonly station: number;
  readonly width: number;
  readonly bore: number;
  readonly outer: number;
  readonly plain: boolean;
  /** Not named in the file, so drawn at a nominal size. */
  readonly nominal: boolean;
}

export interface SectionShape {
  readonly bearings: readonly BearingBox[];
  /** Cut parts: the housing below the axis and around the bearings, the hub and its link above. */
  readonly housing: readonly Box[];
  readonly hub: readonly Box[];
  readonly shaft: readonly {
    readonly s0: number;
    readonly s1: number;
    readonly radius: number;
    readonly bore: number;
  }[];
  readonly shaftNominal: boolean;
  readonly hubPlane: number;
  readonly drive: { readonly kind: 'gear' | 'belt'; readonly box: Box; readonly radius: number } | null;
  /** Thickness of the link's web and of the housing's foot, broken off at the edges of the drawing. */
  readonly bounds: Box;
}

const MM = 1000;

function bearingBox(
  name: BearingBox['name'],
  station: number,
  bearing: Bearing | undefined,
  fallbackBore: number,
): BearingBox {
  if (bearing) {
    const { bore, outer, width } = bearing;
    const plain = bearing.kind === 'plain-bushing';
    return { name, station, bore: bore * MM, outer: outer * MM, width: width * MM, plain, nominal: false };
  }
  const outer = fallbackBore * 2.1;
  return { name, station, bore: fallbackBore, outer, width: fallbackBore * 0.6, plain: false, nominal: true };
}

function shaftPieces(s0: number, s1: number, support: Support, nominalRadius: number): SectionShape['shaft'] {
  const { shaft } = support;
  if (!shaft) return [{ s0, s1, radius: nominalRadius, bore: 0 }];
  const sections = shaft.sections.map((part: ShaftSection) => ({
    s0: part.from * MM,
    s1: part.to * MM,
    radius: (part.diameter / 2) * MM,
    bore: (part.bore / 2) * MM,
  }));
  const from = Math.min(s0, ...sections.map((part) => part.s0));
  const to = Math.max(s1, ...sections.map((part) => part.s1));
  const plain = { radius: (shaft.diameter / 2) * MM, bore: (shaft.bore / 2) * MM };
  const pieces: { s0: number; s1: number; radius: number; bore: number }[] = [];
  let at = from;
  for (const part of [...sections].sort((a, b) => a.s0 - b.s0)) {
    if (part.s0 > at) pieces.push({ s0: at, s1: part.s0, ...plain });
    pieces.push(part);
    at = part.s1;
  }
  if (at < to) pieces.push({ s0: at, s1: to, ...plain });
  return pieces;
}

function driveShape(drive: Drive | null, width: number): SectionShape['drive'] {
  if (!drive) return null;
  const s = drive.station * MM;
  const radius = drive.radius * MM;
  return { kind: drive.kind, radius, box: { s0: s - width / 2, s1: s + width / 2, r0: 0, r1: radius * 1.06 } };
}

/** The space a hub can take around its plane before it meets the next part, with a little clearance. */
function hubWidth(hub: number, walls: readonly number[], wish: number): number {
  const room = Math.min(...walls.map((wall) => Math.abs(wall - hub)));
  return Math.max(1, Math.min(wish, 2 * room * 0.86));
}

function boundsOf(shape: Omit<SectionShape, 'bounds'>): Box {
  const boxes: Box[] = [...shape.housing, ...shape.hub];
  for (const part of shape.shaft) boxes.push({ s0: part.s0, s1: part.s1, r0: -part.radius, r1: part.radius });
  if (shape.drive) boxes.push({ ...shape.drive.box, r0: -shape.drive.box.r1 });
  return {
    s0: Math.min(...boxes.map((box) => box.s0)),
    s1: Math.max(...boxes.map((box) => box.s1)),
    r0: Math.min(...boxes.map((box) => box.r0)),
    r1: Math.max(...boxes.map((box) => box.r1)),
  };
}

/** Where the nominal parts go: `outer` the largest bearing, `wall` the thickness of housing around it. */
interface Sizes {
  readonly outer: number;
  readonly wall: number;
  readonly shaftRadius: number;
}

function clevisParts(hub: number, a: BearingBox, b: BearingBox, { outer, wall, shaftRadius }: Sizes) {
  const [left, right] = a.station < b.station ? [a, b] : [b, a];
  const ear = (box: BearingBox): readonly [number, number] => [
    box.station - box.width / 2 - wall * 0.3,
    box.station + box.width / 2 + wall * 0.3,
  ];
  const [l0, l1] = ear(left);
  const [r0, r1] = ear(right);
  const width = hubWidth(hub, [l1, r0], outer * 1.1);
  const hubRadius = Math.max(shaftRadius * 1.5, outer / 2 - wall * 0.2);
  const floor = -(outer / 2 + wall * 2.2);
  const top = outer / 2 + wall;
  const foot = floor - wall * 1.1;
  const ears = (
    [
      [left, l0, l1],
      [right, r0, r1],
    ] as const
  ).flatMap(([box, s0, s1]): Box[] => [
    { s0, s1, r0: box.outer / 2, r1: top },
    { s0, s1, r0: floor, r1: -box.outer / 2 },
  ]);
  return {
    housing: [...ears, { s0: l0, s1: r1, r0: foot, r1: floor }],
    hub: [
      { s0: hub - width / 2, s1: hub + width / 2, r0: shaftRadius, r1: top + wall * 1.5 },
      { s0: hub - width / 2, s1: hub + width / 2, r0: -hubRadius, r1: -shaftRadius },
    ],
    ends: [l0 - wall * 0.35, r1 + wall * 0.35] as const,
  };
}

function cantileverParts(hub: number, near: BearingBox, far: BearingBox, sizes: Sizes) {
  const { outer, wall, shaftRadius } = sizes;
  const [left, right] = near.station < far.station ? [near, far] : [far, near];
  const s0 = left.station - left.width / 2 - wall * 0.3;
  const s1 = right.station + right.width / 2 + wall * 0.3;
  const inside = hub < near.station ? s0 : s1;
  const width = hubWidth(hub, [inside], outer * 0.8);
  const hubRadius = Math.max(shaftRadius * 1.6, outer / 2);
  const top = outer / 2 + wall;
  const foot = -(outer / 2 + wall * 3.3);
  const web = Math.max(wall, (s1 - s0) * 0.22);
  const middle = (s0 + s1) / 2;
  // Between the bearings the bore of the housing keeps a shoulder, so that the rings have something to stand against.
  const bore = Math.min(left.outer, right.outer) / 2 - wall * 0.35;
  const seats: Box[] = [];
  for (const box of [left, right]) {
    const from = box === left ? s0 : box.station - box.width / 2;
    const to = box === left ? box.station + box.width / 2 : s1;
    seats.push({ s0: from, s1: to, r0: box.outer / 2, r1: top }, { s0: from, s1: to, r0: -top, r1: -box.outer / 2 });
  }
  const from = left.station + left.width / 2;
  const to = right.station - right.width / 2;
  if (to > from) seats.push({ s0: from, s1: to, r0: bore, r1: top }, { s0: from, s1: to, r0: -top, r1: -bore });
  return {
    housing: [...seats, { s0: middle - web / 2, s1: middle + web / 2, r0: foot, r1: -top }],
    hub: [
      { s0: hub - width / 2, s1: hub + width / 2, r0: shaftRadius, r1: top + wall * 1.5 },
      { s0: hub - width / 2, s1: hub + width / 2, r0: -hubRadius, r1: -shaftRadius },
    ],
    ends: [
      Math.min(s0 - wall * 0.35, hub - width / 2 - wall * 0.35),
      Math.max(s1 + wall * 0.35, hub + width / 2 + wall * 0.35),
    ] as const,
  };
}

function pairShape(support: PairSupport, drive: Drive | null, bearings: Readonly<Record<string, Bearing>>) {
  const hub = support.hub * MM;
  const fallback = (support.shaft?.diameter ?? support.span * 0.22) * MM;
  const named = (key: string | null) => (key === null ? undefined : bearings[key]);
  const a = bearingBox('A', support.stationA * MM, named(support.bearingA), fallback);
  const b = bearingBox('B', support.stationB * MM, named(support.bearingB), fallback);
  const outer = Math.max(a.outer, b.outer);
  const nominalRadius = Math.min(a.bore, b.bore) / 2;
  const shaftRadius = support.shaft ? (support.shaft.diameter / 2) * MM : nominalRadius;
  const sizes = { outer, wall: Math.max(2, outer * 0.16), shaftRadius };
  const parts = support.arrangement === 'clevis' ? clevisParts(hub, a, b, sizes) : cantileverParts(hub, a, b, sizes);
  const gear = driveShape(drive, Math.max(4, outer * 0.22));
  const [from, to] = parts.ends;
  const s0 = gear ? Math.min(from, gear.box.s0) : from;
  const s1 = gear ? Math.max(to, gear.box.s1) : to;
  return {
    bearings: [a, b],
    housing: parts.housing,
    hub: parts.hub,
    shaft: shaftPieces(s0, s1, support, nominalRadius),
    shaftNominal: !support.shaft,
    hubPlane: hub,
    drive: gear,
  };
}

function ringShape(support: RingSupport, drive: Drive | null, bearings: Readonly<Record<string, Bearing>>) {
  const hub = support.hub * MM;
  const key = support.bearing;
  const ring = bearingBox('ring', support.station * MM, key === null ? undefined : bearings[key], 60);
  const wall = Math.max(3, ring.outer * 0.09);
  const half = ring.width / 2;
  const top = ring.outer / 2 + wall;
  const inner = Math.max(2, ring.bore / 2 - wall);
  const up = hub >= ring.station ? 1 : -1;
  const plate = ring.station + up * (half + wall * 0.4);
  const plateBox = { s0: Math.min(plate, plate + up * wall * 1.6), s1: Math.max(plate, plate + up * wall * 1.6) };
  const s0 = ring.station - half - (up > 0 ? wall * 0.4 : 0);
  const s1 = ring.station + half + (up > 0 ? 0 : wall * 0.4);
  const box = (r0: number, r1: number): Box[] => [
    { s0, s1, r0, r1 },
    { s0, s1, r0: -r1, r1: -r0 },
  ];
  const gear = driveShape(drive, Math.max(4, ring.width));
  return {
    bearings: [ring],
    housing: [...box(ring.outer / 2, top), { s0, s1, r0: -(top + wall * 1.6), r1: -top }],
    hub: [
      ...box(inner, ring.bore / 2),
      { ...plateBox, r0: inner, r1: top + wall * 1.6 },
      { ...plateBox, r0: -ring.bore / 2, r1: -inner },
    ],
    shaft: support.shaft ? shaftPieces(s0 - wall, s1 + wall, support, inner) : [],
    shaftNominal: !support.shaft,
    hubPlane: hub,
    drive: gear,
  };
}

export function sectionShape(
  support: Support,
  drive: Drive | null,
  bearings: Readonly<Record<string, Bearing>>,
): SectionShape {
  const shape =
    support.arrangement === 'ring' ? ringShape(support, drive, bearings) : pairShape(support, drive, bearings);
  return { ...shape, bounds: boundsOf(shape) };
}
