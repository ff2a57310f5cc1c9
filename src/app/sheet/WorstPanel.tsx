/** Every joint's loads in one table, in the order of the load's path, to be read here or taken to a spreadsheet. */
import { useState } from 'react';
import { rowsTable } from '../../report/rowsTable.ts';
import { type Cell, columnTitle, csvText, type Table } from '../../report/table.ts';
import { useArm, useDocument } from '../store/documentStore.ts';
import { usePoseLoads } from '../store/loads.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { LoadTable } from './LoadTable.tsx';

export function WorstPanel() {
  const sheet = useArm();
  const pose = usePoseLoads();
  const rows = useWorst((state) => state.rows);
  const units = useView((state) => state.units);
  const [said, setSaid] = useState('');
  if (!sheet) return null;
  const order = sheet.chain.jointIndex.map((_, i) => i).reverse();
  const table = (): Table => rowsTable(rows ?? [], { system: units, group: false });
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(tabbedText(table()));
      setSaid('Copied.');
    } catch {
      setSaid('The browser did not let the table be copied.');
    }
  };
  return (
    <>
      <div className="panel-bar">
        <span>From the tip to the ground</span>
        <button type="button" className="plain-button" onClick={copy} disabled={!rows}>
          Copy table
        </button>
        <button type="button" className="plain-button" onClick={() => saveText(csvText(table()))} disabled={!rows}>
          Save as CSV
        </button>
        <span role="status">{said}</span>
      </div>
      <LoadTable sheet={sheet} joints={order} pose={pose} named />
    </>
  );
}

function tabbedCell(cell: Cell): string {
  if (cell === null) return '';
  return typeof cell === 'number' ? String(cell) : cell.replaceAll(/[\t\r\n]/g, ' ');
}

/** The same table as a spreadsheet takes it from the clipboard. */
function tabbedText(table: Table): string {
  const lines = [table.columns.map(columnTitle), ...table.rows];
  return lines.map((line) => line.map(tabbedCell).join('\t')).join('\n');
}

function saveText(text: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(new Blob([text], { type: 'text/csv' }));
  link.download = `${useDocument.getState().file?.name ?? 'arm'}, worst loads.csv`;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}
