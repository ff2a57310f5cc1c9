/** A number with its unit, typed in any unit the sheet knows (`3.5 in` in a millimetre field), stepped with the arrow keys. */
import { type KeyboardEvent, useEffect, useId, useRef, useState } from 'react';
import { entryFaultText, parseEntry } from '../../units/entry.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { fromSI, toSI } from '../../units/unit.ts';
import { useView } from '../store/viewStore.ts';
import { FieldFrame, faultId } from './FieldFrame.tsx';

export interface QuantityFieldProps {
  readonly label: string;
  /** The label stands in the drawing already; it is kept for screen readers. */
  readonly quiet?: boolean;
  /** SI, or rad. */
  readonly value: number;
  readonly quantity: 'length' | 'angle';
  /** One arrow key, in the field's unit; Shift ten of them, Alt a tenth. */
  readonly step: number;
  readonly decimals?: number;
  readonly min?: number;
  readonly max?: number;
  readonly disabled?: boolean;
  /** Takes the new value (SI); a sentence back refuses it. */
  readonly onChange: (value: number) => string | null;
}

export function QuantityField(props: QuantityFieldProps) {
  const { label, quiet = false, value, quantity, step, decimals = 2, onChange } = props;
  const unit = SHOWN_UNITS[useView((state) => state.units)][quantity];
  const digits = unit === 'in' ? decimals + 2 : decimals;
  const shown = tidy(fromSI(value, unit), digits);
  const [typed, setTyped] = useState<string | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const input = useRef<HTMLInputElement>(null);
  const id = useId();

  // A value that changes from outside (undo, a drag on the stage) replaces what was refused, never what is being typed.
  // biome-ignore lint/correctness/useExhaustiveDependencies: only a new value or unit clears the fault
  useEffect(() => {
    if (document.activeElement !== input.current) setTyped(null);
    setFault(null);
  }, [value, unit]);

  const take = (next: number): boolean => {
    const refused = onChange(toSI(next, unit));
    setFault(refused);
    return refused === null;
  };

  const commit = () => {
    if (typed === null) return;
    if (typed.trim() === shown) {
      setTyped(null);
      setFault(null);
      return;
    }
    const entry = parseEntry(typed, unit === '°' ? 'deg' : unit);
    if (!entry.ok) setFault(entryFaultText(entry.fault));
    else if (take(entry.value)) setTyped(null);
  };

  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'Enter') commit();
    else if (event.key === 'Escape') {
      setTyped(null);
      setFault(null);
    } else if (event.key === 'ArrowUp' || event.key === 'ArrowDown') {
      event.preventDefault();
      const size = step * (event.shiftKey ? 10 : event.altKey ? 0.1 : 1);
      const from = fromSI(value, unit);
      setTyped(null);
      take(tidyNumber(from + (event.key === 'ArrowUp' ? size : -size)));
    }
  };

  return (
    <FieldFrame id={id} label={label} quiet={quiet} unit={unit} fault={fault}>
      <input
        ref={input}
        id={id}
        type="text"
        role="spinbutton"
        inputMode="decimal"
        autoComplete="off"
        spellCheck={false}
        value={typed ?? shown}
        disabled={props.disabled}
        aria-valuenow={Number(shown)}
        aria-valuetext={`${shown} ${unit}`}
        aria-valuemin={props.min === undefined ? undefined : Number(tidy(fromSI(props.min, unit), digits))}
        aria-valuemax={props.max === undefined ? undefined : Number(tidy(fromSI(props.max, unit), digits))}
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

/** At most so many decimals, without trailing zeros. */
function tidy(value: number, decimals: number): string {
  return String(Number(value.toFixed(decimals)) + 0);
}

function tidyNumber(value: number): number {
  return Number(value.toFixed(9)) + 0;
}
