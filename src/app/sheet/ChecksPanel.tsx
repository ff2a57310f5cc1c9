/** Every check of the selected joint: demand, allowable, where it governs, and the source of the rule; open ones say what to fill in. */
import { poseText } from '../../report/shown.ts';
import { type CheckRow, isMissing } from '../../studies/results.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { utilisationText } from '../figures/UtilisationBar.tsx';
import { heldOf, standing } from '../figures/utilisationScale.ts';
import { useArm } from '../store/documentStore.ts';
import { goToWorst } from '../store/goTo.ts';
import { usePoseRows } from '../store/governing.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { quantityOf, shownNumber } from './shownNumber.ts';

export function ChecksPanel() {
  const sheet = useArm();
  const at = useView((state) => state.joint);
  const rows = useWorst((state) => state.rows);
  const now = usePoseRows();
  const joint = sheet?.arm.joints[at];
  if (!joint) return null;
  const held = rows?.filter((row) => row.jointIndex === at && (row.verdict !== null || row.source !== null)) ?? [];
  return (
    <table className="load-table checks-table">
      <caption>Checks of {joint.name}, worst over the poses swept</caption>
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
          <th scope="col" className="number">
            Utilisation
          </th>
          <th scope="col">Where it stands, and by what rule</th>
        </tr>
      </thead>
      <tbody>
        {held.map((row) => (
          <CheckLine key={`${row.bearing}${row.check}`} row={row} now={now.find((each) => same(each, row))} />
        ))}
        {held.length === 0 && (
          <tr>
            <td colSpan={6} className="panel-note">
              {rows ? 'Nothing here is held against a limit.' : 'Not swept yet.'}
            </td>
          </tr>
        )}
      </tbody>
    </table>
  );
}

function same(a: CheckRow, b: CheckRow): boolean {
  return a.jointIndex === b.jointIndex && a.bearing === b.bearing && a.check === b.check;
}

function CheckLine({ row, now }: { row: CheckRow; now: CheckRow | undefined }) {
  const what = `${row.bearing === null ? 'shaft' : row.bearing} ${row.check}`;
  return (
    <tr>
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
        <Value value={row.allowable ?? undefined} unit={row.unit} />
      </td>
      <td className={`number of-allowable ${row.verdict === null ? '' : standing(heldOf(row))}`}>
        {row.verdict === null ? 'told only' : utilisationText(heldOf(row))}
      </td>
      <td className="check-words">
        {row.pose.length > 0 && (
          <button type="button" className="go" onClick={() => goToWorst(row)} title={poseText(row.pose)}>
            {row.case}
            {row.where ? `, at the ${row.where}` : ''}: go to the worst pose
            <span className="for-readers"> of {what}</span>
          </button>
        )}
        {row.reason && row.verdict !== 'pass' && <span className="reason">{row.reason}</span>}
        {row.source && <span className="source">{row.source}</span>}
      </td>
    </tr>
  );
}

function Value({ value, unit }: { value: number | undefined; unit: string }) {
  const units = useView((state) => state.units);
  if (value === undefined) return '–';
  const quantity = quantityOf(unit);
  if (!quantity) return Number.isNaN(value) ? 'failed' : `${Number(value.toPrecision(4))} ${unit}`;
  return (
    <>
      {shownNumber(value, quantity, units, 4)} <span className="unit">{SHOWN_UNITS[units][quantity]}</span>
    </>
  );
}
