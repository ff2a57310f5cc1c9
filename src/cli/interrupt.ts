/** Ctrl-C during long work: the first asks it to stop and hand over what it has, the second ends the program at once. */
import { EXIT } from './exit.ts';

export interface Interrupt {
  readonly signal: AbortSignal;
  /** Gives Ctrl-C back to the system. */
  release(): void;
}

export function onInterrupt(): Interrupt {
  const controller = new AbortController();
  const stop = () => {
    if (controller.signal.aborted) process.exit(EXIT.interrupted);
    controller.abort();
  };
  process.on('SIGINT', stop);
  return {
    signal: controller.signal,
    release() {
      process.off('SIGINT', stop);
    },
  };
}
