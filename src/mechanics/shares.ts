/**
 * Who causes the value of a check at a pose: each link, the payload, the tip force and the drive. A check is the maximum of linear functions of
 * the joint load; the one that wins at the pose is linear in every weight and force, so the shares add up to the value exactly.
 *
 * A drive answers to the torque that all the others make. Its force is a share of its own: theirs are what they load by themselves.
 */
import type { LoadCase } from '../arm/arm.ts';
import type { Numbers } from '../math/vector.ts';
import { type Chain, type ChainBody, type ChainCase, casePayload, WRENCH } from './chain.ts';
import { type CheckForm, type Form, formHolds, formValue } from './form.ts';
import { dynamicLoads, poseScratch } from './newtonEuler.ts';

/** A linear function of the joint load: coefficients · w + constant. */
export interface Line {
  /** [6] */
  readonly coefficients: Float64Array;
  readonly constant: number;
}

/** The one that wins at a wrench. */
export interface WinningLine extends Line {
  readonly form: Form;
  /** Unit vector e of the winning norm; zeros where the norm is nothing. [rows] */
  readonly e: Float64Array;
}

/** Linear function of the form that wins at w[at..], tight there; null where no form holds or the load is not finite. */
export function winningLine(check: CheckForm, w: Numbers, at: number): WinningLine | null {
  let form: Form | null = null;
  let most = Number.NEGATIVE_INFINITY;
  for (const f of check.forms) {
    if (!formHolds(f, w, at)) continue;
    const value = formValue(f, w, at);
    if (value > most) {
      most = value;
      form = f;
    }
  }
  if (!form) return null;
  const e = new Float64Array(form.rows);
  for (let r = 0; r < form.rows; r++) {
    e[r] = form.c[r]!;
    for (let k = 0; k < WRENCH; k++) e[r]! += form.P[WRENCH * r + k]! * w[at + k]!;
  }
  const length = Math.hypot(...e);
  if (length > 0) for (let r = 0; r < form.rows; r++) e[r]! /= length;
  return { ...lineAlong(form, e), form, e };
}

/** A form along a fixed e. */
export function lineAlong(form: Form, e: Numbers): Line {
  const coefficients = Float64Array.from(form.l);
  let constant = form.o;
  for (let r = 0; r < form.rows; r++) {
    constant += e[r]! * form.c[r]!;
    for (let k = 0; k < WRENCH; k++) coefficients[k]! += e[r]! * form.P[WRENCH * r + k]!;
  }
  return { coefficients, constant };
}

/**
 * The form as it would be without the drive. A drive's force enters a form linearly, by the torque's column and the constants alone, so a form
 * of the same check with the drive at `part` (0 to 1, not 1) of its force tells the rest. Null where `weaker` has no such form.
 */
export function withoutDrive(form: Form, weaker: CheckForm, part: number): Form | null {
  let twin: Form | null = null;
  let nearest = Number.POSITIVE_INFINITY;
  for (const other of weaker.forms) {
    if (!sameButDrive(form, other)) continue;
    const away = driveDistance(form, other);
    if (away < nearest) {
      nearest = away;
      twin = other;
    }
  }
  if (!twin) return null;
  const found = twin;
  const back = (whole: number, less: number) => (less - part * whole) / (1 - part);
  return {
    ...form,
    P: form.P.map((v, k) => (k % WRENCH === TORQUE ? back(v, found.P[k]!) : v)),
    c: form.c.map((v, k) => back(v, found.c[k]!)),
    l: form.l.map((v, k) => (k === TORQUE ? back(v, found.l[k]!) : v)),
    o: back(form.o, found.o),
  };
}

const TORQUE = WRENCH - 1;
/** Coefficients that differ by less, as a share of the largest, are the same. */
const SAME = 1e-12;

function sameButDrive(a: Form, b: Form): boolean {
  if (a.rows !== b.rows || !near(a.torqueFrom, b.torqueFrom) || !near(a.torqueTo, b.torqueTo)) return false;
  let size = 0;
  for (const v of [...a.P, ...a.l]) size = Math.max(size, Math.abs(v));
  const alike = (x: Float64Array, y: Float64Array) =>
    x.every((v, k) => k % WRENCH === TORQUE || Math.abs(v - y[k]!) <= SAME * size);
  return alike(a.P, b.P) && alike(a.l, b.l);
}

