import { countText } from '../report/shown.ts';
import type { SweepResult } from '../studies/results.ts';

/** `2 809 poses in each of 3 cases`, and how far it came where it was stopped. */
export function sweepText(result: Pick<SweepResult, 'poses' | 'done' | 'partial'>, cases: number): string {
  const many = cases > 1 ? ` in each of ${cases} cases` : '';
  const poses = `${countText(result.poses)} ${result.poses === 1 ? 'pose' : 'poses'}${many}`;
  return result.partial ? `PART of ${poses} (stopped after ${countText(result.done)})` : poses;
}
