/** Where the load comes in and where it goes: what the case puts on the tip, and the ground. */
import type { LoadCase } from '../../arm/arm.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { useView } from '../store/viewStore.ts';
import { shownQuantity } from './shownNumber.ts';

export function TipCell({ sheet }: { sheet: ArmOnSheet }) {
  const units = useView((state) => state.units);
  const name = useView((state) => state.case);
  const load = sheet.arm.cases.find((each) => each.name === name) ?? sheet.arm.cases[0]!;
  return (
    <li className="path-end tip-end">
      <span className="cell-name">Tip</span>
      <svg width="42" height="74" viewBox="0 0 42 74" aria-hidden="true" focusable="false">
        <path d="M42 37H22" className="thick-line" />
        <circle cx="17" cy="37" r="5" className="cut-ground thick-line" />
        {load.payload && <path d="M17 42V56M9 56h16v12H9Z" className="thick-line" />}
        {load.tipForce && <path d="M2 20L12 31M12 31l-1-5.5M12 31l-5.4-1.4" className="thick-line" />}
      </svg>
      <span className="end-lines">
        {tipLines(load, units).map((line) => (
          <span key={line}>{line}</span>
        ))}
      </span>
    </li>
  );
}

function tipLines(load: LoadCase, units: 'metric' | 'inch'): string[] {
  const lines: string[] = [];
  if (load.payload) lines.push(shownQuantity(load.payload.mass, 'mass', units));
  if (load.tipForce) {
    const where = load.tipForce.direction === 'any' ? 'any way' : `in ${load.tipForce.direction}`;
    lines.push(shownQuantity(load.tipForce.magnitude, 'force', units), where);
  }
  if (load.motion) lines.push('in motion');
  if (load.factor !== 1) lines.push(`× ${load.factor}`);
  return lines.length > 0 ? lines : ['own weight'];
}

export function GroundCell() {
  return (
    <li className="path-end ground-end">
      <span className="cell-name">Ground</span>
      <svg width="26" height="74" viewBox="0 0 26 74" aria-hidden="true" focusable="false">
        <rect x="2" y="4" width="22" height="66" style={{ fill: 'url(#hatch-ground)' }} />
        <line x1="2" x2="2" y1="4" y2="70" className="thick-line" />
      </svg>
    </li>
  );
}
