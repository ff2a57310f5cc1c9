import { existsSync, readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { describe, expect, test } from 'vitest';
import type { RollingBearing } from '../../../src/arm/arm.ts';
import {
  bearingTable,
  bearingTableText,
  dynamicForm,
  dynamicRating,
  estimateRatings,
  readBearingCsv,
  staticForm,
  staticRating,
} from '../../../src/capacity/rolling/index.ts';
import { ISO_DIMENSIONS } from '../../../src/capacity/rolling/isoDimensions.ts';
import { known } from './bearings.ts';
import { HANDBOOK_BALLS, HANDBOOK_ROLLERS } from './reference/handbookSeries.ts';

const FILE = resolve(import.meta.dirname, '../../../models/bearings.json');
const table = bearingTable();

/** The table through the CSV reader, and so through the arm file's own reader. */
function throughCsv(): Readonly<Record<string, RollingBearing>> {
  const keys = [...new Set(Object.values(table).flatMap((entry) => Object.keys(entry)))];
  const lines = Object.entries(table).map(([name, entry]) => [
    name,
    ...keys.map((key) => entry[key as keyof typeof entry] ?? ''),
  ]);
  const text = [['name', ...keys], ...lines].map((line) => line.map((cell) => `"${cell}"`).join(',')).join('\n');
  const { bearings, issues } = readBearingCsv(text);
  expect(issues).toEqual([]);
  return bearings as Readonly<Record<string, RollingBearing>>;
}

describe('models/bearings.json', () => {
  test('is what the generator writes (vitest -u writes it anew)', async () => {
    expect(existsSync(FILE)).toBe(true);
    await expect(bearingTableText()).toMatchFileSnapshot(FILE);
  });

  test('holds all five dimension series, every rating marked as estimated', () => {
    const { bearings } = JSON.parse(readFileSync(FILE, 'utf8')) as { bearings: typeof table };
    expect(bearings).toEqual(table);
    for (const series of ['18', '19', '10', '02', '03'] as const) {
      for (const [bore] of ISO_DIMENSIONS[series]) expect(bearings).toHaveProperty(`dg-${series}-${bore}`);
    }
    for (const entry of Object.values(bearings)) expect(entry.source).toMatch(/^estimated/);
  });
});

describe('dimensions (ISO 15, from memory)', () => {
  test('rise with the bore in every series, the outer diameter with the series at every bore', () => {
    const order = ['18', '19', '10', '02', '03'] as const;
    for (const series of order) {
      const rows = ISO_DIMENSIONS[series];
      expect(rows.at(-1)![0]).toBe(60);
      for (let i = 1; i < rows.length; i++) {
        expect(rows[i]![0]).toBeGreaterThan(rows[i - 1]![0]);
        expect(rows[i]![1]).toBeGreaterThan(rows[i - 1]![1]);
        expect(rows[i]![2]).toBeGreaterThanOrEqual(rows[i - 1]![2]);
      }
    }
    for (let s = 1; s < order.length; s++) {
      for (const [bore, outer] of ISO_DIMENSIONS[order[s]!]) {
        const lighter = ISO_DIMENSIONS[order[s - 1]!].find((row) => row[0] === bore);
        if (lighter) expect(outer).toBeGreaterThan(lighter[1]);
      }
    }
  });

  test('agree with the handbook where it lists them', () => {
    let compared = 0;
    const listed = [
      ...HANDBOOK_BALLS.map((row) => ['02', row[0], row[1], row[2]] as const),
      ...HANDBOOK_ROLLERS.map((row) => [row[0] as '02' | '03', row[1], row[2], row[3]] as const),
    ];
    for (const [series, bore, outer, width] of listed) {
      const row = ISO_DIMENSIONS[series].find((r) => r[0] === bore);
      if (!row) continue;
      expect(row).toEqual([bore, outer, width]);
      compared++;
    }
    expect(compared).toBe(29);
  });
});

describe('ratings of the table', () => {
  const bearings = throughCsv();

  test('every entry is a sound bearing with factors, and says that its ratings are estimates', () => {
    expect(Object.keys(bearings)).toEqual(Object.keys(table));
    for (const [name, b] of Object.entries(bearings)) {
      expect(dynamicRating(b), name).toHaveProperty('notes', ['C-estimated']);
      expect(staticRating(b), name).toHaveProperty('notes', ['C0-estimated']);
      known(dynamicForm(b));
      known(staticForm(b));
    }
  });

  test('are the estimates of the bare dimensions, to three figures', () => {
    for (const [name, b] of Object.entries(bearings)) {
      const bare = { ...b, C: null, C0: null, f0: null, ballDiameter: null, balls: null };
      const { C, C0 } = known(estimateRatings(bare));
      expect(Math.abs(b.C! / C - 1), name).toBeLessThan(0.005);
      expect(Math.abs(b.C0! / C0 - 1), name).toBeLessThan(0.005);
    }
  });

  test('rise with the bore in a series where the section does not shrink, but for steps in the number of balls; and with the series', () => {
    const of = (prefix: string, series: string) =>
      Object.entries(bearings)
        .filter(([name]) => name.startsWith(`${prefix}-${series}-`))
        .map(([, b]) => b);
    let compared = 0;
    for (const [prefix, series] of [
      ...['18', '19', '10', '02', '03'].map((s) => ['dg', s] as const),
      ...['19', '10', '02', '03'].map((s) => ['ac', s] as const),
      ...['10', '02', '03'].map((s) => ['cr', s] as const),
    ]) {
      const rows = of(prefix, series);
      for (let i = 1; i < rows.length; i++) {
        const [small, large] = [rows[i - 1]!, rows[i]!];
        if (large.outer - large.bore < small.outer - small.bore) continue;
        expect(large.C!, `${prefix} ${series} ${large.bore}`).toBeGreaterThan(0.95 * small.C!);
        expect(large.C0!, `${prefix} ${series} ${large.bore}`).toBeGreaterThan(0.95 * small.C0!);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(150);
    for (const [light, heavy] of [
      ['18', '19'],
      ['19', '10'],
      ['10', '02'],
      ['02', '03'],
    ] as const) {
      for (const b of of('dg', heavy)) {
        const lighter = of('dg', light).find((l) => l.bore === b.bore);
        if (lighter) expect(b.C!).toBeGreaterThan(lighter.C!);
      }
    }
  });
});
