/**
 * What an earlier layout of an arm has in common with a later one: whether the load of a joint is the same function of the pose, and whether a
 * check says the same of it. Then all that is known of its worst still holds, and nothing needs to be searched again.
 */
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm, Form } from './form.ts';

/** A chain under one of its cases. */
export interface LoadedChain {
  readonly chain: Chain;
  readonly load: ChainCase;
}

/**
 * Whether the load of the joint (canonical housing frame) is the same at every pose, the same poses being within the travel. At rest it
 * depends on all turns and travels, on the lengths outboard and on the masses from the joint's own link on; in motion on the lengths
 * inboard as well. Equality is exact: a layout is kept or changed, never nearly the same.
 */
export function sameJointLoad(a: LoadedChain, b: LoadedChain, joint: number): boolean {
  const { n } = a.chain;
  if (n !== b.chain.n) return false;
  const moving = a.load.speed !== null;
  const lengthsFrom = moving ? 0 : 3 * (joint + 1);
  return (
    same(a.chain.gravity, b.chain.gravity) &&
    same(a.chain.rotation, b.chain.rotation) &&
    same(a.chain.from, b.chain.from) &&
    same(a.chain.to, b.chain.to) &&
    same(a.chain.full, b.chain.full) &&
    same(a.chain.tipOrigin, b.chain.tipOrigin) &&
    same(a.chain.origin, b.chain.origin, lengthsFrom) &&
    same(a.load.mass, b.load.mass, joint) &&
    same(a.load.first, b.load.first, 3 * joint) &&
    (!moving || same(a.load.inertia, b.load.inertia, 6 * joint)) &&
    a.load.force === b.load.force &&
    a.load.magnitude === b.load.magnitude &&
    same(a.load.forceUnit, b.load.forceUnit) &&
    sameOrNone(a.load.speed, b.load.speed) &&
    sameOrNone(a.load.accel, b.load.accel)
  );
}

/** Whether two checks are the same function of the joint load, of the same name. */
export function sameCheck(a: CheckForm, b: CheckForm): boolean {
  return (
    a.check === b.check &&
    a.joint === b.joint &&
    a.bearing === b.bearing &&
    a.unit === b.unit &&
    a.forms.length === b.forms.length &&
    a.forms.every((form, k) => sameForm(form, b.forms[k]!))
  );
}

function sameForm(a: Form, b: Form): boolean {
  return (
    a.rows === b.rows &&
    a.o === b.o &&
    a.torqueFrom === b.torqueFrom &&
    a.torqueTo === b.torqueTo &&
    same(a.P, b.P) &&
    same(a.c, b.c) &&
    same(a.l, b.l)
  );
}

function same(a: ArrayLike<number>, b: ArrayLike<number>, from = 0): boolean {
  if (a.length !== b.length) return false;
  for (let k = from; k < a.length; k++) if (a[k] !== b[k]) return false;
  return true;
}

function sameOrNone(a: Float64Array | null, b: Float64Array | null): boolean {
  return a === b || (a !== null && b !== null && same(a, b));
}
