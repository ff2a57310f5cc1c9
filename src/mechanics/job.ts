/**
 * Long work as plain data, so that it runs the same in a browser worker, a Node worker or in line: a job is cut into chunks by the job
 * itself (never by how many workers there are), each chunk gives plain data, and chunks are handed back in their order.
 */

/** A kind of job. `start` is called once a thread with what all chunks share; what it returns does one chunk after another. */
export interface JobKind<Shared, Input, Output> {
  readonly name: string;
  start(shared: Shared): (input: Input) => Output;
}

export interface JobOptions {
  /** Chunks that were handed back so far, of all. */
  readonly onProgress?: (done: number, chunks: number) => void;
  /** Stops the job between chunks. */
  readonly signal?: AbortSignal;
}

export interface JobRequest<Shared, Input, Output> extends JobOptions {
  readonly kind: JobKind<Shared, Input, Output>;
  readonly shared: Shared;
  readonly chunks: number;
  readonly input: (chunk: number) => Input;
  /** Called in the order of chunks; after a stop the chunks that were finished follow, still in order, with gaps. */
  readonly onOutput: (chunk: number, output: Output) => void;
}

export interface JobEnd {
  /** Chunks handed back. */
  readonly done: number;
  /** Whether the signal stopped it before all were done. */
  readonly stopped: boolean;
}

/** Where jobs run. Each request settles once: with its end, or with a `JobFailed`. */
export interface JobPool {
  /** Chunks that can be under way at once. */
  readonly size: number;
  run<Shared, Input, Output>(request: JobRequest<Shared, Input, Output>): Promise<JobEnd>;
  /** Ends the workers; requests under way fail. */
  close(): void;
}

/** A chunk threw, or its worker died. */
export class JobFailed extends Error {
  override readonly name = 'JobFailed';
}
