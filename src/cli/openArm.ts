/** From the FILE argument to an arm, or to a list of its problems. */
import { createReadStream } from 'node:fs';
import type { Arm } from '../arm/arm.ts';
import type { ArmFile } from '../arm/armFile.ts';
import type { ArmReading } from '../arm/readArm.ts';
import { type Chain, flattenArm } from '../mechanics/chain.ts';
import { EXIT, UsageError } from './exit.ts';
import { print, warn, warnIssues } from './output.ts';
import { issueObjects, problemLines } from './problems.ts';

/** Past this no arm file is read; the reader itself has its own limit below it. */
const MAX_BYTES = 16 * 1024 * 1024;

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file',
  EISDIR: 'it is a folder',
  EACCES: 'reading it is not permitted',
  EPERM: 'reading it is not permitted',
  ENOTDIR: 'a part of its path is not a folder',
  ENAMETOOLONG: 'its name is too long',
};

/** All bytes of a file, or of standard input for `-`; null where there are more than any arm file has. */
async function readBytes(path: string): Promise<Buffer | null> {
  const parts: Buffer[] = [];
  let size = 0;
  try {
    for await (const part of path === '-' ? process.stdin : createReadStream(path)) {
      size += (part as Buffer).length;
      if (size > MAX_BYTES) return null;
      parts.push(part as Buffer);
    }
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code ?? '';
    throw new UsageError(
      `cannot read ${inputName(path)}: ${REASONS[code] ?? `the system says ${code || String(error)}`}`,
    );
  }
  return Buffer.concat(parts);
}

export function inputName(path: string): string {
  return path === '-' ? 'standard input' : path;
}

/** Thrown once the problems of the file have been told; `main` only ends with the code. */
export class FileProblems extends Error {
  override readonly name = 'FileProblems';
  readonly code = EXIT.invalidFile;
}

export interface OpenedArm {
  readonly arm: Arm;
  readonly chain: Chain;
}

function unreadable(found: string, expected: string): ArmReading {
  return { ok: false, issues: [{ code: 'bad-text', path: [], found, expected }], warnings: [] };
}

export async function readArmFile(path: string): Promise<ArmReading> {
  // The bytes first: a missing file should not wait for the schema to load.
  const text = await readText(path);
  if (typeof text !== 'string') return unreadable(text.found, text.expected);
  const { readArm } = await import('../arm/readArm.ts');
  return readArm(text);
}

async function readText(path: string): Promise<string | { readonly found: string; readonly expected: string }> {
  const bytes = await readBytes(path);
  if (!bytes) return { found: 'more than 8 MiB', expected: 'at most 8 MiB' };
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return { found: 'bytes that are not UTF-8', expected: 'UTF-8 text' };
  }
}

/** The file with those bearings of a table that its joints name, read anew: seats and kinds are judged by what stands in now. */
async function withTable(file: ArmFile, path: string, json: boolean): Promise<ArmReading> {
  const [text, { csvIssueText, readBearingCsv }, { readArmValue }, { namedBearings, withBearings }] = await Promise.all(
    [
      readText(path),
      import('../capacity/rolling/bearingCsv.ts'),
      import('../arm/readArm.ts'),
      import('../arm/withBearings.ts'),
    ],
  );
  const { files, issues } =
    typeof text === 'string'
      ? readBearingCsv(text)
      : { files: {}, issues: [{ code: 'bad-text' as const, line: 1, column: 1, ...text }] };
  if (issues.length > 0) {
    if (json) print(JSON.stringify({ armload: 1, sound: false, bearings: inputName(path), issues }));
    const count = issues.length === 1 ? '1 problem' : `${issues.length} problems`;
    warn(`${inputName(path)} is not a valid table of bearings (${count}):`);
    for (const issue of issues) warn(`  ${csvIssueText(issue)}`);
    throw new FileProblems();
  }
  const asked = namedBearings(file);
  const taken = Object.entries(files).filter(([name]) => asked.has(name));
  const names = taken.map(([name]) => JSON.stringify(name)).join(', ');
  warn(taken.length > 0 ? `from ${inputName(path)}: ${names}` : `the arm names no bearing of ${inputName(path)}`);
  return readArmValue(withBearings(file, Object.fromEntries(taken)));
}

/**
 * Reads a sound arm, with the bearings that it names taken from the CSV table `bearings` where that has them; otherwise tells every problem (with
 * `json` as a document on standard output too) and throws `FileProblems`.
 */
export async function openArm(path: string, json: boolean, bearings?: string): Promise<OpenedArm> {
  let reading = await readArmFile(path);
  if (reading.ok && bearings !== undefined) reading = await withTable(reading.file, bearings, json);
  if (!reading.ok) {
    if (json) print(JSON.stringify({ armload: 1, sound: false, issues: issueObjects(reading.issues) }));
    for (const line of problemLines(inputName(path), reading.issues)) warn(line);
    throw new FileProblems();
  }
  warnIssues(reading.warnings);
  return { arm: reading.arm, chain: flattenArm(reading.arm) };
}
