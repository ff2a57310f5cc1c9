/**
 * Forms that are the same all round an axis: those that are, and bounds of those that are not because something in the housing adds a load across
 * the axis that does not turn with the arm (a gear's or belt's pull).
 */
import type { Numbers } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import { type Form, isRanged } from './form.ts';

/** Whether a form keeps its value when the load turns about the z axis: rows that turn into each other, or that look along z. */
export function sameAllRound(f: Form): boolean {
  const { P, c, l } = f;
  if (!isAlong(l, 0) || isRanged(f)) return false;
  const pair = f.rows >= 2 && !(isAlong(P, 0) && isAlong(P, WRENCH));
  for (let r = pair ? 2 : 0; r < f.rows; r++) if (!isAlong(P, WRENCH * r)) return false;
  if (!pair) return true;
  if (c[0] !== 0 || c[1] !== 0) return false;
  return turnsAlong(f) && [2, 5].every((k) => P[k] === 0 && P[WRENCH + k] === 0);
}

/** Whether a row looks along z alone. */
function isAlong(row: Numbers, at: number): boolean {
  return [0, 1, 3, 4].every((k) => row[at + k] === 0);
}

/** Second row = first row turned by a right angle, but for what looks along z: R P = P R for every turn R. */
function turnsAlong({ P }: Form): boolean {
  return [0, 3].every((k) => P[k] === P[WRENCH + k + 1] && P[k + 1] === -P[WRENCH + k]!);
}

/** Travel of a joint, rad, from which a load is taken to come round to where a gear or belt pulls. */
export const FAR = Math.PI;

/** A form with ‖ (P w)₁₂ ‖ + lean·w + leanO in place of the norm of its first two rows. */
export interface RoundForm {
  readonly form: Form;
  /** [6] */
  readonly lean: Float64Array;
  readonly leanO: number;
}

export const upright = (f: Form): RoundForm => ({ form: f, lean: new Float64Array(WRENCH), leanO: 0 });

/** The lean outside the norm: the same for two rows, no less for three. */
export function leaned({ form: f, lean, leanO }: RoundForm): Form {
  return { ...f, l: f.l.map((v, k) => v + lean[k]!), o: f.o + leanO };
}

/**
 * Forms of the same value all round that together lie nowhere below the given ones within their torque ranges; null where one is of another
 * kind. With rows one and two y = A w + d_f f_z + d_m m_z + c, A turning with the axis,
 *
 *     ‖y‖ ≤ ‖A w‖ + ‖d_f‖ |f_z| + ‖d_m‖ |m_z| + ‖c‖
 *
 * and |x| is the larger of x and -x. Where the joint can turn the load so that y's parts align the two are equal.
 */
export function roundForms(forms: readonly Form[]): readonly RoundForm[] | null {
  const kept = new Map<string, RoundForm>();
  for (const f of forms) {
    const list = sameAllRound(f) ? [upright(f)] : roundForm(f);
    if (!list) return null;
    // Some are alike once their torque ranges are left out.
    for (const one of list) {
      const { P, c, l, o } = one.form;
      kept.set([P.join(), c.join(), l.join(), o, one.lean.join(), one.leanO].join(' '), one);
    }
  }
  return [...kept.values()];
}

/** The same as plain forms. */
export function allRound(forms: readonly Form[]): readonly Form[] | null {
  return roundForms(forms)?.map(leaned) ?? null;
}

function roundForm(f: Form): readonly RoundForm[] | null {
  const { P, c, rows } = f;
  if (!isAlong(f.l, 0) || rows < 2 || !turnsAlong(f)) return null;
  if (rows === 3 && !isAlong(P, 2 * WRENCH)) return null;
  const size = (k: number) => Math.hypot(P[k]!, P[WRENCH + k]!);
  const bare: Form = {
    ...f,
    P: P.map((v, k) => (k < 2 * WRENCH && k % 3 === 2 ? 0 : v)),
    c: c.map((v, r) => (r < 2 ? 0 : v)),
    torqueFrom: Number.NEGATIVE_INFINITY,
    torqueTo: Number.POSITIVE_INFINITY,
  };
  const out: RoundForm[] = [];
  for (const force of size(2) > 0 ? [1, -1] : [0]) {
    for (const torque of size(5) > 0 ? [1, -1] : [0]) {
      if ((torque > 0 && f.torqueTo <= 0) || (torque < 0 && f.torqueFrom >= 0)) continue;
      const lean = new Float64Array(WRENCH);
      lean[2] = force * size(2);
      lean[5] = torque * size(5);
      out.push({ form: bare, lean, leanO: Math.hypot(c[0]!, c[1]!) });
    }
  }
  return out;
}
