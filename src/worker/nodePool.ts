/** A pool of worker threads under Node. */
import { Worker } from 'node:worker_threads';
import type { JobPool } from '../mechanics/job.ts';
import type { WorkerPort } from './messages.ts';
import { workerPool } from './workerPool.ts';

/** `entry`: the built `nodeWorker.js`. */
export function nodePool(size: number, entry: URL): JobPool {
  return workerPool(size, () => nodePort(new Worker(entry)));
}

function nodePort(worker: Worker): WorkerPort {
  let ended = false;
  return {
    post: (message) => worker.postMessage(message),
    listen(onMessage, onFail) {
      worker.removeAllListeners();
      worker.on('message', onMessage);
      worker.on('error', (error) => onFail(`a worker failed: ${error.message}`));
      worker.on('exit', (code) => {
        if (!ended) onFail(`a worker ended with code ${code}`);
      });
    },
    terminate() {
      ended = true;
      worker.removeAllListeners();
      // Its end needs no answer; a failure to end shows at the next use.
      void worker.terminate();
    },
  };
}
