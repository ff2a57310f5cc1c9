/**
 * Bound of a reduced form over all unit vectors e. Its support is convex in e, so over the outer polygon of a circle (or the
 * outer facets of a sphere) it is largest at a corner: cut the arc or facet with the largest corner until the gap to a true
 * direction is gone. An arc of half width δ has the corner at its middle, 1/cos δ out.
 */
import type { Flat } from '../math/vector.ts';
import { type ReducedForm, support } from './freeLoadsForm.ts';

/** Relative gap at which cutting stops, and the most cuts. */
const CLOSE = 1e-10;
const CUTS = 160;
const ROUND = 2e-15;

export function directionBound(p: ReducedForm): number {
  if (p.rows === 1) {
    const e = new Float64Array(3);
    e[0] = 1;
    const plus = support(p, e);
    e[0] = -1;
    return Math.max(plus, support(p, e));
  }
  return p.rows === 2 ? circleBound(p) : sphereBound(p);
}

interface Arc {
  readonly middle: number;
  readonly half: number;
  readonly bound: number;
}

function circleBound(p: ReducedForm): number {
  const e: Flat = new Float64Array(3);
  let found = Number.NEGATIVE_INFINITY;
  const arc = (middle: number, half: number): Arc => {
    const out = 1 / Math.cos(half);
    e[0] = out * Math.cos(middle);
    e[1] = out * Math.sin(middle);
    const corner = support(p, e);
    e[0] = Math.cos(middle);
    e[1] = Math.sin(middle);
    const here = support(p, e);
    if (Number.isNaN(here) || Number.isNaN(corner)) return { middle, half, bound: Number.POSITIVE_INFINITY };
    if (here > found) found = here;
    // the ends of the arc are no outer corners of their own: each end bounds it too
    let bound = corner;
    for (const side of [-1, 1]) {
      e[0] = Math.cos(middle + side * half);
      e[1] = Math.sin(middle + side * half);
      const end = support(p, e);
      if (end > found) found = end;
      if (!(end <= bound)) bound = end;
    }
    return { middle, half, bound: bound + ROUND * Math.abs(bound) };
  };
  const arcs: Arc[] = [];
  for (let k = 0; k < 12; k++) arcs.push(arc((2 * Math.PI * k) / 12, Math.PI / 12));
  for (let cut = 0; cut < CUTS; cut++) {
    const worst = largest(arcs);
    const top = arcs[worst]!;
    if (!(top.bound - found > CLOSE * Math.abs(top.bound)) || top.bound === Number.POSITIVE_INFINITY) break;
    arcs[worst] = arc(top.middle - top.half / 2, top.half / 2);
    arcs.push(arc(top.middle + top.half / 2, top.half / 2));
  }
  return arcs[largest(arcs)]!.bound;
}

function largest(list: readonly { readonly bound: number }[]): number {
  let best = 0;
  for (let k = 1; k < list.length; k++) if (list[k]!.bound > list[best]!.bound) best = k;
  return best;
}

interface Facet {
  readonly corners: readonly [Corner, Corner, Corner];
  readonly bound: number;
}

interface Corner {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

const unit = (x: number, y: number, z: number): Corner => {
  const size = Math.hypot(x, y, z);
  return { x: x / size, y: y / size, z: z / size };
};
const between = (a: Corner, b: Corner): Corner => unit(a.x + b.x, a.y + b.y, a.z + b.z);

function sphereBound(p: ReducedForm): number {
  const e: Flat = new Float64Array(3);
  let found = Number.NEGATIVE_INFINITY;
  const at = (c: Corner, out: number) => {
    e[0] = out * c.x;
    e[1] = out * c.y;
    e[2] = out * c.z;
    return support(p, e);
  };
  const facet = (a: Corner, b: Corner, c: Corner): Facet => {
    // the plane of the corners, moved out to touch the sphere, holds the corners scaled by 1/height
    const n = unit(
      (b.y - a.y) * (c.z - a.z) - (b.z - a.z) * (c.y - a.y),
      (b.z - a.z) * (c.x - a.x) - (b.x - a.x) * (c.z - a.z),
      (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x),
    );
    const height = Math.abs(n.x * a.x + n.y * a.y + n.z * a.z);
    let bound = Number.NEGATIVE_INFINITY;
    for (const corner of [a, b, c]) {
      const here = at(corner, 1);
      if (here > found) found = here;
      const outer = at(corner, 1 / height);
      for (const value of [here, outer]) if (!(value <= bound)) bound = value;
    }
    if (Number.isNaN(bound)) bound = Number.POSITIVE_INFINITY;
    return { corners: [a, b, c], bound: bound + ROUND * Math.abs(bound) };
  };
  const facets: Facet[] = [];
  for (const x of [-1, 1]) {
    for (const y of [-1, 1]) for (const z of [-1, 1]) facets.push(facet(unit(x, 0, 0), unit(0, y, 0), unit(0, 0, z)));
  }
  for (let cut = 0; cut < 2 * CUTS; cut++) {
    const worst = largest(facets);
    const top = facets[worst]!;
    if (!(top.bound - found > CLOSE * Math.abs(top.bound)) || top.bound === Number.POSITIVE_INFINITY) break;
    const [a, b, c] = top.corners;
    const [ab, bc, ca] = [between(a, b), between(b, c), between(c, a)];
    facets[worst] = facet(ab, bc, ca);
    facets.push(facet(a, ab, ca), facet(ab, b, bc), facet(ca, bc, c));
  }
  return facets[largest(facets)]!.bound;
}
