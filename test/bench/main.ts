/** Benchmarks: `npm run bench`, or `npm run bench -- sweep workers` for some of them. Ratios are measured side by side in one run. */
import { coldStartLines } from './coldStart.ts';
import { dutyLines } from './duty.ts';
import { sweepLines, workerLines } from './sweep.ts';
import { worstLines } from './worst.ts';

const BENCHES: Readonly<Record<string, () => Iterable<string> | AsyncIterable<string>>> = {
  sweep: sweepLines,
  workers: workerLines,
  start: coldStartLines,
  duty: dutyLines,
  worst: worstLines,
};

const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in BENCHES));
if (unknown.length > 0) {
  console.error(`no benchmark ${unknown.join(', ')}; there are ${Object.keys(BENCHES).join(', ')}`);
  process.exitCode = 3;
} else {
  void printAll(asked.length > 0 ? asked : Object.keys(BENCHES));
}

async function printAll(names: readonly string[]): Promise<void> {
  for (const name of names) for await (const line of BENCHES[name]!()) console.log(line);
}
