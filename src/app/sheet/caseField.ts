/** What the parts of a case share: an edit that is kept or refused, and lengths of a vector. */
import type { ArmFile } from '../../arm/armFile.ts';
import { type Issue, issueText } from '../../arm/issue.ts';

/** Keeps an edit as one step, or says above the case why not. */
export type Put = (change: (file: ArmFile) => ArmFile) => boolean;

/** The first mistake that keeps an edit out, with its place in the file. */
export function refusalOf(issues: readonly Issue[]): string | null {
  return issues[0] ? issueText(issues[0]) : null;
}

export type Vector = readonly [number, number, number];

export const AXES = ['x', 'y', 'z'] as const;

export function withComponent(vector: Vector, k: number, value: number): [number, number, number] {
  return [k === 0 ? value : vector[0], k === 1 ? value : vector[1], k === 2 ? value : vector[2]];
}

/** File numbers stay readable: a conversion leaves no noise behind the tenth figure. */
export function tidied(value: number): number {
  return Number(value.toPrecision(10)) + 0;
}
