/** Progress of long work on standard error: a bar on a terminal, now and then a line where the output is kept. */
const QUIET_MS = 400;
const BAR_EVERY_MS = 100;
const LINE_EVERY_MS = 15_000;
const WIDTH = 30;

export interface ProgressBar {
  /** Share done, 0 to 1, and words beside it. */
  show(share: number, text: string): void;
  /** Takes the bar off the terminal. */
  clear(): void;
}

export function progressBar(out: NodeJS.WriteStream = process.stderr): ProgressBar {
  const start = performance.now();
  let last = start - LINE_EVERY_MS + 5000;
  let drawn = 0;
  return {
    show(share, text) {
      const now = performance.now();
      const every = out.isTTY ? BAR_EVERY_MS : LINE_EVERY_MS;
      if (now - start < QUIET_MS || now - last < every) return;
      last = now;
      const percent = `${Math.floor(100 * share)} %`;
      if (!out.isTTY) {
        out.write(`armload: ${percent}, ${text}\n`);
        return;
      }
      const full = Math.round(WIDTH * share);
      const line = `${'━'.repeat(full)}${'╌'.repeat(WIDTH - full)} ${percent}, ${text}`.slice(
        0,
        (out.columns ?? 80) - 1,
      );
      out.write(`\r${line.padEnd(drawn)}`);
      drawn = line.length;
    },
    clear() {
      if (drawn > 0) out.write(`\r${' '.repeat(drawn)}\r`);
      drawn = 0;
    },
  };
}
