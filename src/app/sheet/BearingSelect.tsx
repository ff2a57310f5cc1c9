/** Which bearing stands at a place of the joint, to be changed: one of the file, or one of the built table with estimated ratings. */
import { useState } from 'react';
import { issueText } from '../../arm/issue.ts';
import { bearingChoices } from '../store/bearingChoices.ts';
import { type ArmOnSheet, editFile } from '../store/documentStore.ts';
import { withBearing } from '../store/supportEdits.ts';

interface BearingSelectProps {
  readonly sheet: ArmOnSheet;
  readonly at: number;
  readonly place: 'A' | 'B' | 'ring';
}

const NONE = '';

export function BearingSelect({ sheet, at, place }: BearingSelectProps) {
  const [fault, setFault] = useState<string | null>(null);
  const joint = sheet.arm.joints[at]!;
  const { support } = joint;
  if (!support) return null;
  const named = support.arrangement === 'ring' ? support.bearing : place === 'A' ? support.bearingA : support.bearingB;
  const { own, table } = bearingChoices(sheet.file, at, support.shaft ? seatOf(sheet, at, place) : null);
  const known = own.some((one) => one.name === named);
  const choose = (name: string) => {
    const entry = table.find((one) => one.name === name)?.entry;
    const issues = editFile((file) => withBearing(file, at, place, name === NONE ? null : name, entry));
    setFault(issues[0] ? issueText(issues[0]) : null);
  };
  const what = place === 'ring' ? 'Ring bearing' : `Bearing ${place}`;
  return (
    <span className={fault ? 'bearing-select refused' : 'bearing-select'}>
      <select
        aria-label={`${what} of ${joint.name}`}
        title={own.find((one) => one.name === named)?.text ?? named ?? undefined}
        value={named ?? NONE}
        onChange={(event) => choose(event.target.value)}
      >
        <option value={NONE}>no bearing named</option>
        {named !== null && !known && <option value={named}>{named} (not in the table)</option>}
        <optgroup label="In the arm file">
          {own.map(({ name, text }) => (
            <option key={name} value={name}>
              {text}
            </option>
          ))}
        </optgroup>
        {table.length > 0 && (
          <optgroup label="Estimated, replace by the maker’s rating">
            {table.map(({ name, text }) => (
              <option key={name} value={name}>
                {text}
              </option>
            ))}
          </optgroup>
        )}
      </select>
      {fault && (
        <span className="fault" role="alert">
          {fault}
        </span>
      )}
    </span>
  );
}

/** Shaft diameter at the bearing, mm. */
function seatOf({ arm }: ArmOnSheet, at: number, place: 'A' | 'B' | 'ring'): number {
  const support = arm.joints[at]!.support!;
  const shaft = support.shaft!;
  const station =
    support.arrangement === 'ring' ? support.station : place === 'A' ? support.stationA : support.stationB;
  const section = shaft.sections.find(({ from, to }) => from <= station && station <= to);
  return 1000 * (section?.diameter ?? shaft.diameter);
}
