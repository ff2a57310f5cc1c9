/** Entry of a worker thread under Node; built beside the command line. */
import { parentPort } from 'node:worker_threads';
import type { ToWorker } from './messages.ts';
import { jobServer } from './serve.ts';

if (parentPort) {
  const port = parentPort;
  const serve = jobServer((message) => port.postMessage(message));
  port.on('message', (message: ToWorker) => serve(message));
}
