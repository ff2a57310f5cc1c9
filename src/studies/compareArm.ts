/**
 * The verdict of a comparison: what each layout of a `ComparePlan` makes its bearings carry at worst. The load on the joint does not
 * depend on how it is carried, so one pass over the poses serves every layout and span: all checks of the plan are held against each
 * joint load of that pass, none is thinned out or interpolated, and each row keeps its own governing pose.
 */
import type { Arrangement, ComparePlan, Layout } from './comparePlan.ts';
import { layoutChecks } from './comparePlan.ts';
import type { CheckRow } from './results.ts';

export interface LayoutResult extends Layout {
  /** Radial load on A and on B, axial load on A and on B, tilting moment about the joint origin. */
  readonly rows: readonly CheckRow[];
  /** The larger of the two radial loads; A where they tie. */
  readonly worst: CheckRow;
}

export interface CompareRatio {
  readonly check: string;
  /** Null: the larger of A and B for `radial`; the joint for `moment`. */
  readonly bearing: 'A' | 'B' | null;
  /** Cantilever over clevis; null where the clevis carries nothing. */
  readonly ratio: number | null;
}

export interface SpanRow {
  readonly span: number;
  /** Worst radial loads on A and B. */
  readonly clevis: readonly [CheckRow, CheckRow];
  readonly cantilever: readonly [CheckRow, CheckRow];
}

export interface CompareResult {
  readonly joint: string;
  readonly jointIndex: number;
  readonly hub: number;
  readonly asFile: Arrangement;
  readonly assumptions: readonly string[];
  readonly clevis: LayoutResult;
  readonly cantilever: LayoutResult;
  readonly ratios: readonly CompareRatio[];
  readonly spans: readonly SpanRow[];
}

/** The larger value; a failed one wins, so that it is seen. */
function larger(a: CheckRow, b: CheckRow): CheckRow {
  if (Number.isNaN(a.value)) return a;
  return Number.isNaN(b.value) || b.value > a.value ? b : a;
}

/** `rows[k]` is the worst of `plan.checks[k]` over the poses and cases of one pass, whichever way it was found. */
export function compareArm(plan: ComparePlan, rows: readonly CheckRow[]): CompareResult {
  if (rows.length !== plan.checks.length) {
    throw new RangeError(`${rows.length} rows for ${plan.checks.length} checks of a comparison`);
  }
  const [moment, axialA, axialB] = [rows[0]!, rows[1]!, rows[2]!];
  const radials = (k: number): readonly [CheckRow, CheckRow] => {
    const at = layoutChecks(k);
    return [
      { ...rows[at]!, check: 'radial' },
      { ...rows[at + 1]!, check: 'radial' },
    ];
  };
  const layout = (own: Layout, k: number): LayoutResult => {
    const [a, b] = radials(k);
    return { ...own, rows: [a, b, axialA, axialB, moment], worst: larger(a, b) };
  };
  const clevis = layout(plan.clevis, 0);
  const cantilever = layout(plan.cantilever, 1);
  const ratio = (check: string, bearing: CompareRatio['bearing'], over: CheckRow, under: CheckRow): CompareRatio => ({
    check,
    bearing,
    ratio: under.value === 0 ? null : over.value / under.value,
  });
  return {
    joint: plan.joint,
    jointIndex: plan.jointIndex,
    hub: plan.hub,
    asFile: plan.asFile,
    assumptions: plan.assumptions,
    clevis,
    cantilever,
    ratios: [
      ...clevis.rows.map((row, k) => ratio(row.check, row.bearing as 'A' | 'B' | null, cantilever.rows[k]!, row)),
      ratio('radial', null, cantilever.worst, clevis.worst),
    ],
    spans: plan.spans.map((row, k) => ({
      span: row.span,
      clevis: radials(2 + 2 * k),
      cantilever: radials(3 + 2 * k),
    })),
  };
}
