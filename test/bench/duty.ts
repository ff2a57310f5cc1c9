/**
 * The duty along a long path: 10⁵ poses on the six-joint model, every bearing at every pose. Beside it in the same run the joint loads alone at as
 * many poses: what the rest (motion, equivalent loads, swings) costs on top of them.
 */
import { readFileSync } from 'node:fs';
import type { Arm } from '../../src/arm/arm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch } from '../../src/mechanics/newtonEuler.ts';
import { dutyStudy } from '../../src/studies/duty.ts';

const POSES = 100_000;
const SECONDS = 1000;
const ROUNDS = 3;

export interface DutyBench {
  readonly case: string;
  readonly poses: number;
  /** Fastest of the rounds, s. */
  readonly seconds: number;
  /** Joint loads alone, s. */
  readonly loads: number;
  /** Equivalent load on the first bearing, N: the result is used. */
  readonly load: number;
}

/** `model`: text of the six-joint arm. */
export function dutyBench(model: string): readonly DutyBench[] {
  const reading = readArm(model);
  if (!reading.ok) throw new Error('the model has issues');
  const { arm } = reading;
  return ['carry', 'pushed from any side'].map((name) => run(arm, name));
}

function run(arm: Arm, name: string): DutyBench {
  const chain = flattenArm(arm);
  const time = Array.from({ length: POSES }, (_, k) => (SECONDS * k) / (POSES - 1));
  // Sines of a few whole periods each: the path closes, every joint swings.
  const pose = time.map((t) =>
    Array.from(chain.from, (from, j) => {
      const middle = (from + chain.to[j]!) / 2;
      const half = 0.3 * (chain.to[j]! - from);
      return middle + half * Math.sin((2 * Math.PI * 3 * (j + 2) * t) / SECONDS + j);
    }),
  );
  const withPath: Arm = { ...arm, duty: [{ case: name, share: 1, motion: { kind: 'path', time, pose } }] };
  let seconds = Number.POSITIVE_INFINITY;
  let loads = Number.POSITIVE_INFINITY;
  let load = Number.NaN;
  for (let round = 0; round < ROUNDS; round++) {
    let start = performance.now();
    const duty = dutyStudy(withPath, chain);
    seconds = Math.min(seconds, (performance.now() - start) / 1000);
    load = duty?.bearings[0]?.life?.load ?? Number.NaN;
    start = performance.now();
    const found = loadsAlone(withPath, name, pose);
    loads = Math.min(loads, (performance.now() - start) / 1000);
    if (Number.isNaN(load + found)) throw new Error('a load is not a number');
  }
  return { case: name, poses: POSES, seconds, loads, load };
}

function loadsAlone(arm: Arm, name: string, pose: readonly (readonly number[])[]): number {
  const chain = flattenArm(arm);
  const load = chain.cases.find((one) => one.name === name)!;
  const w = new Float64Array(WRENCH * chain.n);
  const rates = { speed: new Float64Array(chain.n).fill(0.1), accel: new Float64Array(chain.n).fill(0.1) };
  const scratch = poseScratch(chain.n);
  let sum = 0;
  for (const q of pose) {
    dynamicLoads(chain, load, q, rates, w, scratch);
    sum += w[0]!;
  }
  return sum;
}

/** For `npm run bench`: one line a case. */
export function dutyLines(): readonly string[] {
  const model = readFileSync(new URL('../../models/six-joint.arm.json', import.meta.url), 'utf8');
  return dutyBench(model).map(
    ({ case: name, poses, seconds, loads, load }) =>
      `duty path, ${poses} poses, “${name}”: ${seconds.toFixed(2)} s (joint loads alone ${loads.toFixed(2)} s, ratio ${(seconds / loads).toFixed(1)}), P of the first bearing ${load.toFixed(0)} N`,
  );
}
