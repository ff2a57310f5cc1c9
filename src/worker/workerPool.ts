/**
 * Runs jobs on workers of any make. Requests wait for one another; each settles once. Chunks are handed out in order, one ahead a worker, and
 * their outputs back in order, so a job's result does not depend on how many workers there are. A stop ends at the next chunk; workers that
 * are still busy after a short grace are ended and made anew, and what they would have said is dropped.
 */
import { type JobEnd, JobFailed, type JobPool, type JobRequest } from '../mechanics/job.ts';
import type { FromWorker, WorkerPort } from './messages.ts';

/** Chunks under way at a worker: the one it does and the next. */
const AHEAD = 2;
const GRACE_MS = 250;

interface Seat {
  port: WorkerPort | null;
  pending: number;
}

/** `make` gives a fresh worker; called when one is first needed, and again after one had to be ended. */
export function workerPool(size: number, make: () => WorkerPort): JobPool {
  const seats: Seat[] = Array.from({ length: Math.max(1, Math.floor(size)) }, () => ({ port: null, pending: 0 }));
  let requests = 0;
  let queue: Promise<unknown> = Promise.resolve();
  let closed = false;
  let failPresent: ((message: string) => void) | null = null;

  const end = (seat: Seat) => {
    seat.port?.terminate();
    seat.port = null;
    seat.pending = 0;
  };

  function now<Shared, Input, Output>(request: JobRequest<Shared, Input, Output>): Promise<JobEnd> {
    return new Promise((resolve, reject) => {
      const id = ++requests;
      const waiting = new Map<number, Output>();
      let next = 0;
      let handed = 0;
      let arrived = 0;
      let settled = false;
      let grace: ReturnType<typeof setTimeout> | null = null;

      const settle = (finish: () => void) => {
        if (settled) return;
        settled = true;
        failPresent = null;
        if (grace) clearTimeout(grace);
        request.signal?.removeEventListener('abort', stop);
        for (const seat of seats) if (seat.pending > 0) end(seat);
        finish();
      };
      const fail = (message: string) => settle(() => reject(new JobFailed(message)));
      const handBack = (chunk: number, output: Output) => {
        try {
          request.onOutput(chunk, output);
        } catch (error) {
          fail(error instanceof Error ? error.message : String(error));
        }
      };
      const finish = (stopped: boolean) =>
        settle(() => {
          // After a stop the chunks that were finished follow, in order, with gaps.
          for (const chunk of [...waiting.keys()].sort((a, b) => a - b)) {
            request.onOutput(chunk, waiting.get(chunk)!);
            handed++;
          }
          resolve({ done: handed, stopped });
        });
      const stop = () => {
        if (settled || grace) return;
        if (seats.every((seat) => seat.pending === 0)) finish(arrived < request.chunks);
        else grace = setTimeout(() => finish(true), GRACE_MS);
      };

      const receive = (seat: Seat, message: FromWorker) => {
        if (message.request !== id || settled) return;
        if (message.type === 'failed') return fail(message.message);
        seat.pending--;
        arrived++;
        waiting.set(message.chunk, message.output as Output);
        while (waiting.has(handed) && !settled) {
          const output = waiting.get(handed)!;
          waiting.delete(handed);
          handBack(handed, output);
          handed++;
        }
        if (settled) return;
        request.onProgress?.(arrived, request.chunks);
        feed(seat);
        if (arrived === request.chunks) finish(false);
        else if (grace && seats.every((one) => one.pending === 0)) finish(true);
      };

      const feed = (seat: Seat) => {
        while (!settled && !request.signal?.aborted && seat.pending < AHEAD && next < request.chunks) {
          const chunk = next++;
          seat.pending++;
          seat.port!.post({ type: 'chunk', request: id, chunk, input: request.input(chunk) });
        }
      };

      if (closed) return reject(new JobFailed('the pool was closed'));
      if (request.signal?.aborted) return resolve({ done: 0, stopped: true });
      if (request.chunks === 0) return resolve({ done: 0, stopped: false });
      failPresent = fail;
      request.signal?.addEventListener('abort', stop);
      for (const seat of seats.slice(0, request.chunks)) {
        try {
          seat.port ??= make();
          seat.port.listen(
            (message) => receive(seat, message),
            (message) => {
              seat.pending = Math.max(1, seat.pending);
              fail(message);
            },
          );
          seat.port.post({ type: 'start', request: id, kind: request.kind.name, shared: request.shared });
        } catch (error) {
          fail(error instanceof Error ? error.message : String(error));
          return;
        }
      }
      // In turn, so that every worker gets a first chunk before any gets a second.
      for (const seat of seats.slice(0, request.chunks)) {
        if (next >= request.chunks || settled) break;
        const chunk = next++;
        seat.pending++;
        seat.port!.post({ type: 'chunk', request: id, chunk, input: request.input(chunk) });
      }
      for (const seat of seats.slice(0, request.chunks)) feed(seat);
    });
  }

  return {
    size: seats.length,
    run(request) {
      const turn = queue.then(() => now(request));
      queue = turn.catch(() => undefined);
      return turn;
    },
    close() {
      closed = true;
      failPresent?.('the pool was closed');
      for (const seat of seats) end(seat);
    },
  };
}
