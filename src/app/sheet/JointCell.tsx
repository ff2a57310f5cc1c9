/** One joint of the load path: its name, its section on the common scale, its angle, and what its bearings carry at worst. */
import type { Governing } from '../../studies/assessGoverning.ts';
import type { CheckRow } from '../../studies/results.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { JointSection } from '../figures/JointSection.tsx';
import { type SectionShape, sectionShape } from '../figures/sectionGeometry.ts';
import { THUMB } from '../figures/thumbnail.ts';
import { UtilisationBar, utilisationText } from '../figures/UtilisationBar.tsx';
import { heldOf, standingFill } from '../figures/utilisationScale.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { goToWorst } from '../store/goTo.ts';
import { governed, governingOf, useGoverning, usePoseRows } from '../store/governing.ts';
import { setAngle, usePose } from '../store/poseStore.ts';
import { rowOf } from '../store/sweepStore.ts';
import { useTone } from '../store/tone.ts';
import { selectJoint, useView } from '../store/viewStore.ts';
import { QuantityField } from './QuantityField.tsx';
import { shownNumber } from './shownNumber.ts';

export interface JointCellProps {
  readonly sheet: ArmOnSheet;
  /** Chain index. */
  readonly index: number;
  readonly scale: number;
  readonly rows: readonly CheckRow[] | undefined;
}

export function JointCell({ sheet, index, scale, rows }: JointCellProps) {
  const at = sheet.chain.jointIndex[index]!;
  const joint = sheet.arm.joints[at]!;
  const selected = useView((state) => state.joint === at);
  const { support } = joint;
  const names = support ? (support.arrangement === 'ring' ? (['ring'] as const) : (['A', 'B'] as const)) : [];
  return (
    <li className={selected ? 'joint-cell selected' : 'joint-cell'}>
      <button type="button" className="cell-head" aria-pressed={selected} onClick={() => selectJoint(at)}>
        <span className="cell-name">{joint.name}</span>
        <span className="cell-kind">{support?.arrangement ?? 'no support'}</span>
        <Thumbnail sheet={sheet} index={at} scale={scale} rows={rows} />
      </button>
      <AngleField sheet={sheet} index={index} />
      {names.map((name) => (
        <BearingLine
          key={name}
          joint={joint.name}
          index={at}
          name={name}
          row={rowOf(rows, at, name, name === 'ring' ? 'moment' : 'radial')}
        />
      ))}
      {names.length === 0 && <p className="cell-note">joint load alone</p>}
    </li>
  );
}

function Thumbnail({ sheet, index, scale, rows }: JointCellProps) {
  const tone = useTone();
  const joint = sheet.arm.joints[index]!;
  if (!joint.support) {
    return (
      <svg {...THUMB} aria-hidden="true" focusable="false">
        <line x1="10" x2={THUMB.width - 10} y1={THUMB.height / 2} y2={THUMB.height / 2} className="centre-line" />
      </svg>
    );
  }
  const shape = sectionShape(joint.support, joint.drive, sheet.arm.bearings);
  return (
    <svg {...THUMB} viewBox={`0 0 ${THUMB.width} ${THUMB.height}`} aria-hidden="true" focusable="false">
      <JointSection
        shape={shape}
        view={{ scale, ...centred(sectionShape(joint.support, null, sheet.arm.bearings), scale) }}
        small
        fill={(name) => standingFill(heldOf(governingOf(rows, index, name)), tone)}
      />
    </svg>
  );
}

function centred({ bounds }: SectionShape, scale: number) {
  return {
    x: THUMB.width / 2 - ((bounds.s0 + bounds.s1) / 2) * scale,
    y: THUMB.height / 2 + ((bounds.r0 + bounds.r1) / 2) * scale,
  };
}

function AngleField({ sheet, index }: { sheet: ArmOnSheet; index: number }) {
  const angle = usePose()[index] ?? 0;
  const { chain } = sheet;
  const from = chain.from[index]!;
  const to = chain.to[index]!;
  const along = to > from ? Math.min(1, Math.max(0, (angle - from) / (to - from))) : 0.5;
  const set = (next: number) => {
    if (!chain.full[index] && (next < from - 1e-9 || next > to + 1e-9)) {
      return `Travel is ${degreeText(from)} to ${degreeText(to)}.`;
    }
    setAngle(chain, index, next);
    return null;
  };
  return (
    <span className="cell-angle">
      <QuantityField
        label={`Angle of ${chain.names[index]}`}
        quiet
        value={angle}
        quantity="angle"
        step={1}
        min={from}
        max={to}
        onChange={set}
      />
      <svg className="travel-ruler" aria-hidden="true" focusable="false">
        <line x1="0" x2="100%" y1="5" y2="5" className="thin-line" />
        <line x1="0.5" x2="0.5" y1="1" y2="9" className="thin-line" />
        <line x1="100%" x2="100%" y1="1" y2="9" className="thin-line" />
        <circle cx={`${along * 100}%`} cy="5" r="3" className="travel-at" />
      </svg>
    </span>
  );
}

function degreeText(angle: number): string {
  return `${Number(((angle * 180) / Math.PI).toFixed(2)) + 0}°`;
}

interface BearingLineProps {
  readonly joint: string;
  readonly index: number;
  readonly name: 'A' | 'B' | 'ring';
  /** The worst radial load, or of a ring the worst moment. */
  readonly row: CheckRow | undefined;
}

/** The worst load and the check that governs; a press goes to where that check is worst. */
function BearingLine({ joint, index, name, row }: BearingLineProps) {
  const units = useView((state) => state.units);
  const chosen = useView((state) => state.joint === index && state.bearing === name);
  const worst = useGoverning(index, name);
  const now = governed(usePoseRows()).get(`${index} ${name}`);
  const quantity = name === 'ring' ? 'moment' : 'force';
  const unit = SHOWN_UNITS[units][quantity];
  const value = row ? shownNumber(row.value, quantity, units) : '–';
  const held = heldOf(worst);
  const aim = worst?.row ?? row;
  const words = row
    ? `Worst ${name === 'ring' ? 'moment' : 'radial load'} of ${joint}; utilisation ${utilisationText(held)}: ${worst?.why ?? 'nothing to hold it against'}${openText(worst)}. Go to its worst pose`
    : `Bearing of ${joint}, not swept yet`;
  return (
    <button
      type="button"
      className={chosen ? 'bearing-line chosen' : 'bearing-line'}
      disabled={!aim}
      title={words}
      onClick={() => aim && goToWorst(aim)}
    >
      <span className="bearing-name">{name === 'ring' ? '' : name}</span>{' '}
      <UtilisationBar held={held} now={now?.utilisation ?? null} />
      <span className="bearing-load">
        {value}
        <span className="unit"> {unit}</span>
      </span>
      <span className="for-readers">: {words}</span>
    </button>
  );
}

function openText(worst: Governing | undefined): string {
  if (!worst || worst.open.length === 0) return '';
  return `; not assessed: ${worst.open.map(({ check, reason }) => `${check} (${reason.replaceAll('`', '')})`).join(', ')}`;
}
