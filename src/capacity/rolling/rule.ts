/** How far a formula or table was traced: read in its source, derived again numerically, recalled, or trade habit. */
export type Trust = 'verified' | 'recomputed' | 'from memory' | 'common practice';

/** What a report prints beside a result. */
export interface Rule {
  readonly name: string;
  readonly formula: string;
  readonly source: string;
  readonly trust: Trust;
  readonly units: string;
  readonly range: string;
}
