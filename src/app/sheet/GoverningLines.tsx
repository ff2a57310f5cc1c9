/** Each bearing of a joint and its shaft: what it is, how far it is used, which check governs, and what stays open. */
import type { Joint } from '../../arm/arm.ts';
import { UtilisationBar, utilisationText } from '../figures/UtilisationBar.tsx';
import { heldOf, standing } from '../figures/utilisationScale.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { goToWorst } from '../store/goTo.ts';
import { governed, useGoverning, usePoseRows } from '../store/governing.ts';
import { showPanel } from '../store/viewStore.ts';
import { BearingSelect } from './BearingSelect.tsx';
import { FileWords } from './FileWords.tsx';

type Part = 'A' | 'B' | 'ring' | null;

export function GoverningLines({ sheet, at }: { sheet: ArmOnSheet; at: number }) {
  const joint = sheet.arm.joints[at]!;
  const { support } = joint;
  if (!support) return null;
  const parts: readonly Part[] = support.arrangement === 'ring' ? ['ring', null] : ['A', 'B', null];
  return (
    <ul className="governing-lines" aria-label={`What governs ${joint.name}`}>
      {parts.map((part) => (
        <GoverningLine key={part ?? 'shaft'} sheet={sheet} at={at} part={part} />
      ))}
    </ul>
  );
}

function GoverningLine({ sheet, at, part }: { sheet: ArmOnSheet; at: number; part: Part }) {
  const worst = useGoverning(at, part);
  const now = governed(usePoseRows()).get(`${at} ${part}`);
  const held = heldOf(worst);
  const row = worst?.row;
  const open = worst?.open ?? [];
  return (
    <li>
      <b>{part === null ? 'Shaft' : part === 'ring' ? 'Ring' : part}</b>
      {part === null ? (
        <span className="part-size" title={shaftText(sheet.arm.joints[at]!)}>
          {shaftText(sheet.arm.joints[at]!)}
        </span>
      ) : (
        <BearingSelect sheet={sheet} at={at} place={part} />
      )}
      <UtilisationBar held={held} now={now?.utilisation ?? null} />
      <span className={`used ${standing(held)}`}>{utilisationText(held)}</span>
      <span className="why">
        {row ? (
          <button type="button" className="go" onClick={() => goToWorst(row)}>
            <FileWords text={worst.why} />
          </button>
        ) : (
          <FileWords text={worst?.why ?? 'not swept yet'} />
        )}
      </span>
      {open.length > 0 ? (
        <button type="button" className="go open-count" onClick={() => showPanel('checks')}>
          {open.length} not assessed
        </button>
      ) : (
        <span />
      )}
    </li>
  );
}

function shaftText({ support }: Joint): string {
  const shaft = support?.shaft;
  if (!shaft) return 'no shaft given';
  const bore = shaft.bore > 0 ? ` / ${mm(shaft.bore)}` : '';
  return `⌀ ${mm(shaft.diameter)}${bore} ${shaft.material ?? 'no material'}`;
}

function mm(metres: number): string {
  return String(Number((metres * 1000).toFixed(2)));
}
