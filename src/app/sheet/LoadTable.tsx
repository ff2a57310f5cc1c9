/** What joints and bearings carry: at the pose on stage, and at worst with the case and pose that govern. */
import { poseText } from '../../report/shown.ts';
import type { CheckRow, PoseJoint, PoseResult } from '../../studies/results.ts';
import { SHOWN_UNITS, type UnitSystem } from '../../units/format.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { tiltingMoment } from '../store/engine.ts';
import { goToWorst } from '../store/goTo.ts';
import { jointLoads } from '../store/loads.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { quantityOf, shownNumber } from './shownNumber.ts';

/** Rows shown, in the order of the result; the signed ones stand in the result for whoever needs them. */
const CHECKS = new Set(['radial', 'axial', 'moment', 'torque']);

export interface LoadTableProps {
  readonly sheet: ArmOnSheet;
  /** Chain indices, in the order they are listed. */
  readonly joints: readonly number[];
  readonly pose: PoseResult | null;
  /** Joint names as the first column. */
  readonly named?: boolean;
}

export function LoadTable({ sheet, joints, pose, named = false }: LoadTableProps) {
  const rows = useWorst((state) => state.searched) ?? [];
  const units = useView((state) => state.units);
  const cases = sheet.arm.cases.length > 1;
  const listed = joints.flatMap((i) => {
    const at = sheet.chain.jointIndex[i]!;
    const found = rows.filter((row) => row.jointIndex === at && CHECKS.has(row.check));
    const live = jointLoads(pose, sheet.chain.names[i]!);
    // What a case leaves free is not in the joint load of a pose, so there is nothing to set beside its worst.
    const whole = live && pose?.free === null;
    const own = {
      moment: whole ? tiltingMoment(sheet.chain, i, live) : null,
      torque: whole ? Math.abs(live.torque) : null,
    };
    return found.map((row, k) => ({ row, first: k === 0, count: found.length, now: liveValue(row, live, own) }));
  });
  return (
    <table className="load-table">
      <thead>
        <tr>
          {named && <th scope="col">Joint</th>}
          <th scope="col">Load</th>
          <th scope="col" className="number">
            Now
          </th>
          <th scope="col" className="number">
            Worst
          </th>
          {cases && (
            <th scope="col" className="case-name">
              Case
            </th>
          )}
          <th scope="col">Worst pose, °</th>
        </tr>
      </thead>
      <tbody>
        {listed.map(({ row, first, count, now }) => (
          <tr key={`${row.jointIndex}${row.bearing}${row.check}`} className={first && named ? 'first-of-joint' : ''}>
            {named && first && (
              <th scope="rowgroup" rowSpan={count}>
                {row.joint}
              </th>
            )}
            <LoadCells row={row} now={now} units={units} cases={cases} />
          </tr>
        ))}
        {listed.length === 0 && (
          <tr>
            <td colSpan={6} className="panel-note">
              Not swept yet.
            </td>
          </tr>
        )}
      </tbody>
    </table>
  );
}

interface LoadCellsProps {
  readonly row: CheckRow;
  /** Of the pose on stage, SI; null where it does not say. */
  readonly now: number | null;
  readonly units: UnitSystem;
  readonly cases: boolean;
}

function LoadCells({ row, now, units, cases }: LoadCellsProps) {
  const quantity = quantityOf(row.unit) ?? 'force';
  const unit = SHOWN_UNITS[units][quantity];
  const pose = poseText(row.pose).replaceAll(',', ' · ').replaceAll('-', '\u2212');
  const what = `${row.bearing ? `${row.bearing} ` : ''}${row.check}`;
  return (
    <>
      <td className="load-name">{what}</td>
      <td className="number" data-now={now ?? ''} data-check={`${row.joint}/${what}`}>
        {now === null ? (
          '–'
        ) : (
          <>
            {shownNumber(now, quantity, units, 4)} <span className="unit">{unit}</span>
          </>
        )}
      </td>
      <td className="number" data-worst={row.value}>
        {shownNumber(row.value, quantity, units, 4)} <span className="unit">{unit}</span>
      </td>
      {cases && <td className="case-name">{row.case}</td>}
      <td className="pose-cell">
        <button
          type="button"
          className="go"
          onClick={() => goToWorst(row)}
          aria-label={`${pose}: go to the worst pose of ${row.joint} ${what}`}
          title={`${pose} (${row.case})`}
        >
          {pose}
        </button>
      </td>
    </>
  );
}

interface OwnLoads {
  readonly moment: number | null;
  readonly torque: number | null;
}

/** The load of the pose on stage that a row is the worst of; null where the pose does not give it. */
function liveValue(row: CheckRow, live: PoseJoint | undefined, own: OwnLoads): number | null {
  if (!live) return null;
  if (row.bearing === null) return row.check === 'moment' ? own.moment : row.check === 'torque' ? own.torque : null;
  const load = live.bearings[row.bearing];
  if (!load) return null;
  if (row.check === 'radial') return load.radial;
  if (row.check === 'axial') return Math.abs(load.axial);
  return row.check === 'moment' ? load.moment : null;
}
