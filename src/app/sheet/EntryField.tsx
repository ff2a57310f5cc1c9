/** A number of the arm file that may be left out: what stands for it then is shown in its place, paler. Typed in any unit the sheet knows. */
import { type KeyboardEvent, useEffect, useId, useState } from 'react';
import { entryFaultText, parseEntry } from '../../units/entry.ts';
import { type Quantity, SHOWN_UNITS } from '../../units/format.ts';
import { fromSI, toSI } from '../../units/unit.ts';
import { useView } from '../store/viewStore.ts';
import { FieldFrame, faultId } from './FieldFrame.tsx';

export interface EntryFieldProps {
  readonly label: string;
  /** The label stands beside it already; it is kept for screen readers. */
  readonly quiet?: boolean;
  /** SI; undefined: left out. */
  readonly value: number | undefined;
  /** Null: a plain number. */
  readonly quantity: Quantity | null;
  /** What stands for it where it is left out; null: it may not be. */
  readonly otherwise: string | null;
  /** Takes the new value (SI), undefined to leave it out; a sentence back refuses it. */
  readonly onChange: (value: number | undefined) => string | null;
}

const PLAIN = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
/** Figures shown: enough for what anybody types, without the noise of a conversion. */
const FIGURES = 10;

export function EntryField({ label, quiet = false, value, quantity, otherwise, onChange }: EntryFieldProps) {
  const units = useView((state) => state.units);
  const unit = quantity === null ? '' : SHOWN_UNITS[units][quantity];
  const shown = value === undefined ? '' : tidy(unit === '' ? value : fromSI(value, unit));
  const [typed, setTyped] = useState<string | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const id = useId();

  // biome-ignore lint/correctness/useExhaustiveDependencies: a value from outside replaces what was refused
  useEffect(() => {
    setTyped(null);
    setFault(null);
  }, [shown]);

  const commit = () => {
    if (typed === null) return;
    const text = typed.trim();
    if (text === shown) {
      setTyped(null);
      setFault(null);
      return;
    }
    const entry = text === '' && otherwise !== null ? undefined : read(text, unit);
    const refused = typeof entry === 'string' ? entry : onChange(entry);
    setFault(refused);
    if (refused === null) setTyped(null);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'Enter') commit();
    else if (event.key === 'Escape') {
      setTyped(null);
      setFault(null);
    }
  };
  return (
    <FieldFrame id={id} label={label} quiet={quiet} unit={unit} fault={fault}>
      <input
        id={id}
        type="text"
        inputMode="decimal"
        autoComplete="off"
        spellCheck={false}
        value={typed ?? shown}
        placeholder={otherwise ?? undefined}
        aria-invalid={fault !== null}
        aria-describedby={fault ? faultId(id) : undefined}
        onChange={(event) => setTyped(event.target.value)}
        onFocus={(event) => event.target.select()}
        onBlur={commit}
        onKeyDown={onKeyDown}
      />
    </FieldFrame>
  );
}

/** SI, or why not. */
function read(text: string, unit: string): number | string {
  if (unit === '') return PLAIN.test(text) ? Number(text) : `“${text}” cannot be read; write a number such as 1.5.`;
  const entry = parseEntry(text, unit);
  return entry.ok ? toSI(entry.value, unit) : entryFaultText(entry.fault);
}

function tidy(value: number): string {
  return String(Number(value.toPrecision(FIGURES)) + 0);
}
