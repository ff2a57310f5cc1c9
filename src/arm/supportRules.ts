import type { ArmFile, BearingFile, BushingFile, PairFile, RollingFile, ShaftFile, SupportFile } from './armFile.ts';
import type { IssuePath } from './issue.ts';
import type { Findings, Known } from './known.ts';

type KnownFile = Known<ArmFile>;

function inside(bore: number | undefined, outer: number | undefined, path: IssuePath, findings: Findings): void {
  if (bore === undefined || outer === undefined || bore < outer) return;
  findings.problem('geometry', path, String(bore), `less than the outside diameter, ${outer}`);
}

function checkShaft(shaft: Known<ShaftFile> | undefined, path: IssuePath, findings: Findings): void {
  if (!shaft) return;
  inside(shaft.bore_mm, shaft.diameter_mm, [...path, 'bore_mm'], findings);
  let end = Number.NEGATIVE_INFINITY;
  for (const [i, section] of (shaft.sections ?? []).entries()) {
    if (!section) continue;
    const at = [...path, 'sections', i];
    const bore = section.bore_mm ?? shaft.bore_mm;
    // A section without a bore of its own has the shaft's; the mistake is then the section's diameter.
    if (section.bore_mm !== undefined) inside(bore, section.diameter_mm, [...at, 'bore_mm'], findings);
    else if (bore !== undefined && section.diameter_mm !== undefined && section.diameter_mm <= bore) {
      findings.problem(
        'geometry',
        [...at, 'diameter_mm'],
        String(section.diameter_mm),
        `more than the bore of the shaft, ${bore}`,
      );
    }
    const { from_mm: from, to_mm: to } = section;
    if (from === undefined || to === undefined) continue;
    if (to <= from) findings.problem('wrong-order', [...at, 'to_mm'], String(to), `more than from_mm, ${from}`);
    if (from < end) {
      findings.problem(
        'wrong-order',
        [...at, 'from_mm'],
        String(from),
        `at least ${end}, where the section before it ends`,
      );
    }
    end = Math.max(end, to);
  }
}

/** Outside diameter of the shaft at a station; null where it is not known. */
function seatDiameter(shaft: Known<ShaftFile> | undefined, station: number): number | null {
  for (const section of shaft?.sections ?? []) {
    if (!section || section.from_mm === undefined || section.to_mm === undefined) return null;
    if (section.from_mm <= station && station <= section.to_mm) return section.diameter_mm ?? null;
  }
  return shaft?.diameter_mm ?? null;
}

function namedBearing(
  name: string | undefined,
  path: IssuePath,
  file: KnownFile,
  findings: Findings,
): Known<BearingFile> | undefined {
  if (name === undefined) return undefined;
  const table = file.bearings ?? {};
  if (Object.hasOwn(table, name)) return table[name];
  // A valid file: what this bearing can take is then unassessed, and says so.
  const known = Object.keys(table).slice(0, 8);
  const list = known.length > 0 ? `one of ${known.map((key) => JSON.stringify(key)).join(', ')}` : 'a bearing';
  findings.warn(
    'unknown-name',
    path,
    JSON.stringify(name),
    `${list} of the table bearings; its checks stay unassessed`,
  );
  return undefined;
}

function checkPlace(support: Known<PairFile>, path: IssuePath, findings: Findings): { A: number; B: number } | null {
  const { hub_mm: hub, span_mm: span } = support;
  if (support.arrangement === 'clevis') {
    const offset = support.offset_mm ?? 0;
    if (span === undefined) return null;
    if (Math.abs(offset) >= span / 2) {
      const expected = `less than half the span, ${span / 2}, either way: the hub lies between the bearings`;
      findings.problem('geometry', [...path, 'offset_mm'], String(offset), expected);
      return null;
    }
    return hub === undefined ? null : { A: hub + offset - span / 2, B: hub + offset + span / 2 };
  }
  if (support.arrangement !== 'cantilever' || hub === undefined || span === undefined) return null;
  if (support.overhang_mm === undefined || support.side === undefined) return null;
  const way = support.side === '+' ? 1 : -1;
  return { A: hub + way * support.overhang_mm, B: hub + way * (support.overhang_mm + span) };
}

