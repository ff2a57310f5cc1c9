/** The sheet: the drawing frame, and the parts of interface in the order a load asks for them. */
import { type DragEvent, lazy, Suspense, useEffect, useState } from 'react';
import { DraftingPatterns } from '../figures/DraftingPatterns.tsx';
import { redo, undo, useArm } from '../store/documentStore.ts';
import { CaseChoice } from './CaseChoice.tsx';
import { IssueList } from './IssueList.tsx';
import { LoadPath } from './LoadPath.tsx';
import { readDropped } from './openFile.ts';
import { Panels } from './Panels.tsx';
import { SheetFrame } from './SheetFrame.tsx';
import { SweepLine } from './SweepLine.tsx';
import { TitleBlock } from './TitleBlock.tsx';
import { Toolbar } from './Toolbar.tsx';

// The 3D code comes after the sheet's first paint.
const Stage = lazy(() => import('../stage/Stage.tsx'));

export function Sheet() {
  const [over, setOver] = useState(false);
  useUndoKeys();
  const drop = async (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    await readDropped(event.dataTransfer.files);
  };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the whole sheet takes a dropped file; the toolbar opens one by keyboard
    <div
      className={over ? 'sheet over' : 'sheet'}
      onDragOver={(event) => {
        if (!event.dataTransfer.types.includes('Files')) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={(event) => {
        if (event.relatedTarget === null) setOver(false);
      }}
      onDrop={drop}
    >
      <DraftingPatterns />
      <SheetFrame />
      <Toolbar />
      <main>
        <LoadPath />
        <SweepLine />
        <div className="sheet-body">
          <StagePlace />
          <Panels />
        </div>
      </main>
      <TitleBlock />
      <IssueList />
    </div>
  );
}

function StagePlace() {
  const sheet = useArm();
  return (
    <section className="stage" aria-label="Stage: the arm in three dimensions">
      {sheet && (
        <Suspense fallback={<p className="panel-note">The stage is being set …</p>}>
          <Stage />
        </Suspense>
      )}
      <CaseChoice />
    </section>
  );
}

/** Ctrl or Cmd with Z, Shift+Z or Y; inside a text that is being typed the field's own undo comes first. */
function useUndoKeys(): void {
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
      const typing = event.target instanceof HTMLInputElement || event.target instanceof HTMLTextAreaElement;
      if (typing) return;
      const key = event.key.toLowerCase();
      if (key === 'z') (event.shiftKey ? redo : undo)();
      else if (key === 'y') redo();
      else return;
      event.preventDefault();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, []);
}
