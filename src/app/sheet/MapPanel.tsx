/** Where the selected check is bad: a field over two joint angles, the others held as they stand on stage. */
import { useEffect, useMemo, useState } from 'react';
import { capacityForms, jointCapacity } from '../../capacity/index.ts';
import { jointChecks } from '../../mechanics/bearingPair.ts';
import { bearingChecks } from '../../mechanics/loadChecks.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { fromSI } from '../../units/unit.ts';
import { ContourField } from '../figures/ContourField.tsx';
import { useSize } from '../figures/useSize.ts';
import { type ArmOnSheet, useArm } from '../store/documentStore.ts';
import { governingOf } from '../store/governing.ts';
import { type PoseMap, poseMap } from '../store/poseMap.ts';
import { setPose, usePose } from '../store/poseStore.ts';
import { useTone } from '../store/tone.ts';
import { useSelectedChainIndex, useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { quantityOf } from './shownNumber.ts';

export function MapPanel() {
  const sheet = useArm();
  const index = useSelectedChainIndex();
  if (!sheet || index < 0) return null;
  if (sheet.chain.n < 2) return <p className="panel-note">A map needs two joints; this arm has one.</p>;
  return <Field key={`${sheet.chain.names.join('|')}`} sheet={sheet} index={index} />;
}

/** The selected joint and the one before it on the way to the ground, whose turning shifts the load on it. */
function usualJoints(index: number, n: number): readonly [number, number] {
  return index > 0 ? [index - 1, index] : [0, Math.min(1, n - 1)];
}

function Field({ sheet, index }: { sheet: ArmOnSheet; index: number }) {
  const { arm, chain } = sheet;
  const [chosen, setChosen] = useState<readonly [number, number] | null>(null);
  const [across, up] = chosen ?? usualJoints(index, chain.n);
  const bearing = useView((state) => state.bearing);
  const wanted = useView((state) => state.check);
  const caseName = useView((state) => state.case);
  const units = useView((state) => state.units);
  const rows = useWorst((state) => state.searched);
  const tone = useTone();
  const pose = usePose();
  const [frame, size] = useSize<HTMLDivElement>();
  const at = chain.jointIndex[index]!;
  const checks = useMemo(
    () => [
      ...capacityForms(jointCapacity(arm, chain, index)),
      ...bearingChecks(index, arm.joints[at]!),
      ...jointChecks(index).filter((check) => !/[+-]$/.test(check.check)),
    ],
    [arm, chain, index, at],
  );
  const name = (check: { bearing: string | null; check: string }) =>
    `${check.bearing === null ? '' : `${check.bearing} `}${check.check}`;
  const governing = governingOf(rows, at, bearing ?? 'A')?.row;
  const check =
    checks.find((each) => name(each) === wanted) ??
    checks.find((each) => governing && name(each) === name(governing)) ??
    checks[0]!;
  const row = rows?.find((each) => each.jointIndex === at && name(each) === name(check));
  const map = useMap(sheet, check, caseName, across, up, pose);
  const quantity = quantityOf(check.unit);
  const unit = quantity ? SHOWN_UNITS[units][quantity] : check.unit;
  const choose = (which: 0 | 1, value: number) => {
    const other = which === 0 ? up : across;
    const next = value === other ? (which === 0 ? across : up) : other;
    setChosen(which === 0 ? [value, next] : [next, value]);
  };
  return (
    <div className="map-panel">
      <div className="panel-bar">
        <label className="choice">
          <span>Map</span>
          <select value={name(check)} onChange={(event) => useView.setState({ check: event.target.value })}>
            {checks.map((each) => (
              <option key={name(each)}>{name(each)}</option>
            ))}
          </select>
        </label>
        <JointChoice label="over" value={across} names={chain.names} onChange={(value) => choose(0, value)} />
        <JointChoice label="and" value={up} names={chain.names} onChange={(value) => choose(1, value)} />
        <span className="what">
          {unit}, “{caseName}”; other joints as on stage
        </span>
      </div>
      <div className="map-room" ref={frame}>
        {map && size && pose.length === chain.n && (
          <ContourField
            map={map}
            across={[chain.from[across]!, chain.to[across]!]}
            up={[chain.from[up]!, chain.to[up]!]}
            acrossName={chain.names[across]!}
            upName={chain.names[up]!}
            allowable={row?.allowable ?? null}
            shown={(value) => (quantity ? fromSI(value, unit) : value)}
            here={[pose[across]!, pose[up]!]}
            tone={tone}
            width={size.width}
            height={size.height}
            title={`${name(check)} of ${chain.names[index]} over ${chain.names[across]} and ${chain.names[up]}`}
            onGo={(a, b) => setPose(pose.map((angle, k) => (k === across ? a : k === up ? b : angle)))}
          />
        )}
        {!map && <p className="panel-note">Being worked out …</p>}
      </div>
    </div>
  );
}

interface JointChoiceProps {
  readonly label: string;
  readonly value: number;
  readonly names: readonly string[];
  readonly onChange: (value: number) => void;
}

function JointChoice({ label, value, names, onChange }: JointChoiceProps) {
  return (
    <label className="choice">
      <span>{label}</span>
      <select value={value} onChange={(event) => onChange(Number(event.target.value))}>
        {names.map((joint, k) => (
          <option key={joint} value={k}>
            {joint}
          </option>
        ))}
      </select>
    </label>
  );
}

type Check = Parameters<typeof poseMap>[0]['check'];

/** The map, worked out anew when the check, the joints or the held angles change; the last one stays until then. */
function useMap(
  sheet: ArmOnSheet,
  check: Check,
  caseName: string,
  across: number,
  up: number,
  pose: readonly number[],
): PoseMap | null {
  const [map, setMap] = useState<PoseMap | null>(null);
  const held = pose.map((angle, k) => (k === across || k === up ? '' : angle.toFixed(6))).join(' ');
  // biome-ignore lint/correctness/useExhaustiveDependencies: of the pose only the held angles count
  useEffect(() => {
    if (pose.length !== sheet.chain.n) return;
    let stopped = false;
    const wait = setTimeout(async () => {
      const next = await poseMap({ sheet, check, caseName, across, up, pose }, () => stopped);
      if (next && !stopped) setMap(next);
    }, 60);
    return () => {
      stopped = true;
      clearTimeout(wait);
    };
  }, [sheet, check, caseName, across, up, held]);
  return map;
}