function checkPair(support: Known<PairFile>, path: IssuePath, file: KnownFile, findings: Findings): void {
  const stations = checkPlace(support, path, findings);
  const bearings = {
    A: namedBearing(support.bearings?.A, [...path, 'bearings', 'A'], file, findings),
    B: namedBearing(support.bearings?.B, [...path, 'bearings', 'B'], file, findings),
  };
  if (support.adjusted !== undefined && support.thrust !== undefined && support.thrust !== 'both') {
    findings.problem('conflict', [...path, 'thrust'], `"${support.thrust}"`, '"both", because the pair is adjusted');
  }
  for (const end of ['A', 'B'] as const) {
    const bearing = bearings[end];
    const kind = bearing?.kind;
    const at = [...path, 'bearings', end];
    if (
      support.adjusted !== undefined &&
      kind !== undefined &&
      kind !== 'angular-contact' &&
      kind !== 'tapered-roller'
    ) {
      findings.problem(
        'wrong-kind',
        at,
        `a bearing of kind ${kind}`,
        'angular-contact or tapered-roller in an adjusted pair',
      );
    }
    if (kind === 'crossed-roller') {
      findings.problem(
        'wrong-kind',
        at,
        `a bearing of kind ${kind}`,
        'a bearing for a pair; a crossed-roller ring belongs to the arrangement ring',
      );
    }
    if (!stations || !bearing) continue;
    const seat = seatDiameter(support.shaft, stations[end]);
    if (seat !== null && bearing.bore_mm !== undefined && Math.abs(seat - bearing.bore_mm) > 0.5) {
      findings.warn('seat', at, `a bore of ${bearing.bore_mm} mm`, `the shaft's diameter there, ${seat} mm`);
    }
  }
  const widths = [bearings.A?.width_mm, bearings.B?.width_mm];
  if (support.span_mm === undefined || widths[0] === undefined || widths[1] === undefined) return;
  const least = (widths[0] + widths[1]) / 2;
  if (support.span_mm < least) {
    findings.warn(
      'geometry',
      [...path, 'span_mm'],
      String(support.span_mm),
      `at least ${least}, for the bearings not to overlap`,
    );
  }
}

function checkSupport(
  support: Known<SupportFile> | undefined,
  path: IssuePath,
  file: KnownFile,
  findings: Findings,
): void {
  if (!support) return;
  checkShaft(support.shaft, [...path, 'shaft'], findings);
  if (support.arrangement === 'ring') {
    const kind = namedBearing(support.bearing, [...path, 'bearing'], file, findings)?.kind;
    if (kind !== undefined && kind !== 'crossed-roller' && kind !== 'four-point') {
      const expected = 'crossed-roller or four-point, which carry moment by themselves';
      findings.problem('wrong-kind', [...path, 'bearing'], `a bearing of kind ${kind}`, expected);
    }
  } else if (support.arrangement !== undefined) checkPair(support as Known<PairFile>, path, file, findings);
}

function checkBearing(bearing: Known<BearingFile>, path: IssuePath, findings: Findings): void {
  const { bore_mm: bore, outer_mm: outer } = bearing;
  inside(bore, outer, [...path, 'bore_mm'], findings);
  if (bearing.kind === 'plain-bushing') checkBushing(bearing as Known<BushingFile>, path, findings);
  if (bearing.kind === 'plain-bushing' || bearing.kind === undefined) return;
  const rolling = bearing as Known<RollingFile>;
  if (rolling.clearance !== undefined && rolling.clearance_um !== undefined) {
    findings.problem(
      'conflict',
      [...path, 'clearance'],
      `"${rolling.clearance}" and clearance_um`,
      'only one of the two',
    );
  }
  const [from, to] = rolling.clearance_um ?? [];
  if (from !== undefined && to !== undefined && from > to) {
    findings.problem('wrong-order', [...path, 'clearance_um'], `${from} to ${to}`, 'the smaller clearance first');
  }
  if (bore === undefined || outer === undefined || bore >= outer) return;
  const pitch = rolling.pitch_diameter_mm;
  if (pitch !== undefined && (pitch <= bore || pitch >= outer)) {
    findings.problem(
      'geometry',
      [...path, 'pitch_diameter_mm'],
      String(pitch),
      `between the bore, ${bore}, and the outside diameter, ${outer}`,
    );
  }
  const ball = rolling.ball_diameter_mm;
  if (ball === undefined) return;
  if (ball >= (outer - bore) / 2) {
    findings.problem(
      'geometry',
      [...path, 'ball_diameter_mm'],
      String(ball),
      `less than the ring height, ${(outer - bore) / 2}`,
    );
    return;
  }
  const circle = Math.PI * (pitch ?? (bore + outer) / 2);
  if (rolling.balls !== undefined && rolling.balls * ball > circle) {
    const expected = `at most ${Math.floor(circle / ball)}, which fill the pitch circle`;
    findings.problem('geometry', [...path, 'balls'], String(rolling.balls), expected);
  }
}

function checkBushing(bushing: Known<BushingFile>, path: IssuePath, findings: Findings): void {
  const { bore_mm: bore, outer_mm: outer, flange_outer_mm: flange, wear_depth_mm: wear } = bushing;
  if (flange !== undefined && outer !== undefined && flange <= outer) {
    findings.problem(
      'geometry',
      [...path, 'flange_outer_mm'],
      String(flange),
      `more than the outside diameter, ${outer}`,
    );
  }
  if (wear === undefined || bore === undefined || outer === undefined || bore >= outer) return;
  if (wear >= (outer - bore) / 2) {
    findings.problem(
      'geometry',
      [...path, 'wear_depth_mm'],
      String(wear),
      `less than the wall of the bushing, ${(outer - bore) / 2}`,
    );
  }
}

/** Rules on supports, shafts and bearings. */
export function checkSupports(file: KnownFile, findings: Findings): void {
  for (const [i, joint] of (file.joints ?? []).entries()) {
    if (joint?.kind === 'revolute') checkSupport(joint.support, ['joints', i, 'support'], file, findings);
  }
  for (const [name, bearing] of Object.entries(file.bearings ?? {})) {
    if (bearing) checkBearing(bearing, ['bearings', name], findings);
  }
}
