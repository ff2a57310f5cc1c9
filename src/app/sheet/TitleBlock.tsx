/** The title block (fields of ISO 7200), the scale of utilisation, and the caution that goes with every sheet. */
import { useId } from 'react';
import { SCALE_STOPS, utilisationColour } from '../figures/utilisationScale.ts';
import { editFile, setTitle, type TitleFields, useArm, useDocument } from '../store/documentStore.ts';
import { useTone } from '../store/tone.ts';
import { useView } from '../store/viewStore.ts';

export function TitleBlock() {
  const sheet = useArm();
  const origin = useDocument((state) => state.origin);
  const name = useView((state) => state.case);
  const units = useView((state) => state.units);
  return (
    <footer className="sheet-foot">
      <div className="foot-notes">
        <UtilisationKey />
        <p className="caution">
          <b>Caution.</b> A design aid: rigid-body loads of the file as it stands. What is not rated is never shown as
          passing. A qualified person must check the design before anything is built.
        </p>
      </div>
      <fieldset className="title-block" aria-label="Title block">
        <TitleField label="Title" wide value={sheet?.file.name ?? ''} onChange={renameArm} />
        <StaticField label="File" value={origin} />
        <StaticField label="Load case shown" value={name} />
        <StaticField label="Units" value={units === 'metric' ? 'mm  N  N·m  °' : 'in  lbf  lbf·in  °'} />
        <OwnField label="Document number" field="number" />
        <OwnField label="Rev." field="revision" />
        <OwnField label="Date of issue" field="date" />
        <OwnField label="Drawn by" field="drawn" />
      </fieldset>
    </footer>
  );
}

function renameArm(name: string): void {
  if (name.trim() !== '') editFile((file) => ({ ...file, name: name.trim() }));
}

function OwnField({ label, field }: { label: string; field: keyof TitleFields }) {
  const value = useDocument((state) => state.title[field]);
  return <TitleField label={label} value={value} onChange={(text) => setTitle({ [field]: text })} />;
}

interface TitleFieldProps {
  readonly label: string;
  readonly value: string;
  readonly wide?: boolean;
  readonly onChange: (text: string) => void;
}

/** Kept when it is left or entered, so that a word is one step of undo. */
function TitleField({ label, value, wide = false, onChange }: TitleFieldProps) {
  const id = useId();
  return (
    <div className={wide ? 'title-field wide' : 'title-field'}>
      <label htmlFor={id}>{label}</label>
      <input
        id={id}
        key={value}
        defaultValue={value}
        maxLength={120}
        autoComplete="off"
        spellCheck={false}
        onBlur={(event) => event.target.value !== value && onChange(event.target.value)}
        onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
      />
    </div>
  );
}

function StaticField({ label, value }: { label: string; value: string }) {
  return (
    <div className="title-field">
      <span className="label">{label}</span>
      <span className="value" title={value}>
        {value}
      </span>
    </div>
  );
}

const KEY_WIDTH = 312;

/** Utilisation as it is shown everywhere: ticks at the quarters, the limit, beyond it, and not rated. */
function UtilisationKey() {
  const tone = useTone();
  const steps = Array.from({ length: 24 }, (_, k) => (k + 0.5) / 24);
  const full = 192;
  return (
    <svg
      className="utilisation-key"
      width={KEY_WIDTH}
      height="34"
      role="img"
      aria-label="Utilisation: 0 to 1 from faint to full ink, dense hatch above 1, sparse hatch over what is not fully assessed"
    >
      {steps.map((u) => (
        <rect
          key={u}
          x={((u - 0.5 / 24) * full).toFixed(2)}
          y="2"
          width={full / 24 + 0.4}
          height="11"
          fill={utilisationColour(u, tone)}
        />
      ))}
      <rect x="0.5" y="2" width={full} height="11" className="bar-frame" />
      <rect x={full} y="2" width="44" height="11" style={{ fill: 'url(#hatch-over)' }} className="bar-frame" />
      <rect x={full + 56} y="2" width="44" height="11" style={{ fill: 'url(#hatch-unrated)' }} />
      <rect x={full + 56} y="2" width="44" height="11" className="bar-frame" />
      <line x1={full} x2={full} y1="0" y2="16" className="bar-limit" />
      <g className="key-text">
        {SCALE_STOPS.map((u) => (
          <text key={u} x={u * full} y="27" textAnchor={u === 0 ? 'start' : 'middle'}>
            {u === 0 ? '0' : u}
          </text>
        ))}
        <text x={full + 26} y="27" textAnchor="middle">
          over
        </text>
        <text x={full + 78} y="27" textAnchor="middle">
          not assessed
        </text>
      </g>
    </svg>
  );
}
