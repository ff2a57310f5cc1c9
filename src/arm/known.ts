import type { Issue, IssueCode, IssuePath } from './issue.ts';

/**
 * A file of which some parts are wrong: those are undefined. The rules between fields are written against this, so that they judge all they can
 * and stay silent where a part they need has an issue of its own.
 */
export type Known<T> = T extends string | number | boolean | null | undefined
  ? T | undefined
  : { [K in keyof T]?: Known<T[K]> };

/** Collects what the rules find. `problem`: the file is not valid. `warn`: it is, but something in it will be missed or is doubtful. */
export interface Findings {
  problem(code: IssueCode, path: IssuePath, found: string, expected: string): void;
  warn(code: IssueCode, path: IssuePath, found: string, expected: string): void;
}

export function newFindings(): Findings & { readonly issues: Issue[]; readonly warnings: Issue[] } {
  const issues: Issue[] = [];
  const warnings: Issue[] = [];
  return {
    issues,
    warnings,
    problem: (code, path, found, expected) => issues.push({ code, path, found, expected }),
    warn: (code, path, found, expected) => warnings.push({ code, path, found, expected }),
  };
}

/** Three known numbers, or null. */
export function knownVector(v: Known<readonly [number, number, number]> | undefined): [number, number, number] | null {
  if (!v || v[0] === undefined || v[1] === undefined || v[2] === undefined) return null;
  return [v[0], v[1], v[2]];
}
