import type { InertiaFile } from './armFile.ts';
import type { IssuePath } from './issue.ts';
import type { Findings, Known } from './known.ts';

/** Part of the trace a moment may lack before the inertia is called impossible: lets numbers rounded to four digits through. */
const ROUNDING = 1e-4;

/**
 * Least eigenvalue of a symmetric 3×3 matrix, by the trigonometric solution of its characteristic equation.
 * Source: O. K. Smith, "Eigenvalues of a symmetric 3 × 3 matrix", Comm. ACM 4 (1961) 168 (from memory).
 */
function leastEigenvalue(xx: number, yy: number, zz: number, xy: number, xz: number, yz: number): number {
  const mean = (xx + yy + zz) / 3;
  const square = (xx - mean) ** 2 + (yy - mean) ** 2 + (zz - mean) ** 2 + 2 * (xy * xy + xz * xz + yz * yz);
  const p = Math.sqrt(square / 6);
  if (!(p > 0)) return mean;
  const a = (xx - mean) / p;
  const b = (yy - mean) / p;
  const c = (zz - mean) / p;
  const d = xy / p;
  const e = xz / p;
  const f = yz / p;
  const half = (a * (b * c - f * f) - d * (d * c - f * e) + e * (d * f - b * e)) / 2;
  const angle = Math.acos(Math.min(1, Math.max(-1, half))) / 3;
  return mean + 2 * p * Math.cos(angle + (2 * Math.PI) / 3);
}

/**
 * A body's inertia J has principal moments ≥ 0, none larger than the sum of the other two. Both hold exactly where ½ tr(J) 1 − J, the matrix of
 * second moments of mass, is positive semidefinite.
 */
export function checkInertia(file: Known<InertiaFile> | undefined, path: IssuePath, findings: Findings): void {
  if (!file || file.xx === undefined || file.yy === undefined || file.zz === undefined) return;
  const [xy, xz, yz] = [file.xy ?? 0, file.xz ?? 0, file.yz ?? 0];
  const { xx, yy, zz } = file;
  const trace = xx + yy + zz;
  const half = trace / 2;
  const least = leastEigenvalue(half - xx, half - yy, half - zz, -xy, -xz, -yz);
  if (least >= -ROUNDING * trace) return;
  const body = 'moments of a real body: each principal moment at most the sum of the other two';
  findings.problem('inertia', path, `xx ${xx}, yy ${yy}, zz ${zz}, xy ${xy}, xz ${xz}, yz ${yz}`, body);
}
