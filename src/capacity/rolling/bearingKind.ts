/** What follows from the kind of a rolling bearing alone. */
import type { RollingBearing, RollingKind } from '../../arm/arm.ts';

export type Element = 'ball' | 'roller';

interface KindFacts {
  readonly element: Element;
  readonly thrust: boolean;
  readonly ring: boolean;
  readonly partner: boolean;
}

const KINDS: Readonly<Record<RollingKind, KindFacts>> = {
  'deep-groove': { element: 'ball', thrust: true, ring: false, partner: false },
  'angular-contact': { element: 'ball', thrust: true, ring: false, partner: true },
  'self-aligning-ball': { element: 'ball', thrust: true, ring: false, partner: false },
  'cylindrical-roller': { element: 'roller', thrust: false, ring: false, partner: false },
  needle: { element: 'roller', thrust: false, ring: false, partner: false },
  'tapered-roller': { element: 'roller', thrust: true, ring: false, partner: true },
  'crossed-roller': { element: 'roller', thrust: true, ring: true, partner: false },
  'four-point': { element: 'ball', thrust: true, ring: true, partner: false },
};

export function elementOf(kind: RollingKind): Element {
  return KINDS[kind].element;
}

/** Exponent p of the life formula: 3 for balls, 10/3 for rollers (ISO 281:2007; in every source read). */
export function lifeExponent(kind: RollingKind): number {
  return KINDS[kind].element === 'ball' ? 3 : 10 / 3;
}

/** False for cylindrical and needle rollers: guided by flanges or not, they are given no axial load here. */
export function carriesThrust(kind: RollingKind): boolean {
  return KINDS[kind].thrust;
}

/** Whether one bearing carries a tilting moment by itself. */
export function isRing(kind: RollingKind): boolean {
  return KINDS[kind].ring;
}

/** Single row angular contact and tapered bearings take thrust one way only, and need an opposed partner. */
export function needsPartner(bearing: RollingBearing): boolean {
  return KINDS[bearing.kind].partner && bearing.rows === 1;
}

/** The `source` of a bearing whose numbers are estimates; the label goes with the bearing wherever it is copied. */
export const ESTIMATED_SOURCE = 'estimated, replace by the maker’s rating';

/** Whether the given numbers of a bearing are marked as estimates by their source. */
export function isEstimated(bearing: RollingBearing): boolean {
  return bearing.source?.startsWith('estimated') === true;
}

/** Positive and finite. */
export function isPositive(x: number): boolean {
  return x > 0 && x < Number.POSITIVE_INFINITY;
}

/** Positive bore smaller than outer, positive width; everything finite. */
export function hasSoundDimensions(bearing: RollingBearing): boolean {
  return (
    isPositive(bearing.bore) && isPositive(bearing.outer) && isPositive(bearing.width) && bearing.bore < bearing.outer
  );
}
