/**
 * One joint on a clevis and on a cantilever: the two layouts, the stated defaults that fill in what the file does not say, and the
 * spans at which both are looked at. The link and its hub plane stay where they are; the joint load does not depend on any of this.
 */
import type { Arm, Joint, PairSupport } from '../arm/arm.ts';
import { axialForms, jointChecks, radialForms } from '../mechanics/bearingPair.ts';
import type { Chain } from '../mechanics/chain.ts';
import type { CheckForm, Form } from '../mechanics/form.ts';

/** What the user may set; m. What is left out is as the file has it or by the stated default. */
export interface CompareOptions {
  readonly clevisSpan?: number | undefined;
  readonly cantileverSpan?: number | undefined;
  /** Hub to near bearing of the cantilever. */
  readonly overhang?: number | undefined;
  readonly side?: '+' | '-' | undefined;
  /** Spans of the table, m, besides the two layouts' own; default: `SPAN_STEPS` times the span of the file. */
  readonly spans?: readonly number[] | undefined;
}

/** Preferred numbers R10 of ISO 3, two fifths to two and a half times the span of the file. */
export const SPAN_STEPS = [0.4, 0.5, 0.63, 0.8, 1, 1.25, 1.6, 2, 2.5] as const;

export type Arrangement = 'clevis' | 'cantilever';

export interface Layout {
  readonly arrangement: Arrangement;
  readonly span: number;
  /** Clevis: middle of the pair from the hub. */
  readonly offset: number;
  /** Cantilever: hub to near bearing A. */
  readonly overhang: number;
  readonly side: '+' | '-';
  readonly stationA: number;
  readonly stationB: number;
}

export interface ComparePlan {
  readonly joint: string;
  readonly jointIndex: number;
  readonly chainIndex: number;
  /** Mid-plane of the hub along the axis, m. */
  readonly hub: number;
  /** The arrangement of the file. */
  readonly asFile: Arrangement;
  readonly clevis: Layout;
  readonly cantilever: Layout;
  /** Defaults taken, one sentence each, and what stays as in the file. */
  readonly assumptions: readonly string[];
  /** Rising, m, each with both layouts. */
  readonly spans: readonly { readonly span: number; readonly clevis: Layout; readonly cantilever: Layout }[];
  /**
   * What no layout changes: tilting moment about the joint origin, axial load on A and on B (the first `SHARED_CHECKS`); then the
   * radial load on A and on B of each layout: the two own ones, then the spans in order, each time the clevis before the cantilever.
   */
  readonly checks: readonly CheckForm[];
}

/** Why a joint cannot be compared, as a clause for one sentence. */
export interface CompareRefusal {
  readonly refused: string;
}

const BEARINGS = ['A', 'B'] as const;
export const SHARED_CHECKS = 3;

/** Where in `plan.checks` the radial loads on A and then B of the layout of that number stand. */
export function layoutChecks(layoutNumber: number): number {
  return SHARED_CHECKS + 2 * layoutNumber;
}

function clevis(hub: number, span: number, offset: number): Layout {
  const stationA = hub - span / 2 + offset;
  return { arrangement: 'clevis', span, offset, overhang: 0, side: '-', stationA, stationB: stationA + span };
}

function cantilever(hub: number, span: number, overhang: number, side: '+' | '-'): Layout {
  const sign = side === '-' ? -1 : 1;
  const stationA = hub + sign * overhang;
  return { arrangement: 'cantilever', span, offset: 0, overhang, side, stationA, stationB: stationA + sign * span };
}

/** The stations of the file to the last bit, where a layout is the file's own. */
function asInFile(support: PairSupport, layout: Layout): Layout {
  const { stationA, stationB } = support;
  const keys = ['arrangement', 'span', 'offset', 'overhang', 'side'] as const;
  const own = keys.every((key) => layout[key] === support[key] || (key === 'side' && layout.arrangement === 'clevis'));
  return own ? { ...layout, stationA, stationB } : layout;
}

function mm(metres: number): string {
  return `${Number((metres * 1000).toPrecision(6))} mm`;
}

function findJoint(arm: Arm, name: string): { joint: Joint; jointIndex: number } | CompareRefusal {
  const jointIndex = arm.joints.findIndex((joint) => joint.name === name);
  if (jointIndex < 0) return { refused: `there is no joint "${name}"; the joints are ${listText(supported(arm))}` };
  return { joint: arm.joints[jointIndex]!, jointIndex };
}

function supported(arm: Arm): readonly string[] {
  return arm.joints.filter((joint) => joint.kind === 'revolute').map((joint) => joint.name);
}

function listText(names: readonly string[]): string {
  return names.map((name) => `"${name}"`).join(', ');
}

function wrongNumber(options: CompareOptions): string | null {
  const spans = [options.clevisSpan, options.cantileverSpan, ...(options.spans ?? [])];
  if (spans.some((span) => span !== undefined && !(span > 0 && Number.isFinite(span)))) return 'a span must be above 0';
  const { overhang } = options;
  if (overhang !== undefined && !(overhang >= 0 && Number.isFinite(overhang))) return 'the overhang must be 0 or more';
  return null;
}

