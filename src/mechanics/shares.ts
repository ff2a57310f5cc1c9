/**
 * Who causes the value of a check at a pose: each link, the payload, the tip force and the drive. A check is the maximum of linear functions of the joint
 * load; the one that wins at the pose is linear in every weight and force, so the shares add up to the value exactly.
 */
import type { LoadCase } from '../arm/arm.ts';
import type { Numbers } from '../math/vector.ts';
import { type Chain, type ChainBody, type ChainCase, casePayload, WRENCH } from './chain.ts';
import { type CheckForm, type Form, formHolds, formValue } from './form.ts';
import { dynamicLoads, poseScratch } from './newtonEuler.ts';

/** The linear function that wins at a wrench: value = coefficients · w + constant. */
export interface WinningLine {
  /** [6] */
  readonly coefficients: Float64Array;
  readonly constant: number;
  readonly form: Form;
  /** Unit vector e of the winning norm. [rows] */
  readonly e: Float64Array;
}

/** Linear function of the form that wins at w[at..], tight there; null where no form holds. */
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

/** Coefficients of a form along a fixed e. */
export function lineAlong(form: Form, e: Numbers): { coefficients: Float64Array; constant: number } {
  const coefficients = Float64Array.from(form.l);
  let constant = form.o;
  for (let r = 0; r < form.rows; r++) {
    constant += e[r]! * form.c[r]!;
    for (let k = 0; k < WRENCH; k++) coefficients[k]! += e[r]! * form.P[WRENCH * r + k]!;
  }
  return { coefficients, constant };
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

/**
 * Shares of one check at one pose. `undriven`: the same check built without the drive (for what the drive adds). The wrench [6] is the
 * joint load there. Bodies inboard of the joint load nothing and are left out.
 */
export function sharesAt(
  chain: Chain,
  load: LoadCase,
  caseIndex: number,
  check: CheckForm,
  undriven: CheckForm,
  pose: Numbers,
  rates: ShareRates,
  wrench: Numbers,
): readonly Share[] {
  const line = winningLine(check, wrench, 0);
  if (!line) return [];
  const which = check.forms.indexOf(line.form);
  const plainForm = undriven.forms[Math.min(which, undriven.forms.length - 1)]!;
  const plain = lineAlong(plainForm, line.e);
  const whole = chain.cases[caseIndex]!;
  const still = new Float64Array(chain.n);
  const motion = { speed: rates.speed ?? still, accel: rates.accel ?? still };
  const out = new Float64Array(WRENCH * chain.n);
  const scratch = poseScratch(chain.n);
  const at = WRENCH * check.joint;
  const along = (part: ChainCase): number => {
    dynamicLoads(chain, part, pose, motion, out, scratch, part.force === 'any' ? rates.tipForce : null);
    let sum = 0;
    for (let k = 0; k < WRENCH; k++) sum += plain.coefficients[k]! * out[at + k]!;
    return sum;
  };
  const shares: Share[] = [];
  for (const body of chain.bodies) {
    if (body.link < check.joint) continue;
    shares.push({ kind: 'link', name: body.name, value: along(caseOf(whole, body)) });
  }
  const payload = casePayload(chain, load);
  if (payload) shares.push({ kind: 'payload', name: 'payload', value: along(caseOf(whole, payload)) });
  if (whole.force !== 'none') {
    shares.push({ kind: 'tip force', name: 'tip force', value: along({ ...weightless(whole), force: whole.force }) });
  }
  let driven = line.constant - plain.constant;
  for (let k = 0; k < WRENCH; k++) driven += (line.coefficients[k]! - plain.coefficients[k]!) * wrench[k]!;
  if (driven !== 0) shares.push({ kind: 'drive', name: 'drive', value: driven });
  return shares;
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
