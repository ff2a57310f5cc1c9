/** Problems of an arm file, as lines and as JSON. */
import { type Issue, issueText, pathText } from '../arm/issue.ts';

export function problemLines(name: string, issues: readonly Issue[]): readonly string[] {
  const count = issues.length === 1 ? '1 problem' : `${issues.length} problems`;
  return [`${name} is not a valid arm file (${count}):`, ...issues.map((issue) => `  ${issueText(issue)}`)];
}

export function issueObjects(issues: readonly Issue[]): readonly Readonly<Record<string, unknown>>[] {
  return issues.map((issue) => ({
    code: issue.code,
    path: pathText(issue.path),
    found: issue.found,
    expected: issue.expected,
    ...(issue.at ?? {}),
  }));
}
