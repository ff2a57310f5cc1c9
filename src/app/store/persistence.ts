/** The last arm is still there after a crash or a reload. It stays in this browser; nothing leaves the machine. */
import { get, set } from 'idb-keyval';
import { writeArm } from '../../arm/writeArm.ts';
import { type DocumentState, NO_TITLE, openText, type TitleFields, useDocument } from './documentStore.ts';
import { FIRST_MODEL, models } from './gallery.ts';
import { poseStore, setPose } from './poseStore.ts';
import { useView, type ViewState } from './viewStore.ts';

const KEY = 'armload sheet';

interface Kept {
  readonly text: string;
  readonly origin: string;
  readonly title: TitleFields;
  readonly pose: readonly number[];
  readonly view: ViewState;
}

let timer: ReturnType<typeof setTimeout> | undefined;

function keepNow(): void {
  clearTimeout(timer);
  timer = undefined;
  const { file, origin, title } = useDocument.getState();
  if (!file) return;
  const kept: Kept = { text: writeArm(file), origin, title, pose: poseStore.getState().pose, view: useView.getState() };
  // A browser that keeps nothing (private window, full disk) still has a working sheet.
  set(KEY, kept).catch(() => undefined);
}

function keepSoon(): void {
  timer ??= setTimeout(keepNow, 400);
}

async function lastSheet(): Promise<Kept | null> {
  try {
    return (await get<Kept>(KEY)) ?? null;
  } catch {
    return null;
  }
}

/** Opens the last sheet, or the first model. True where a sheet was brought back with its pose. */
export async function openLastSheet(): Promise<boolean> {
  const kept = await lastSheet();
  if (kept && openText(kept.origin, kept.text, { ...NO_TITLE, ...kept.title })) {
    useView.setState(kept.view);
    setPose(kept.pose);
    return true;
  }
  const first = models.find((model) => model.file === FIRST_MODEL) ?? models[0];
  if (first) openText(first.file, await first.text());
  return false;
}

/** From now on every change is kept, a moment after it is made and when the page is left. */
export function keepSheet(): void {
  const changed = (state: DocumentState, before: DocumentState) => {
    if (state.file !== before.file || state.title !== before.title) keepSoon();
  };
  useDocument.subscribe(changed);
  useView.subscribe(keepSoon);
  poseStore.subscribe(keepSoon);
  addEventListener('pagehide', keepNow);
  document.addEventListener('visibilitychange', () => {
    if (document.visibilityState === 'hidden') keepNow();
  });
}
