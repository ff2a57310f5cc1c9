import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterEach, describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { type JobEnd, JobFailed, type JobKind, type JobPool, type JobRequest } from '../../src/mechanics/job.ts';
import { sweepArm } from '../../src/studies/sweepArm.ts';
import { inlinePool } from '../../src/worker/inlinePool.ts';
import { JOB_KINDS } from '../../src/worker/jobKinds.ts';
import type { FromWorker, ToWorker, WorkerPort } from '../../src/worker/messages.ts';
import { nodePool } from '../../src/worker/nodePool.ts';
import { jobServer } from '../../src/worker/serve.ts';
import { workerPool } from '../../src/worker/workerPool.ts';
import { randomArm } from '../randomArm.ts';

const SCRIPT = pathToFileURL(resolve('dist/node/nodeWorker.js'));

/** A job that workers do not know of, so it is run by `fakeWorker` alone: squares of numbers; 13 is bad luck. */
const squares: JobKind<number, number, number> = {
  name: 'squares',
  start: (offset) => (input) => {
    if (input === 13) throw new Error('thirteen');
    return offset + input * input;
  },
};

interface FakeWorker extends WorkerPort {
  die(): void;
}

const made: FakeWorker[] = [];

/** A worker in this thread that answers late, by a seeded delay. */
function fakeWorker(seed: number): () => FakeWorker {
  const random = seededRandom(seed);
  return () => {
    let ended = false;
    let said: (message: FromWorker) => void = () => {};
    let failed: (message: string) => void = () => {};
    let work: ((input: number) => number) | null = null;
    let last = Promise.resolve();
    const worker: FakeWorker = {
      post(message: ToWorker) {
        // one message after another, as a worker does
        last = last.then(async () => {
          await new Promise((resolve) => setTimeout(resolve, random.between(0, 4)));
          if (ended) return;
          const { request } = message;
          try {
            if (message.type === 'start') work = squares.start(message.shared as number);
            else said({ type: 'output', request, chunk: message.chunk, output: work!(message.input as number) });
          } catch (error) {
            said({ type: 'failed', request, message: (error as Error).message });
          }
        });
      },
      listen(onMessage, onFail) {
        said = onMessage;
        failed = onFail;
      },
      terminate() {
        ended = true;
      },
      die() {
        ended = true;
        failed('it died');
      },
    };
    made.push(worker);
    return worker;
  };
}

function request(chunks: number, outputs: [number, number][], more: Partial<JobRequest<number, number, number>> = {}) {
  return {
    kind: squares,
    shared: 1000,
    chunks,
    input: (chunk: number) => chunk,
    onOutput: (chunk: number, output: number) => outputs.push([chunk, output]),
    ...more,
  };
}

const pools: JobPool[] = [];
function opened(pool: JobPool): JobPool {
  pools.push(pool);
  return pool;
}

afterEach(() => {
  for (const pool of pools.splice(0)) pool.close();
  made.length = 0;
});

const KINDS: readonly [string, () => JobPool][] = [
  ['in line', () => inlinePool()],
  ['one worker', () => workerPool(1, fakeWorker(1))],
  ['three workers', () => workerPool(3, fakeWorker(3))],
];

describe.each(KINDS)('a pool, %s', (_, make) => {
  it('hands chunks back in their order, each once, and tells how far it is', async () => {
    const outputs: [number, number][] = [];
    const progress: number[] = [];
    const end = await opened(make()).run(request(12, outputs, { onProgress: (done) => progress.push(done) }));
    expect(end).toEqual({ done: 12, stopped: false } satisfies JobEnd);
    expect(outputs).toEqual(Array.from({ length: 12 }, (_, k) => [k, 1000 + k * k]));
    expect(progress.at(-1)).toBe(12);
    expect([...progress].sort((a, b) => a - b)).toEqual(progress);
  });

  it('stops between chunks and hands back what is finished, in order', async () => {
    const outputs: [number, number][] = [];
    const control = new AbortController();
    const end = await opened(make()).run(
      request(500, outputs, {
        signal: control.signal,
        onProgress: (done) => {
          if (done >= 5) control.abort();
        },
        // in line nothing else runs in between, so give it something to wait for
        input: (chunk) => chunk % 10,
      }),
    );
    expect(end.stopped).toBe(true);
    expect(end.done).toBe(outputs.length);
    expect(end.done).toBeGreaterThanOrEqual(5);
    expect(end.done).toBeLessThan(500);
    const chunks = outputs.map(([chunk]) => chunk);
    expect([...chunks].sort((a, b) => a - b)).toEqual(chunks);
  });

  it('is stopped before it began', async () => {
    const control = new AbortController();
    control.abort();
    const outputs: [number, number][] = [];
    expect(await opened(make()).run(request(3, outputs, { signal: control.signal }))).toEqual({
      done: 0,
      stopped: true,
    });
    expect(outputs).toEqual([]);
  });

  it('ends at once with no chunks', async () => {
    expect(await opened(make()).run(request(0, []))).toEqual({ done: 0, stopped: false });
  });

  it('fails with a clean error where a chunk throws, and works on', async () => {
    const pool = opened(make());
    const failure = pool.run(request(20, []));
    await expect(failure).rejects.toThrow('thirteen');
    await expect(failure).rejects.toBeInstanceOf(JobFailed);
    const outputs: [number, number][] = [];
    expect(await pool.run(request(3, outputs))).toEqual({ done: 3, stopped: false });
    expect(outputs).toHaveLength(3);
  });

  it('keeps the answers of requests apart', async () => {
    const pool = opened(make());
    const first: [number, number][] = [];
    const second: [number, number][] = [];
    await Promise.all([pool.run(request(9, first)), pool.run(request(9, second, { shared: 5000 }))]);
    expect(first.map(([, output]) => output)).toEqual(Array.from({ length: 9 }, (_, k) => 1000 + k * k));
    expect(second.map(([, output]) => output)).toEqual(Array.from({ length: 9 }, (_, k) => 5000 + k * k));
  });

  it('fails what is asked of it once it is closed', async () => {
    const pool = make();
    pool.close();
    await expect(pool.run(request(3, []))).rejects.toBeInstanceOf(JobFailed);
  });
});

