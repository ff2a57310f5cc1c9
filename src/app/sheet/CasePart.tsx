/** A part of a load case that may be left out: its box to tick, and its fields while it is there. */
import type { ReactNode } from 'react';

export interface CasePartFrameProps {
  readonly title: string;
  readonly there: boolean;
  readonly onChange: (there: boolean) => void;
  readonly children: ReactNode;
}

export function CasePart({ title, there, onChange, children }: CasePartFrameProps) {
  return (
    <fieldset className="case-part">
      <legend>
        <label>
          <input type="checkbox" checked={there} onChange={(event) => onChange(event.target.checked)} /> {title}
        </label>
      </legend>
      {children}
    </fieldset>
  );
}
