/** Why a file was not opened: every mistake with its place, what was found and what was expected. The present arm stays. */
import { type Issue, pathText } from '../../arm/issue.ts';
import { dismissRefusal, useDocument } from '../store/documentStore.ts';

const SHOWN = 200;

/** Its path in the file; of a text that has none, such as a table, the column. */
function placeText({ path, at }: Issue): string {
  return path.length === 0 && at ? `column ${at.column}` : pathText(path);
}

export function IssueList() {
  const refusal = useDocument((state) => state.refusal);
  const present = useDocument((state) => state.file?.name);
  if (!refusal) return null;
  const { name, issues } = refusal;
  const count = issues.length === 1 ? 'one mistake' : `${issues.length} mistakes`;
  return (
    <section className="issue-list" role="alert" aria-labelledby="issue-title">
      <header>
        <h2 id="issue-title">
          {name} was not opened: {count}
        </h2>
        <button type="button" onClick={dismissRefusal}>
          Close
        </button>
      </header>
      {present && <p>“{present}” is still on the sheet.</p>}
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a list that scrolls must be reachable by keyboard */}
      <section className="scroll" tabIndex={0} aria-label="Mistakes">
        <table>
          <thead>
            <tr>
              <th scope="col">Line</th>
              <th scope="col">Place</th>
              <th scope="col">Found</th>
              <th scope="col">Expected</th>
            </tr>
          </thead>
          <tbody>
            {issues.slice(0, SHOWN).map((issue, k) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: the list is replaced as a whole
              <tr key={k}>
                <td className="number">{issue.at?.line ?? ''}</td>
                <td className="path">{placeText(issue)}</td>
                <td>{issue.found}</td>
                <td>{issue.expected}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      {issues.length > SHOWN && <p>… and {issues.length - SHOWN} more.</p>}
    </section>
  );
}
