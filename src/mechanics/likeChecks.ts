/**
 * Checks that are the same function of the joint load but for a factor (a bearing's slope goes with its load, its static load may be its radial
 * one): what bounds one bounds the other.
 *
 * ‖P w + c‖² is a quadratic form of (w, 1), so it is its Gram matrix that counts, not the rows. Matrices G and s² H that differ by at most
 * ε √(G_jj G_kk) differ by at most ε N² at any load, N = Σ √G_jj |w_j| being no more than what the check's lengths and masses allow (its
 * ceiling): the norms differ by at most √ε N.
 */
import { WRENCH } from './chain.ts';
import type { CheckForm, Form } from './form.ts';

const ALIKE = 2e-14;
/** By how much of its ceiling a check may exceed the factor times the other. */
export const UNLIKE = 2e-7;

/** s > 0 with a = s b at every load but for `UNLIKE` times the ceiling of a; null where there is none. */
export function factorBetween(a: CheckForm, b: CheckForm): number | null {
  if (a.joint !== b.joint || a.forms.length !== b.forms.length) return null;
  const factors = a.forms.map((f, k) => formFactor(f, b.forms[k]!));
  const first = factors[0];
  if (first == null) return null;
  return factors.every((s) => s !== null && Math.abs(s - first) <= ALIKE * first) ? first : null;
}

function formFactor(a: Form, b: Form): number | null {
  if (a.rows !== b.rows || a.torqueFrom !== b.torqueFrom || a.torqueTo !== b.torqueTo) return null;
  const G = gram(a);
  const H = gram(b);
  const size = WRENCH + 1;
  let at = 0;
  for (let k = 1; k < size; k++) if (H[k * size + k]! > H[at * size + at]!) at = k;
  const top = H[at * size + at]!;
  if (!(top > 0)) return null;
  const square = G[at * size + at]! / top;
  const s = Math.sqrt(square);
  if (!(s > 0) || !Number.isFinite(s)) return null;
  for (let j = 0; j < size; j++) {
    for (let k = 0; k < size; k++) {
      const most = ALIKE * Math.sqrt(G[j * size + j]! * G[k * size + k]!);
      if (!(Math.abs(G[j * size + k]! - square * H[j * size + k]!) <= most)) return null;
    }
  }
  const alike = (x: number, y: number) => Math.abs(x - s * y) <= ALIKE * Math.abs(x);
  return alike(a.o, b.o) && a.l.every((v, k) => alike(v, b.l[k]!)) ? s : null;
}

/** [P c]ᵀ [P c]. */
function gram({ rows, P, c }: Form): Float64Array {
  const size = WRENCH + 1;
  const row = (r: number, k: number) => (k < WRENCH ? P[WRENCH * r + k]! : c[r]!);
  const G = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    for (let k = 0; k < size; k++) for (let r = 0; r < rows; r++) G[j * size + k]! += row(r, j) * row(r, k);
  }
  return G;
}