describe('a pool whose worker dies', () => {
  it('fails the request under way, once, and makes a new worker for the next', async () => {
    const pool = opened(workerPool(2, fakeWorker(7)));
    const outputs: [number, number][] = [];
    const run = pool.run(request(12, outputs, { onProgress: (done) => done === 3 && made[0]!.die() }));
    await expect(run).rejects.toThrow('it died');
    const before = outputs.length;
    expect(await pool.run(request(4, []))).toEqual({ done: 4, stopped: false });
    expect(outputs).toHaveLength(before);
    expect(made.length).toBeGreaterThan(2);
  });

  it('fails where no worker can be started', async () => {
    const pool = opened(
      workerPool(2, () => {
        throw new Error('no threads here');
      }),
    );
    await expect(pool.run(request(2, []))).rejects.toThrow('no threads here');
  });
});

describe('the worker’s side', () => {
  it('knows every kind of job by a name of its own, and says so of one it does not know', () => {
    const names = JOB_KINDS.map((kind) => kind.name);
    expect(new Set(names).size).toBe(names.length);
    expect(names).toContain('sweep');
    const answers: FromWorker[] = [];
    const take = jobServer((message) => answers.push(message));
    take({ type: 'start', request: 1, kind: 'make tea', shared: null });
    take({ type: 'chunk', request: 1, chunk: 0, input: 0 });
    expect(answers).toHaveLength(1);
    expect(answers[0]).toMatchObject({ type: 'failed', request: 1 });
  });
});

describe('a sweep in worker threads', () => {
  it('finds the built worker', () => {
    expect(existsSync(SCRIPT), 'dist/node/nodeWorker.js is missing: npx vite build --app').toBe(true);
  });

  it('is the same to the bit in line and with 1, 2 and 8 workers (seeds 301–303)', async () => {
    const arms = [
      randomArm(301, { joints: 5, force: 'base', drives: true }),
      randomArm(302, { joints: 4, parallel: 0.5 }),
      randomArm(303, { joints: 3, force: 'any' }),
    ];
    const choices = [{ samples: 14 }, { samples: 30 }, { samples: 26 }];
    const plain = await Promise.all(arms.map((arm, k) => sweepArm(arm, choices[k]!, { pool: inlinePool() })));
    for (const workers of [1, 2, 8]) {
      const pool = opened(nodePool(workers, SCRIPT));
      for (const [k, arm] of arms.entries()) {
        const { seconds: _, ...here } = plain[k]!;
        const { seconds: __, ...there } = await sweepArm(arm, choices[k]!, { pool });
        expect(there).toEqual(here);
        expect(JSON.stringify(there)).toBe(JSON.stringify(here));
      }
    }
  });

  it('gives what it has when it is stopped, marked partial (seed 304)', async () => {
    const arm = randomArm(304, { joints: 6 });
    const pool = opened(nodePool(2, SCRIPT));
    const control = new AbortController();
    let last = 0;
    const result = await sweepArm(
      arm,
      { samples: 40 },
      {
        pool,
        signal: control.signal,
        onProgress: (done) => {
          expect(done).toBeGreaterThanOrEqual(last);
          last = done;
          control.abort();
        },
      },
    );
    expect(result.partial).toBe(true);
    expect(result.done).toBeGreaterThan(0);
    expect(result.done).toBeLessThan(result.poses);
    for (const row of result.rows) {
      expect(row.pose).toHaveLength(6);
      expect(Number.isFinite(row.value)).toBe(true);
    }
  });

  it('gives unassessed rows where it was stopped before any pose', async () => {
    const control = new AbortController();
    control.abort();
    const result = await sweepArm(
      randomArm(305, { joints: 3 }),
      { samples: 5 },
      { pool: inlinePool(), signal: control.signal },
    );
    expect(result).toMatchObject({ partial: true, done: 0 });
    for (const row of result.rows) expect(row).toMatchObject({ value: Number.NaN, pose: [], verdict: 'unassessed' });
  });
});
