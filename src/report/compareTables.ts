/** A comparison of clevis and cantilever as tables. */
import type { CompareResult } from '../studies/compareArm.ts';
import type { CheckRow } from '../studies/results.ts';
import { SHOWN_UNITS, type UnitSystem } from '../units/format.ts';
import { fromSI } from '../units/unit.ts';
import { poseText, shownUnit } from './shown.ts';
import { type Cell, type Column, decimalsFor, type Table } from './table.ts';

function words(title: string): Column {
  return { title, unit: null, decimals: null };
}

function lengthText(metres: number, system: UnitSystem): string {
  const unit = SHOWN_UNITS[system].length;
  return `${Number(fromSI(metres, unit).toPrecision(5))} ${unit}`;
}

/** Both layouts in words, one row each. */
export function layoutTable(result: CompareResult, system: UnitSystem = 'metric'): Table {
  const length = (metres: number) => lengthText(metres, system);
  const rows = [result.clevis, result.cantilever].map((layout): Cell[] => [
    layout.arrangement,
    result.asFile === layout.arrangement ? 'as in the file' : 'for comparison',
    length(layout.span),
    layout.arrangement === 'clevis'
      ? `offset ${length(layout.offset)}`
      : `overhang ${length(layout.overhang)}, side ${layout.side}`,
    length(layout.stationA),
    length(layout.stationB),
  ]);
  return {
    title: `Hub plane at ${length(result.hub)} along the axis`,
    columns: ['layout', '', 'span', 'hub', 'A at', 'B at'].map(words),
    rows,
  };
}

/** Worst loads of both, their ratio, and the poses and cases that govern. */
export function compareTable(result: CompareResult, system: UnitSystem = 'metric'): Table {
  const { clevis, cantilever } = result;
  const shown = (row: CheckRow) => shownUnit(row.unit, system);
  const all = [...clevis.rows, ...cantilever.rows];
  const decimals = (unit: string) =>
    decimalsFor(all.filter((row) => row.unit === unit).map((row) => shown(row).of(row.value)));
  const line = (name: string, bearing: string | null, a: CheckRow, b: CheckRow, ratio: number | null): Cell[] => [
    name,
    bearing,
    shown(a).of(a.value),
    shown(b).of(b.value),
    shown(a).unit,
    ratio,
    poseText(a.pose),
    poseText(b.pose),
    a.case === b.case ? a.case : `${a.case} / ${b.case}`,
  ];
  const body = clevis.rows.map((row, k) =>
    line(row.check, row.bearing, row, cantilever.rows[k]!, result.ratios[k]!.ratio),
  );
  const worst = line('radial', 'A or B', clevis.worst, cantilever.worst, result.ratios.at(-1)!.ratio);
  const shownRows = [...clevis.rows.slice(0, 2), clevis.worst, ...clevis.rows.slice(2)];
  const byRow = shownRows.map((row) => decimals(row.unit));
  return {
    title: 'Worst loads',
    columns: [
      words('check'),
      words('bearing'),
      { title: 'clevis', unit: null, decimals: byRow },
      { title: 'cantilever', unit: null, decimals: byRow },
      words('unit'),
      { title: 'ratio', unit: null, decimals: 3 },
      { title: 'clevis pose', unit: '°', decimals: null },
      { title: 'cantilever pose', unit: '°', decimals: null },
      words('case'),
    ],
    rows: [...body.slice(0, 2), worst, ...body.slice(2)],
  };
}

/** Worst radial load of each bearing against span, both layouts. */
export function spanTable(result: CompareResult, system: UnitSystem = 'metric'): Table {
  const force = shownUnit('N', system);
  const unit = SHOWN_UNITS[system].length;
  const values = result.spans.flatMap((row) => [...row.clevis, ...row.cantilever].map((r) => force.of(r.value)));
  const decimals = decimalsFor(values);
  const column = (title: string): Column => ({ title, unit: force.unit, decimals });
  const rows = result.spans.map((row): Cell[] => {
    const own = [
      ...(row.span === result.clevis.span ? ['clevis'] : []),
      ...(row.span === result.cantilever.span ? ['cantilever'] : []),
    ];
    const numbers = [...row.clevis, ...row.cantilever].map((r) => force.of(r.value));
    return [Number(fromSI(row.span, unit).toPrecision(12)), ...numbers, own.length > 0 ? `← ${own.join(', ')}` : ''];
  });
  const spans = result.spans.map((row) => fromSI(row.span, unit));
  return {
    title: 'Worst radial load against span',
    columns: [
      { title: 'span', unit, decimals: Math.max(1, decimalsFor([Math.min(...spans)], 3)) },
      ...['clevis A', 'clevis B', 'cantilever A', 'cantilever B'].map(column),
      words(''),
    ],
    rows,
  };
}
