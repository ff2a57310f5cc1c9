/** The line along the top edge: open and save, undo, the case on stage, units, and which sheet. */
import { useRef, useState } from 'react';
import { writeArm } from '../../arm/writeArm.ts';
import { openText, redo, undo, useArm, useDocument, useHistory } from '../store/documentStore.ts';
import { type SheetChoice, useView } from '../store/viewStore.ts';
import { Gallery } from './Gallery.tsx';
import { readDropped } from './openFile.ts';

export function Toolbar() {
  const sheet = useArm();
  const { canUndo, canRedo } = useHistory();
  const picker = useRef<HTMLInputElement>(null);
  const [browsing, setBrowsing] = useState(false);
  return (
    <header className="toolbar">
      <h1>Armload</h1>
      <div className="tool-group">
        <button type="button" onClick={() => setBrowsing(true)}>
          Models…
        </button>
        <button
          type="button"
          onClick={() => picker.current?.click()}
          title="Open an arm file, or a CSV table of bearings for this arm; or drop one on the sheet"
        >
          Open file…
        </button>
        <input
          ref={picker}
          className="file-picker"
          type="file"
          accept=".json,application/json,.csv,text/csv"
          aria-label="Arm file or table of bearings to open"
          tabIndex={-1}
          onChange={async (event) => {
            const { files } = event.target;
            if (files) await readDropped(files);
            event.target.value = '';
          }}
        />
        <button type="button" onClick={saveFile} disabled={!sheet}>
          Save file
        </button>
      </div>
      <div className="tool-group">
        <button type="button" onClick={undo} disabled={!canUndo} aria-keyshortcuts="Control+Z">
          Undo
        </button>
        <button type="button" onClick={redo} disabled={!canRedo} aria-keyshortcuts="Control+Shift+Z">
          Redo
        </button>
      </div>
      <Notice />
      <div className="tool-group end">
        <UnitsChoice />
        <SheetChoiceField />
        <button type="button" onClick={() => print()}>
          Print
        </button>
      </div>
      {browsing && <Gallery onClose={() => setBrowsing(false)} open={openText} />}
    </header>
  );
}

/** What was last taken in; there from the start, so that a screen reader hears it. */
function Notice() {
  const text = useDocument((state) => state.notice);
  return (
    <span className="notice" role="status" title={text ?? undefined}>
      {text}
    </span>
  );
}

function saveFile(): void {
  const { file, origin } = useDocument.getState();
  if (!file) return;
  const link = document.createElement('a');
  link.href = URL.createObjectURL(new Blob([writeArm(file)], { type: 'application/json' }));
  link.download = origin.endsWith('.json') ? origin : `${file.name}.arm.json`;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

function UnitsChoice() {
  const units = useView((state) => state.units);
  return (
    <label className="choice">
      <span>Units</span>
      <select value={units} onChange={(event) => useView.setState({ units: event.target.value as 'metric' | 'inch' })}>
        <option value="metric">mm, N</option>
        <option value="inch">in, lbf</option>
      </select>
    </label>
  );
}

function SheetChoiceField() {
  const sheet = useView((state) => state.sheet);
  return (
    <label className="choice">
      <span>Sheet</span>
      <select value={sheet} onChange={(event) => useView.setState({ sheet: event.target.value as SheetChoice })}>
        <option value="system">as the system</option>
        <option value="paper">paper</option>
        <option value="night">night</option>
      </select>
    </label>
  );
}
