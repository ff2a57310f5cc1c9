/** The arm on the sheet: the file as it stands, what is being dragged, the title block's own fields, and undo over all of it. */
import { temporal } from 'zundo';
import { create, useStore } from 'zustand';
import type { Arm } from '../../arm/arm.ts';
import type { ArmFile } from '../../arm/armFile.ts';
import { armFromFile } from '../../arm/armFromFile.ts';
import type { Issue } from '../../arm/issue.ts';
import { readArm, readArmValue } from '../../arm/readArm.ts';
import { type Chain, flattenArm } from '../../mechanics/chain.ts';

/** What ISO 7200 asks of a title block and no arm file holds. */
export interface TitleFields {
  readonly number: string;
  readonly revision: string;
  readonly date: string;
  readonly drawn: string;
}

export interface Refusal {
  readonly name: string;
  readonly issues: readonly Issue[];
}

export interface DocumentState {
  readonly file: ArmFile | null;
  /** File name, or the model's. */
  readonly origin: string;
  readonly title: TitleFields;
  /** What a drag shows before it is let go; never in the history. */
  readonly draft: ArmFile | null;
  /** The last file that could not be opened; the present arm stays. */
  readonly refusal: Refusal | null;
  readonly warnings: readonly Issue[];
  /** What was last taken in, until the next edit. */
  readonly notice: string | null;
}

export const NO_TITLE: TitleFields = { number: '', revision: '', date: '', drawn: '' };

type Remembered = Pick<DocumentState, 'file' | 'origin' | 'title'>;

export const useDocument = create<DocumentState>()(
  temporal(
    (): DocumentState => ({
      file: null,
      origin: '',
      title: NO_TITLE,
      draft: null,
      refusal: null,
      warnings: [],
      notice: null,
    }),
    {
      partialize: ({ file, origin, title }): Remembered => ({ file, origin, title }),
      equality: (a, b) => a.file === b.file && a.title === b.title && a.origin === b.origin,
      limit: 300,
    },
  ),
);

export function useHistory() {
  const steps = useStore(useDocument.temporal);
  return { canUndo: steps.pastStates.some((past) => past.file), canRedo: steps.futureStates.length > 0 };
}

/** Takes one edit back; never the empty sheet before the first arm. */
export function undo(): void {
  const { pastStates, undo: back } = useDocument.temporal.getState();
  if (!pastStates.at(-1)?.file) return;
  useDocument.setState({ draft: null, notice: null });
  back();
}

export function redo(): void {
  useDocument.setState({ draft: null });
  useDocument.temporal.getState().redo();
}

/** Opens the text of an arm file. A text with mistakes leaves the present arm and lists them. */
export function openText(name: string, text: string, title: TitleFields = NO_TITLE): boolean {
  const reading = readArm(text);
  if (!reading.ok) {
    useDocument.setState({ refusal: { name, issues: reading.issues } });
    return false;
  }
  useDocument.setState({
    file: reading.file,
    origin: name,
    title,
    draft: null,
    refusal: null,
    warnings: reading.warnings,
    notice: null,
  });
  return true;
}

export function dismissRefusal(): void {
  useDocument.setState({ refusal: null });
}

/** Puts an edited file in place, as one step of the history; what is wrong with it comes back and nothing changes. */
export function editFile(change: (file: ArmFile) => ArmFile): readonly Issue[] {
  const { file } = useDocument.getState();
  if (!file) return [];
  const reading = readArmValue(change(file));
  if (!reading.ok) return reading.issues;
  useDocument.setState({ file: reading.file, draft: null, warnings: reading.warnings, notice: null });
  return [];
}

/** Shows an edit without keeping it, while something is dragged; an edit that the arm file does not allow is not shown. */
export function draftFile(change: (file: ArmFile) => ArmFile): void {
  const { file } = useDocument.getState();
  if (!file) return;
  const reading = readArmValue(change(file));
  if (reading.ok) useDocument.setState({ draft: reading.file });
}

/** Keeps what was dragged as one step, or drops it. */
export function settleDraft(keep: boolean): void {
  const { draft } = useDocument.getState();
  if (draft) useDocument.setState(keep ? { file: draft, draft: null } : { draft: null });
}

export function setTitle(fields: Partial<TitleFields>): void {
  const { title } = useDocument.getState();
  useDocument.setState({ title: { ...title, ...fields } });
}

export interface ArmOnSheet {
  readonly file: ArmFile;
  readonly arm: Arm;
  readonly chain: Chain;
}

const made = new WeakMap<ArmFile, ArmOnSheet>();

/** The arm and its chain of a sound file, made once for each. */
export function armOf(file: ArmFile): ArmOnSheet {
  let sheet = made.get(file);
  if (!sheet) {
    const arm = armFromFile(file);
    sheet = { file, arm, chain: flattenArm(arm) };
    made.set(file, sheet);
  }
  return sheet;
}

/** What is on the sheet now, a drag included. */
export function presentArm(state: DocumentState = useDocument.getState()): ArmOnSheet | null {
  const file = state.draft ?? state.file;
  return file ? armOf(file) : null;
}

export function useArm(): ArmOnSheet | null {
  return useDocument((state) => presentArm(state));
}
