import { availableParallelism } from 'node:os';
import type { JobPool } from '../mechanics/job.ts';
import { nodePool } from '../worker/nodePool.ts';

const MOST_THREADS = 16;

/** Threads as many as asked for; else one a processor. They start when first needed; the caller closes the pool. */
export function openPool(workers: number | undefined): JobPool {
  // The build puts the worker beside the program.
  const entry = new URL('nodeWorker.js', import.meta.url);
  return nodePool(workers ?? Math.min(MOST_THREADS, availableParallelism()), entry);
}
