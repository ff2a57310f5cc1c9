/** The verdict: what passes, what is over, and what is neither. */
import { describe, expect, it } from 'vitest';
import { judge, REASONS, type Scope } from '../../src/studies/assessVerdict.ts';

const CHECK = { allowable: 100, floor: 0, beyond: null, unassessed: null };
const SCOPES: readonly Scope[] = ['pose', 'grid', 'part of the grid', 'samples', 'travel'];

describe('verdict', () => {
  it('passes only where the upper value is within the allowable', () => {
    expect(judge(CHECK, 80, 100, 'travel')).toEqual({ verdict: 'pass', utilisation: 1, reason: null });
    expect(judge(CHECK, 80, 100.001, 'travel')).toMatchObject({ verdict: 'unassessed', reason: REASONS['open gap'] });
    expect(judge(CHECK, 80, Number.POSITIVE_INFINITY, 'travel')).toMatchObject({ verdict: 'unassessed' });
    expect(judge(CHECK, 80, 101, 'grid')).toMatchObject({ verdict: 'unassessed', reason: REASONS['safe bound'] });
  });

  it('is over where an attained value exceeds the allowable, whatever the bound says', () => {
    for (const scope of SCOPES) {
      expect(judge(CHECK, 100.1, 200, scope).verdict).toBe('over');
      expect(judge(CHECK, Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY, scope).verdict).toBe('over');
    }
  });

  it('says how far a pass reaches', () => {
    expect(judge(CHECK, 50, 50, 'grid')).toEqual({ verdict: 'pass', utilisation: 0.5, reason: 'on this grid only' });
    expect(judge(CHECK, 50, 50, 'pose').reason).toBe('at this pose only');
    expect(judge(CHECK, 50, 50, 'samples').reason).toBe('from sampled poses only');
    expect(judge(CHECK, 50, 50, 'travel').reason).toBeNull();
  });

  it('does not pass a sweep that was stopped', () => {
    expect(judge(CHECK, 50, 50, 'part of the grid')).toMatchObject({ verdict: 'unassessed', utilisation: 0.5 });
  });

  it('takes the utilisation of the upper value, but of the value at one pose', () => {
    expect(judge(CHECK, 50, 90, 'travel').utilisation).toBe(0.9);
    expect(judge(CHECK, 50, 90, 'pose').utilisation).toBe(0.5);
    // A bound below an attained value counts for nothing.
    expect(judge(CHECK, 50, 10, 'travel').utilisation).toBe(0.5);
  });

  it('never passes what is not a number', () => {
    for (const scope of SCOPES) {
      for (const [attained, upper] of [
        [Number.NaN, 50],
        [50, Number.NaN],
        [Number.NaN, Number.NaN],
      ] as const) {
        expect(judge(CHECK, attained, upper, scope)).toEqual({
          verdict: 'unassessed',
          utilisation: null,
          reason: REASONS['not a number'],
        });
      }
      expect(judge({ ...CHECK, allowable: Number.NaN }, 50, 50, scope).verdict).toBe('unassessed');
      expect(judge({ ...CHECK, allowable: -1 }, -2, -2, scope).verdict).toBe('unassessed');
      // Endless over endless is no number either.
      const endless = Number.POSITIVE_INFINITY;
      expect(judge({ ...CHECK, allowable: endless }, endless, endless, scope).verdict).toBe('unassessed');
    }
  });

  it('is unassessed for the reason of the check, and has none where nothing is held against it', () => {
    const reason = 'fill in `pressure_limit_MPa` of the bushing';
    expect(judge({ ...CHECK, allowable: null, unassessed: reason }, 50, 50, 'grid')).toEqual({
      verdict: 'unassessed',
      utilisation: null,
      reason,
    });
    expect(judge({ ...CHECK, allowable: null }, 50, 50, 'travel').verdict).toBeNull();
  });

  it('takes a demand within the floor as none, also against an allowable of nothing', () => {
    const none = { ...CHECK, allowable: 0, floor: 1e-6 };
    expect(judge(none, 0, 1e-7, 'travel')).toEqual({ verdict: 'pass', utilisation: 0, reason: null });
    expect(judge(none, 1e-7, 1, 'travel').verdict).toBe('unassessed');
    expect(judge(none, 1, 1, 'travel')).toMatchObject({ verdict: 'over', utilisation: Number.POSITIVE_INFINITY });
  });

  it('leaves open what the file cannot tell beyond the limit', () => {
    const beyond = { ...CHECK, allowable: 0, beyond: 'no flange' };
    expect(judge(beyond, 3, 3, 'pose')).toMatchObject({ verdict: 'unassessed', reason: 'no flange' });
    expect(judge(beyond, 0, 0, 'pose').verdict).toBe('pass');
  });
});
