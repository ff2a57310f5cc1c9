/** What a pool and its workers say to each other; all plain data, every message with the number of its request. */

export type ToWorker =
  | { readonly type: 'start'; readonly request: number; readonly kind: string; readonly shared: unknown }
  | { readonly type: 'chunk'; readonly request: number; readonly chunk: number; readonly input: unknown };

export type FromWorker =
  | { readonly type: 'output'; readonly request: number; readonly chunk: number; readonly output: unknown }
  | { readonly type: 'failed'; readonly request: number; readonly message: string };

/** One worker as the pool sees it, whatever it runs on. */
export interface WorkerPort {
  post(message: ToWorker): void;
  /** `onFail`: the worker died or could not be made. */
  listen(onMessage: (message: FromWorker) => void, onFail: (message: string) => void): void;
  terminate(): void;
}
