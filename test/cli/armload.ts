/** Runs the built command line as a user would: `npm test` builds it first. */
import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export const ROOT = new URL('../..', import.meta.url).pathname;
const CLI = join(ROOT, 'dist/node/cli.js');

export interface Ran {
  readonly code: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

export interface RunOptions {
  readonly stdin?: string | Buffer;
  /** Ctrl-C once this stands on standard error or output, or after so many ms. */
  readonly interruptOn?: RegExp;
  readonly interruptAfter?: number;
}

export function armload(args: readonly string[], options: RunOptions = {}): Promise<Ran> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [CLI, ...args], { cwd: ROOT });
    let stdout = '';
    let stderr = '';
    let interrupted = false;
    const interrupt = () => {
      if (!interrupted) child.kill('SIGINT');
      interrupted = true;
    };
    child.stdout.on('data', (data) => {
      stdout += data;
    });
    child.stderr.on('data', (data) => {
      stderr += data;
      if (options.interruptOn?.test(stderr)) interrupt();
    });
    if (options.interruptAfter !== undefined) setTimeout(interrupt, options.interruptAfter);
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, stdout, stderr }));
    child.stdin.on('error', () => {});
    child.stdin.end(options.stdin ?? '');
  });
}

export function model(name: string): string {
  return `models/${name}.arm.json`;
}

// biome-ignore lint/suspicious/noExplicitAny: tests reach into plain JSON
export function modelFile(name: string): any {
  return JSON.parse(readFileSync(join(ROOT, model(name)), 'utf8'));
}

/** A folder for the files of one test file, and its end. */
export function scratchFolder(): { write(name: string, content: unknown): string; remove(): void } {
  const folder = mkdtempSync(join(tmpdir(), 'armload-test-'));
  return {
    write(name, content) {
      const path = join(folder, name);
      writeFileSync(path, typeof content === 'string' || Buffer.isBuffer(content) ? content : JSON.stringify(content));
      return path;
    },
    remove: () => rmSync(folder, { recursive: true }),
  };
}

/** Every line of standard error that is an error or a warning, for "one line, no stack". */
export function complaints(ran: Ran): string[] {
  return ran.stderr.split('\n').filter((line) => line.startsWith('armload:'));
}
