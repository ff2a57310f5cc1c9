/** Every load of the two ways side by side, each with its own governing pose, and how many times the one is the other. */
import { poseText } from '../../report/shown.ts';
import type { CompareResult } from '../../studies/compareArm.ts';
import type { ComparePlan } from '../../studies/comparePlan.ts';
import type { CheckRow } from '../../studies/results.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { goToWorst } from '../store/goTo.ts';
import { useView } from '../store/viewStore.ts';
import { quantityOf, shownNumber } from './shownNumber.ts';

export function WaysTable({ plan, result }: { plan: ComparePlan; result: CompareResult | null }) {
  return (
    <table className="load-table ways-table">
      <thead>
        <tr>
          <th scope="col">Worst {plan.joint}</th>
          <th scope="col" className="number">
            Clevis
          </th>
          <th scope="col" className="number">
            Cantilever
          </th>
          <th scope="col" className="number">
            Ratio
          </th>
        </tr>
      </thead>
      <tbody>
        {result?.clevis.rows.map((row, k) => {
          const other = result.cantilever.rows[k]!;
          const ratio = result.ratios.find((each) => each.check === row.check && each.bearing === row.bearing)?.ratio;
          const what = `${row.bearing ? `${row.bearing} ` : ''}${row.check}`;
          return (
            <tr key={what}>
              <th scope="row" className="load-name">
                {what}
              </th>
              <Worst row={row} what={`${what}, clevis`} />
              <Worst row={other} what={`${what}, cantilever`} />
              <td className="number">{ratio == null ? '–' : `× ${ratio.toPrecision(3)}`}</td>
            </tr>
          );
        })}
        {!result && (
          <tr>
            <td colSpan={4} className="panel-note">
              Being worked out …
            </td>
          </tr>
        )}
      </tbody>
    </table>
  );
}

function Worst({ row, what }: { row: CheckRow; what: string }) {
  const units = useView((state) => state.units);
  const quantity = quantityOf(row.unit) ?? 'force';
  const value = shownNumber(row.value, quantity, units, 4);
  return (
    <td className="number">
      <button
        type="button"
        className="go"
        onClick={() => goToWorst(row)}
        aria-label={`${value} ${SHOWN_UNITS[units][quantity]}: go to the pose of ${what}`}
        title={`${poseText(row.pose)} (${row.case})`}
      >
        {value} <span className="unit">{SHOWN_UNITS[units][quantity]}</span>
      </button>
    </td>
  );
}
