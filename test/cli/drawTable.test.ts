import { describe, expect, it } from 'vitest';
import { drawTable, placesOf } from '../../src/cli/drawTable.ts';
import type { Table } from '../../src/report/table.ts';

const word = (title: string) => ({ title, unit: null, decimals: null });

describe('a table as text', () => {
  it('puts words left and numbers right, under titles with their units', () => {
    const table: Table = {
      title: 'Loads',
      columns: [word('joint'), { title: 'radial', unit: 'N', decimals: 1 }],
      rows: [
        ['slew', 1234.56],
        ['wrist pitch', -3],
        ['cap', null],
      ],
      notes: ['a note'],
    };
    expect(drawTable(table).split('\n')).toEqual([
      'Loads',
      'joint        radial N',
      '───────────  ────────',
      'slew           1234.6',
      'wrist pitch      -3.0',
      'cap                 –',
      '  1: a note',
    ]);
  });

  it('sets the points of differing decimals under each other', () => {
    const table: Table = {
      title: null,
      columns: [{ title: 'value', unit: null, decimals: [0, 2, 1] }],
      rows: [[12], [3.25], [0.5]],
    };
    expect(drawTable(table).split('\n')).toEqual(['value', '─────', '12', ' 3.25', ' 0.5']);
  });

  it('gives East Asian letters and emoji two places, letters with accents one', () => {
    expect(['abc', 'Müller', 'e\u0301', '腕', '팔', 'ア', '🌱', 'μm ≤ 3 °'].map(placesOf)).toEqual([
      3, 6, 1, 2, 2, 2, 2, 8,
    ]);
    const table: Table = {
      title: null,
      columns: [word('joint'), word('arm')],
      rows: [
        ['腕腕', 'x'],
        ['abc', 'y'],
      ],
    };
    expect(drawTable(table).split('\n')).toEqual(['joint  arm', '─────  ───', '腕腕   x', 'abc    y']);
  });
});
