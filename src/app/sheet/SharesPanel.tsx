/** For one check at its worst pose: who causes it, and what would help most. */
import { useDeferredValue, useMemo } from 'react';
import type { CheckRow } from '../../studies/results.ts';
import type { Slope } from '../../studies/slopes.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { ShareBars } from '../figures/ShareBars.tsx';
import { useSize } from '../figures/useSize.ts';
import { type ArmOnSheet, armOf, useArm, useDocument } from '../store/documentStore.ts';
import { goToWorst } from '../store/goTo.ts';
import { governingOf } from '../store/governing.ts';
import { sharesOfRow, slopesOfRow } from '../store/shareOf.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { quantityOf, shownNumber, shownQuantity } from './shownNumber.ts';

export function SharesPanel() {
  const sheet = useArm();
  const at = useView((state) => state.joint);
  const bearing = useView((state) => state.bearing);
  const wanted = useView((state) => state.check);
  const rows = useWorst((state) => state.searched);
  const settled = useDocument((state) => state.file);
  const joint = sheet?.arm.joints[at];
  if (!sheet || !joint || !settled) return null;
  const choices = rows?.filter((row) => row.jointIndex === at && row.pose.length > 0) ?? [];
  const first = joint.support?.arrangement === 'ring' ? 'ring' : joint.support ? 'A' : null;
  const governing = governingOf(rows, at, bearing ?? first)?.row;
  const row = choices.find((each) => nameOf(each) === wanted) ?? governing ?? choices[0];
  if (!row) return <p className="panel-note">Not swept yet.</p>;
  return (
    <div className="shares">
      <div className="panel-bar">
        <label className="choice">
          <span>Who causes</span>
          <select value={nameOf(row)} onChange={(event) => useView.setState({ check: event.target.value })}>
            {choices.map((each) => (
              <option key={nameOf(each)}>{nameOf(each)}</option>
            ))}
          </select>
        </label>
        <span className="what">
          of {joint.name}, worst in “{row.case}”
        </span>
        <button type="button" className="plain-button" onClick={() => goToWorst(row)}>
          Go to its pose
        </button>
      </div>
      <ShareParts sheet={armOf(settled)} row={row} />
    </div>
  );
}

function nameOf(row: CheckRow): string {
  return `${row.bearing === null ? '' : `${row.bearing} `}${row.check}`;
}

function ShareParts({ sheet, row: now }: { sheet: ArmOnSheet; row: CheckRow }) {
  const row = useDeferredValue(now);
  const units = useView((state) => state.units);
  const [frame, size] = useSize<HTMLDivElement>();
  const shares = useMemo(() => sharesOfRow(sheet.arm, row), [sheet, row]);
  const slopes = useMemo(() => slopesOfRow(sheet.arm, row), [sheet, row]);
  const quantity = quantityOf(row.unit);
  const show = (value: number) =>
    quantity
      ? `${shownNumber(value, quantity, units, 4)} ${SHOWN_UNITS[units][quantity]}`
      : `${Number(value.toPrecision(4))} ${row.unit}`;
  const sum = shares.reduce((total, share) => total + share.value, 0);
  const exact = Math.abs(sum - row.value) <= 1e-6 * Math.abs(row.value);
  return (
    <>
      <div ref={frame}>
        {shares.length > 0 && size && (
          <ShareBars
            width={size.width}
            title={`Shares of ${nameOf(row)}: ${shares.map((share) => `${share.name} ${show(share.value)}`).join(', ')}`}
            bars={shares.map((share) => ({
              key: `${share.kind} ${share.name}`,
              label: share.kind === 'link' ? share.name : share.kind,
              value: share.value,
              text: show(share.value),
            }))}
          />
        )}
        {shares.length === 0 && <p className="panel-note">This check is no sum of shares.</p>}
      </div>
      {shares.length > 0 && (
        <p className="share-sum">
          Together <b>{show(sum)}</b>
          {exact
            ? ''
            : `; the check itself is ${show(row.value)}, what is shared out here is the safe bound it is proved by`}
        </p>
      )}
      <h3>What would help most</h3>
      <table className="load-table">
        <thead>
          <tr>
            <th scope="col">Change</th>
            <th scope="col">By</th>
            <th scope="col" className="number">
              The worst value
            </th>
          </tr>
        </thead>
        <tbody>
          {slopes.slice(0, 8).map((slope) => (
            <SlopeLine key={`${slope.what} ${slope.name}`} slope={slope} />
          ))}
          {slopes.length === 0 && (
            <tr>
              <td colSpan={3} className="panel-note">
                Nothing in the file moves it at this pose.
              </td>
            </tr>
          )}
        </tbody>
      </table>
      <p className="ways-note">
        Slopes at the worst pose, for a small step; after a larger one another pose may govern.
      </p>
    </>
  );
}

const WORDS = {
  span: 'span',
  overhang: 'overhang',
  mass: 'mass',
  'travel from': 'lower travel limit',
  'travel to': 'upper travel limit',
} as const;

function SlopeLine({ slope }: { slope: Slope }) {
  const units = useView((state) => state.units);
  const more = slope.slope < 0;
  const travel = slope.what.startsWith('travel');
  const quantity = slope.what === 'mass' ? 'mass' : travel ? 'angle' : 'length';
  const step = travel ? '5°' : '10 %';
  return (
    <tr>
      <th scope="row" className="load-name">
        {WORDS[slope.what]} of {slope.name}, now {shownQuantity(slope.now, quantity, units)}
      </th>
      <td>
        {more ? '+' : '\u2212'}
        {step}
      </td>
      <td className="number">
        {'\u2212'}
        {Number((Math.abs(slope.gain) * 100).toPrecision(2))} %
      </td>
    </tr>
  );
}
