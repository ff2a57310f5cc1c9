/** The two ways out: results on standard output; warnings, progress and the caution on standard error. */
import type { Arm } from '../arm/arm.ts';
import { type Issue, issueText } from '../arm/issue.ts';

export const CAUTION =
  "Design aid only: have the results checked by a competent engineer; local codes, makers' ratings and licensed practice decide.";

export function print(text: string): void {
  process.stdout.write(`${text}\n`);
}

export function warn(text: string): void {
  process.stderr.write(`armload: ${text}\n`);
}

export function warnAll(warnings: readonly string[]): void {
  for (const warning of warnings) warn(`warning: ${warning}`);
}

export function warnIssues(issues: readonly Issue[]): void {
  warnAll(issues.map(issueText));
}

/** Follows every result that a person reads. */
export function printCaution(): void {
  process.stderr.write(`\n${CAUTION}\n`);
}

/** One JSON document: the head every verb shares, then its own keys. */
export function printJson(arm: Arm, body: Readonly<Record<string, unknown>>): void {
  print(JSON.stringify({ armload: 1, arm: arm.name, ...body, caution: CAUTION }));
}
