/** Numbers as the sheet shows them: loads to whole units where they are large, three figures where they are small. */
import { formatNumber, type Quantity, SHOWN_UNITS, type UnitSystem } from '../../units/format.ts';
import { fromSI } from '../../units/unit.ts';

const THIN_SPACE = '\u2009';

export function shownNumber(value: number, quantity: Quantity, units: UnitSystem, digits = 3): string {
  const shown = fromSI(value, SHOWN_UNITS[units][quantity]);
  if (!Number.isFinite(shown)) return 'failed';
  if (Math.abs(shown) < 10 ** -digits) return '0';
  const text = formatNumber(shown, digits);
  return text.replace(/\B(?=(\d{3})+(?!\d))(?<!\.\d*)/g, THIN_SPACE).replace('-', '\u2212');
}

export function shownQuantity(value: number, quantity: Quantity, units: UnitSystem, digits = 3): string {
  const unit = SHOWN_UNITS[units][quantity];
  return `${shownNumber(value, quantity, units, digits)}${unit.startsWith('°') ? '' : ' '}${unit}`;
}

const QUANTITIES: Readonly<Record<string, Quantity>> = {
  N: 'force',
  N·m: 'moment',
  Pa: 'stress',
  'Pa·m/s': 'pv',
  m: 'length',
  rad: 'slope',
  s: 'life',
  'm/s': 'speed',
};

/** The quantity behind the SI unit of a check row; null where it is shown as it is. */
export function quantityOf(unit: string): Quantity | null {
  return QUANTITIES[unit] ?? null;
}
