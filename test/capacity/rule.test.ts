import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assessed, utilisation } from '../../src/capacity/rule.ts';

describe('demand over limit', () => {
  it('1 at the limit; a limit of nothing is over as soon as anything is asked', () => {
    expect(utilisation(3, 4, '')).toEqual({ value: 0.75 });
    expect(utilisation(4, 4, '')).toEqual({ value: 1 });
    expect(utilisation(1e-9, 0, '')).toEqual({ value: Number.POSITIVE_INFINITY });
    expect(utilisation(0, 0, '')).toEqual({ value: 0 });
  });

  it('never a value of something broken; a missing limit says what to fill in', () => {
    for (const broken of [Number.NaN, -1, Number.NEGATIVE_INFINITY]) {
      expect(utilisation(broken, 1, '')).toHaveProperty('unassessed');
      expect(utilisation(1, broken, '')).toHaveProperty('unassessed');
    }
    expect(utilisation(1, null, 'fill in the limit')).toEqual({ unassessed: 'fill in the limit' });
    expect(assessed(Number.NaN, 'no number')).toEqual({ unassessed: 'no number' });
    expect(assessed(2, 'no number')).toEqual({ value: 2 });
  });

  it('more demand never lowers it', () => {
    const size = fc.double({ min: 0, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(size, size, fc.double({ min: 1e-9, max: 1e9, noNaN: true }), (demand, more, limit) => {
        const of = (d: number) => {
          const result = utilisation(d, limit, '');
          return 'value' in result ? result.value : Number.NaN;
        };
        expect(of(demand + more)).toBeGreaterThanOrEqual(of(demand));
      }),
      { seed: 91, numRuns: 200 },
    );
  });
});
