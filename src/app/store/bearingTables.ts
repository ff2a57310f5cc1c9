/** The user's own tables of bearings, dropped or picked as CSV: put into the arm's table as one step, or refused with every mistake. */
import { withBearings } from '../../arm/withBearings.ts';
import { readBearingCsv } from '../../capacity/rolling/index.ts';
import { editFile, useDocument } from './documentStore.ts';

/** Takes the bearings of a table into the arm on the sheet; those of the same name are replaced. A table with a mistake changes nothing. */
export function openBearingTable(name: string, text: string): void {
  const { files, issues } = readBearingCsv(text);
  if (issues.length > 0) {
    const placed = issues.map(({ line, column, found, expected }) => {
      return { code: 'bad-text' as const, path: [], found, expected, at: { line, column } };
    });
    useDocument.setState({ refusal: { name, issues: placed } });
    return;
  }
  const count = Object.keys(files).length;
  if (count === 0) {
    const nothing = {
      code: 'missing' as const,
      path: [],
      found: 'no bearing',
      expected: 'a header and one bearing a line',
    };
    useDocument.setState({ refusal: { name, issues: [nothing] } });
    return;
  }
  const refused = editFile((file) => withBearings(file, files));
  if (refused.length > 0) useDocument.setState({ refusal: { name, issues: refused } });
  else useDocument.setState({ refusal: null, notice: noticeText(count, name) });
}

function noticeText(count: number, name: string): string {
  return `${count === 1 ? '1 bearing' : `${count} bearings`} from ${name}: choose them in the panel “Joint”`;
}
