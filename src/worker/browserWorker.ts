/** Entry of a worker in the browser. */
import type { ToWorker } from './messages.ts';
import { jobServer } from './serve.ts';

const serve = jobServer((message) => self.postMessage(message));
self.addEventListener('message', (event: MessageEvent<ToWorker>) => serve(event.data));