/**
 * Lays out both arrangements of the joint named `name`. Defaults, each of our own and each told in `assumptions`:
 * - the arrangement that the file does not have takes the span of the one it has;
 * - a clevis that the file does not have stands with its middle on the hub plane;
 * - a cantilever that the file does not have lies on side `-`, its near bearing where the clevis has its bearing on that side,
 *   so that the overhang is half the span of the clevis, less or more its offset;
 * - along the spans a clevis keeps its offset in proportion to the span and a cantilever keeps its overhang.
 */
export function planCompare(
  arm: Arm,
  chain: Chain,
  name: string,
  options: CompareOptions = {},
): ComparePlan | CompareRefusal {
  const found = findJoint(arm, name);
  if ('refused' in found) return found;
  const { joint, jointIndex } = found;
  const { support } = joint;
  const chainIndex = chain.jointIndex.indexOf(jointIndex);
  if (chainIndex < 0) return { refused: `joint "${name}" is fixed and has no bearings` };
  if (!support)
    return { refused: `joint "${name}" has no support in the file, so its hub plane and span are not known` };
  if (support.arrangement === 'ring') {
    return { refused: `joint "${name}" stands on a ring bearing; only a pair of bearings can be compared` };
  }
  const wrong = wrongNumber(options);
  if (wrong) return { refused: wrong };
  const layouts = chooseLayouts(support, options);
  const base = support.span;
  const spans = [
    ...new Set([
      ...(options.spans ?? SPAN_STEPS.map((step) => Number((step * base).toPrecision(3)))),
      layouts.clevis.span,
      layouts.cantilever.span,
    ]),
  ].sort((a, b) => a - b);
  const { offset } = layouts.clevis;
  const table = spans.map((span) => ({
    span,
    clevis: asInFile(
      support,
      clevis(support.hub, span, span === layouts.clevis.span ? offset : (offset / layouts.clevis.span) * span),
    ),
    cantilever: asInFile(support, cantilever(support.hub, span, layouts.cantilever.overhang, layouts.cantilever.side)),
  }));
  const make = (check: string, bearing: 'A' | 'B', forms: readonly Form[]): CheckForm => ({
    check,
    joint: chainIndex,
    bearing,
    unit: 'N',
    forms,
  });
  const all = [layouts.clevis, layouts.cantilever, ...table.flatMap((row) => [row.clevis, row.cantilever])];
  return {
    joint: name,
    jointIndex,
    chainIndex,
    hub: support.hub,
    asFile: support.arrangement,
    ...layouts,
    spans: table,
    checks: [
      ...jointChecks(chainIndex).filter((check) => check.check === 'moment'),
      ...BEARINGS.map((bearing) => make('axial', bearing, axialForms(support.thrust, bearing))),
      ...all.flatMap((layout, k) =>
        BEARINGS.map((bearing) =>
          make(`radial ${k}`, bearing, radialForms({ ...layout, drive: joint.drive }, bearing)),
        ),
      ),
    ],
  };
}

function chooseLayouts(
  support: PairSupport,
  options: CompareOptions,
): Pick<ComparePlan, 'clevis' | 'cantilever' | 'assumptions'> {
  const { hub } = support;
  const assumptions: string[] = [];
  const isClevis = support.arrangement === 'clevis';
  const say = (given: unknown, text: string) => {
    if (given === undefined) assumptions.push(text);
  };
  const clevisSpan = options.clevisSpan ?? support.span;
  const offset = !isClevis
    ? 0
    : clevisSpan === support.span
      ? support.offset
      : (support.offset / support.span) * clevisSpan;
  if (!isClevis) {
    say(options.clevisSpan, `clevis span ${mm(clevisSpan)}, as the cantilever in the file`);
    assumptions.push('clevis with its middle on the hub plane');
  } else if (offset !== support.offset) {
    assumptions.push(`clevis offset ${mm(offset)}, in proportion to its span`);
  }
  const cantileverSpan = options.cantileverSpan ?? support.span;
  const side = options.side ?? support.side;
  let overhang = options.overhang ?? support.overhang;
  if (isClevis) {
    say(options.cantileverSpan, `cantilever span ${mm(cantileverSpan)}, as the clevis in the file`);
    say(options.side, 'cantilever on side -');
    if (options.overhang === undefined) {
      overhang = support.span / 2 + (side === '-' ? -support.offset : support.offset);
      assumptions.push(
        `overhang ${mm(overhang)}: the near bearing stays where the clevis has its bearing on that side`,
      );
    }
  }
  assumptions.push(
    `thrust on ${support.thrust === 'both' ? 'either bearing by its direction' : support.thrust}, as in the file`,
  );
  if (support.adjusted) assumptions.push('both pairs taken at their bearing centres, not at pressure centres');
  return {
    clevis: asInFile(support, clevis(hub, clevisSpan, offset)),
    cantilever: asInFile(support, cantilever(hub, cantileverSpan, overhang, side)),
    assumptions,
  };
}
