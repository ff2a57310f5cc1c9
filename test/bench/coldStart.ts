/** `armload pose` from nothing to its answer, as a program of its own. Asked for: under 0.3 s. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const ROUNDS = 9;

export function* coldStartLines(): Generator<string> {
  const cli = fileURLToPath(new URL('cli.js', import.meta.url));
  const times = Array.from({ length: ROUNDS }, () => {
    const start = performance.now();
    const run = spawnSync(process.execPath, [cli, 'pose', 'models/six-joint.arm.json', '--at=0,20,-40,10,30,0']);
    if (run.status === null || run.status > 1 || run.stdout.length === 0) throw new Error(String(run.stderr));
    return (performance.now() - start) / 1000;
  }).sort((a, b) => a - b);
  yield 'armload pose, cold start to output (asked: under 0.3 s)';
  yield `  fastest ${times[0]!.toFixed(3)} s, median ${times[Math.floor(ROUNDS / 2)]!.toFixed(3)} s of ${ROUNDS}`;
}
