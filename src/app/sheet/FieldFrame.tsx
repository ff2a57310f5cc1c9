/** What stands round a typed value: its label, its unit, and why it was refused. */
import type { ReactNode } from 'react';

export interface FieldFrameProps {
  readonly id: string;
  readonly label: string;
  /** The label stands beside it already; it is kept for screen readers. */
  readonly quiet: boolean;
  readonly unit: string;
  readonly fault: string | null;
  /** The input; described by `faultId(id)` where it was refused. */
  readonly children: ReactNode;
}

export const faultId = (id: string) => `${id}-fault`;

export function FieldFrame({ id, label, quiet, unit, fault, children }: FieldFrameProps) {
  return (
    <span className={fault ? 'quantity refused' : 'quantity'}>
      <label htmlFor={id} className={quiet ? 'for-readers' : undefined}>
        {label}
      </label>
      <span className="quantity-box">
        {children}
        <span className="unit" aria-hidden="true">
          {unit}
        </span>
      </span>
      {fault && (
        <span id={faultId(id)} className="fault" role="alert">
          {fault}
        </span>
      )}
    </span>
  );
}
