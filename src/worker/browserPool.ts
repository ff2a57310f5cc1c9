/** A pool of workers in the browser. */
import type { JobPool } from '../mechanics/job.ts';
import type { FromWorker, WorkerPort } from './messages.ts';
import { workerPool } from './workerPool.ts';

/** `size` defaults to the machine's cores, one left for the page. */
export function browserPool(size = Math.max(1, (navigator.hardwareConcurrency || 2) - 1)): JobPool {
  return workerPool(size, () =>
    browserPort(new Worker(new URL('./browserWorker.ts', import.meta.url), { type: 'module', name: 'armload' })),
  );
}

function browserPort(worker: Worker): WorkerPort {
  return {
    post: (message) => worker.postMessage(message),
    listen(onMessage, onFail) {
      worker.onmessage = (event: MessageEvent<FromWorker>) => onMessage(event.data);
      worker.onerror = (event) => onFail(`a worker failed: ${event.message || 'it could not be loaded'}`);
      worker.onmessageerror = () => onFail('a worker sent what could not be read');
    },
    terminate() {
      worker.onmessage = null;
      worker.onerror = null;
      worker.terminate();
    },
  };
}
