/** How long work that was told to stop may take to hand over, ms. */
const PATIENCE = 1500;

/** What the work gives; or, a while after the signal, null: a part that is slow to stop keeps nobody waiting. */
export async function withPatience<T>(work: Promise<T>, signal: AbortSignal): Promise<T | null> {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const late = new Promise<null>((resolve) => {
    signal.addEventListener('abort', () => {
      timer = setTimeout(() => resolve(null), PATIENCE);
    });
  });
  return Promise.race([work, late]).finally(() => clearTimeout(timer));
}
