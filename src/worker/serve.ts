/** The worker's side: starts a kind of job with what its chunks share, then does the chunks it is handed. */
import { JOB_KINDS } from './jobKinds.ts';
import type { FromWorker, ToWorker } from './messages.ts';

/** Handler of a worker's messages; `post` sends the answers back. A new request replaces the one before. */
export function jobServer(post: (message: FromWorker) => void): (message: ToWorker) => void {
  let current = -1;
  let work: ((input: unknown) => unknown) | null = null;
  return (message) => {
    try {
      if (message.type === 'start') {
        current = message.request;
        const kind = JOB_KINDS.find((one) => one.name === message.kind);
        if (!kind) throw new Error(`there is no job "${message.kind}"`);
        work = kind.start(message.shared);
      } else if (message.request === current && work) {
        const output = work(message.input);
        post({ type: 'output', request: current, chunk: message.chunk, output });
      }
    } catch (error) {
      work = null;
      post({
        type: 'failed',
        request: message.request,
        message: error instanceof Error ? error.message : String(error),
      });
    }
  };
}