function near(a: number, b: number): boolean {
  return a === b || Math.abs(a - b) <= 1e-9 * Math.abs(a);
}

function driveDistance(a: Form, b: Form): number {
  let sum = (a.o - b.o) ** 2;
  for (let r = 0; r < a.rows; r++) {
    sum += (a.P[WRENCH * r + TORQUE]! - b.P[WRENCH * r + TORQUE]!) ** 2 + (a.c[r]! - b.c[r]!) ** 2;
  }
  return sum + (a.l[TORQUE]! - b.l[TORQUE]!) ** 2;
}

export interface Share {
  readonly kind: 'link' | 'payload' | 'tip force' | 'drive';
  readonly name: string;
  /** In the check's unit; the shares of a check sum to its value. */
  readonly value: number;
}

/** What a pose was taken with: the free parts of the case, rates per revolute joint; null where nothing is free. */
export interface ShareRates {
  readonly tipForce: Numbers | null;
  readonly speed: Numbers | null;
  readonly accel: Numbers | null;
}

/** A pose of a chain under one of its cases, and the joint looked at. */
export interface ShareState {
  readonly chain: Chain;
  readonly load: LoadCase;
  readonly caseIndex: number;
  /** Chain index. */
  readonly joint: number;
  readonly pose: Numbers;
  readonly rates: ShareRates;
}

/** Load of the joint in the state, or of one part of what loads it, canonical housing frame. [6] */
export function stateLoad(state: ShareState, part?: ChainCase): Float64Array {
  const { chain, pose, rates, joint } = state;
  const load = part ?? chain.cases[state.caseIndex]!;
  const still = new Float64Array(chain.n);
  const motion = { speed: rates.speed ?? still, accel: rates.accel ?? still };
  const out = new Float64Array(WRENCH * chain.n);
  const tip = load.force === 'any' ? rates.tipForce : null;
  dynamicLoads(chain, load, pose, motion, out, poseScratch(chain.n), tip);
  return out.slice(WRENCH * joint, WRENCH * joint + WRENCH);
}

/**
 * Shares of the value that `line` has at the state. `undriven`: the same line without the drive (the same line where there is none). Bodies
 * inboard of the joint load nothing and are left out. Empty where the load is not finite.
 */
export function sharesAt(state: ShareState, line: Line, undriven: Line): readonly Share[] {
  const { chain, joint } = state;
  const whole = chain.cases[state.caseIndex]!;
  const wrench = stateLoad(state);
  if (!wrench.every(Number.isFinite)) return [];
  const along = (part: ChainCase) => dot(undriven.coefficients, stateLoad(state, part));
  const shares: Share[] = [];
  for (const body of chain.bodies) {
    if (body.link < joint) continue;
    shares.push({ kind: 'link', name: body.name, value: along(caseOf(whole, body)) });
  }
  const payload = casePayload(chain, state.load);
  if (payload) shares.push({ kind: 'payload', name: 'payload', value: along(caseOf(whole, payload)) });
  if (whole.force !== 'none') {
    shares.push({ kind: 'tip force', name: 'tip force', value: along({ ...weightless(whole), force: whole.force }) });
  }
  const driven = dot(line.coefficients, wrench) + line.constant - dot(undriven.coefficients, wrench);
  if (line !== undriven) shares.push({ kind: 'drive', name: 'drive', value: driven });
  return shares;
}

function dot(coefficients: Float64Array, wrench: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < WRENCH; k++) sum += coefficients[k]! * wrench[k]!;
  return sum;
}

function weightless(load: ChainCase): ChainCase {
  return {
    ...load,
    mass: new Float64Array(load.mass.length),
    first: new Float64Array(load.first.length),
    inertia: new Float64Array(load.inertia.length),
    force: 'none',
  };
}

/** The case with one body alone, its factor applied. */
function caseOf(load: ChainCase, body: ChainBody): ChainCase {
  const alone = weightless(load);
  alone.mass[body.link] = load.factor * body.mass;
  for (let k = 0; k < 3; k++) alone.first[3 * body.link + k] = load.factor * body.first[k]!;
  for (let k = 0; k < 6; k++) alone.inertia[6 * body.link + k] = load.factor * body.inertia[k]!;
  return alone;
}
