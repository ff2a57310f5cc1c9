/** Every check of the selected joint: demand, allowable, where it governs, and the source of the rule; open ones say what to fill in. */
import { poseText } from '../../report/shown.ts';
import { isLasting } from '../../studies/lastingRows.ts';
import { type CheckRow, isMissing, moreIsBetter } from '../../studies/results.ts';
import { WHOLE_ARM } from '../../studies/rowsWithoutPose.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { UtilisationBar, utilisationText } from '../figures/UtilisationBar.tsx';
import { heldOf, standing } from '../figures/utilisationScale.ts';
import { useArm } from '../store/documentStore.ts';
import { goToWorst } from '../store/goTo.ts';
import { usePoseRows, useTipMade } from '../store/governing.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { FileWords } from './FileWords.tsx';
import { quantityOf, shownNumber } from './shownNumber.ts';

export function ChecksPanel() {
  const sheet = useArm();
  const at = useView((state) => state.joint);
  const rows = useWorst((state) => state.rows);
  const now = usePoseRows();
  const joint = sheet?.arm.joints[at];
  if (!joint) return null;
  const held = rows?.filter((row) => row.verdict !== null || row.source !== null) ?? [];
  const own = held.filter((row) => row.jointIndex === at);
  const whole = held.filter((row) => row.jointIndex === WHOLE_ARM);
  const line = (row: CheckRow) => (
    <CheckLine key={`${row.bearing}${row.check}`} row={row} now={now.find((each) => same(each, row))} />
  );
  return (
    <table className="load-table checks-table">
      <caption>Checks of {joint.name}, at worst within travel and over the duty</caption>
      <thead>
        <tr>
          <th scope="col">Check</th>
          <th scope="col" className="number now">
            Now
          </th>
          <th scope="col" className="number">
            Worst
          </th>
          <th scope="col" className="number">
            Allowable
          </th>
          <th scope="col">Utilisation</th>
        </tr>
      </thead>
      <tbody>
        {own.map(line)}
        {own.length === 0 && (
          <tr>
            <td colSpan={5} className="panel-note">
              {rows ? 'Nothing here is held against a limit.' : 'Not swept yet.'}
            </td>
          </tr>
        )}
      </tbody>
      {whole.length > 0 && (
        <tbody>
          <tr className="whole-arm">
            <th scope="rowgroup" colSpan={5}>
              The whole arm
            </th>
          </tr>
          {whole.map(line)}
        </tbody>
      )}
    </table>
  );
}

function same(a: CheckRow, b: CheckRow): boolean {
  return a.jointIndex === b.jointIndex && a.bearing === b.bearing && a.check === b.check;
}

function nameOf(row: CheckRow): string {
  if (row.jointIndex === WHOLE_ARM) return row.check;
  return `${row.bearing === null ? 'shaft' : row.bearing} ${row.check}`;
}

/** The figures on one line; where they stand, and by what rule, on the next, over the whole width. */
function CheckLine({ row, now }: { row: CheckRow; now: CheckRow | undefined }) {
  const what = nameOf(row);
  const held = heldOf(row);
  return (
    <>
      <tr className="check-figures">
        <th scope="row" className="load-name">
          {what}
        </th>
        <td className="number now">
          <Value value={now?.value} unit={row.unit} />
        </td>
        <td className="number">
          <Value value={isMissing(row) ? undefined : row.value} unit={row.unit} />
        </td>
        <td className="number">
          {row.allowable !== null && moreIsBetter(row) && '≥\u2009'}
          <Value value={row.allowable ?? undefined} unit={row.unit} />
        </td>
        <td className={`of-allowable ${row.verdict === null ? '' : standing(held)}`}>
          {row.verdict === null ? (
            'told only'
          ) : (
            <span className="held">
              <UtilisationBar held={held} now={now?.utilisation ?? null} />
              {utilisationText(held)}
            </span>
          )}
        </td>
      </tr>
      <tr className="check-words">
        <td colSpan={5}>
          {row.pose.length > 0 && (
            <button type="button" className="go" onClick={() => goToWorst(row)} title={poseText(row.pose)}>
              {row.case}
              {row.where ? `, at the ${row.where}` : ''}: go to the worst pose
              <span className="for-readers"> of {what}</span>
            </button>
          )}
          {now && row.check === 'tip error' && <TipShares />}
          {/* That a pass speaks for its grid or pose alone stands in the line of the sweep. */}
          {row.reason && (row.verdict !== 'pass' || isLasting(row)) && (
            <span className="reason">
              <FileWords text={row.reason} />
            </span>
          )}
          {row.source && (
            <span className="source">
              <FileWords text={row.source} />
            </span>
          )}
        </td>
      </tr>
    </>
  );
}

/** Who moves the tip at the pose on stage, the most first. */
function TipShares() {
  const made = useTipMade();
  const units = useView((state) => state.units);
  if (!made) return null;
  const parts = made.joints
    .map((name, k) => ({ name, share: made.shares[k]! }))
    .sort((a, b) => b.share - a.share)
    .map(({ name, share }) => `${name} ${shownNumber(share, 'length', units)}`);
  return (
    <span className="reason">
      Now, by joint, {SHOWN_UNITS[units].length}: {parts.join(', ')}
    </span>
  );
}

function Value({ value, unit }: { value: number | undefined; unit: string }) {
  const units = useView((state) => state.units);
  if (value === undefined) return '–';
  if (value === Number.POSITIVE_INFINITY && unit === 's') return 'no end';
  const quantity = quantityOf(unit);
  if (!quantity) return Number.isNaN(value) ? 'failed' : `${Number(value.toPrecision(4))} ${unit}`;
  return (
    <>
      {shownNumber(value, quantity, units, 4)} <span className="unit">{SHOWN_UNITS[units][quantity]}</span>
    </>
  );
}
