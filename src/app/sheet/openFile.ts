/** A file that was picked or dropped, an arm or a table of bearings: its text is read here in the browser and goes nowhere else. */
import { MAX_TEXT_BYTES } from '../../arm/armFile.ts';
import { openBearingTable } from '../store/bearingTables.ts';
import { openText, useDocument } from '../store/documentStore.ts';

export async function readDropped(files: FileList | readonly File[]): Promise<void> {
  const file = files[0];
  if (!file) return;
  if (file.size > MAX_TEXT_BYTES) {
    refuse(file.name, `${(file.size / 1024 / 1024).toFixed(1)} MiB`, 'at most 8 MiB');
    return;
  }
  try {
    const text = await file.text();
    if (isTable(file)) openBearingTable(file.name, text);
    else openText(file.name, text);
  } catch {
    refuse(file.name, 'a file that the browser cannot read', 'an arm file');
  }
}

function isTable({ name, type }: File): boolean {
  return /\.csv$/i.test(name) || type === 'text/csv';
}

function refuse(name: string, found: string, expected: string): void {
  useDocument.setState({ refusal: { name, issues: [{ code: 'too-long', path: [], found, expected }] } });
}
