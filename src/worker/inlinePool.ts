/** Runs jobs on the calling thread, with a pause now and then so that a page stays alive and a stop is heard. */
import { type JobEnd, JobFailed, type JobPool, type JobRequest } from '../mechanics/job.ts';

const PAUSE_MS = 25;

export function inlinePool(): JobPool {
  let closed = false;
  return {
    size: 1,
    async run<Shared, Input, Output>(request: JobRequest<Shared, Input, Output>): Promise<JobEnd> {
      let done = 0;
      let since = performance.now();
      let work: ((input: Input) => Output) | null = null;
      for (; done < request.chunks; done++) {
        if (closed) throw new JobFailed('the pool was closed');
        if (request.signal?.aborted) return { done, stopped: true };
        let output: Output;
        try {
          work ??= request.kind.start(request.shared);
          output = work(request.input(done));
        } catch (error) {
          throw new JobFailed(error instanceof Error ? error.message : String(error));
        }
        request.onOutput(done, output);
        request.onProgress?.(done + 1, request.chunks);
        if (performance.now() - since > PAUSE_MS) {
          await new Promise((resume) => setTimeout(resume, 0));
          since = performance.now();
        }
      }
      return { done, stopped: false };
    },
    close() {
      closed = true;
    },
  };
}
