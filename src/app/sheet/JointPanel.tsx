/** The selected joint: its drawing, the lengths that can be changed, and what it carries now and at worst. */
import type { Support } from '../../arm/arm.ts';
import { issueText } from '../../arm/issue.ts';
import { type ArmOnSheet, editFile, useArm } from '../store/documentStore.ts';
import { jointLoads, usePoseLoads } from '../store/loads.ts';
import { type SupportLength, withShaftDiameter, withSupportLength } from '../store/supportEdits.ts';
import { useSelectedChainIndex, useView } from '../store/viewStore.ts';
import { GoverningLines } from './GoverningLines.tsx';
import { JointDrawing } from './JointDrawing.tsx';
import { LoadTable } from './LoadTable.tsx';
import { QuantityField } from './QuantityField.tsx';

export function JointPanel() {
  const sheet = useArm();
  const at = useView((state) => state.joint);
  const index = useSelectedChainIndex();
  const pose = usePoseLoads();
  const joint = sheet?.arm.joints[at];
  if (!sheet || !joint || index < 0) return null;
  return (
    <div className="joint-panel">
      <JointDrawing sheet={sheet} joint={at} index={index} loads={jointLoads(pose, joint.name)} />
      <Lengths sheet={sheet} at={at} />
      <GoverningLines sheet={sheet} at={at} />
      <LoadTable sheet={sheet} joints={[index]} pose={pose} />
    </div>
  );
}

function Lengths({ sheet, at }: { sheet: ArmOnSheet; at: number }) {
  const joint = sheet.arm.joints[at]!;
  const { support } = joint;
  if (!support) return null;
  const set = (key: SupportLength) => (value: number) => {
    const issues = editFile((file) => withSupportLength(file, at, key, value * 1000));
    return issues[0] ? issueText(issues[0]) : null;
  };
  const setShaft = (value: number) => {
    const issues = editFile((file) => withShaftDiameter(file, at, value * 1000));
    return issues[0] ? issueText(issues[0]) : null;
  };
  return (
    <fieldset className="lengths" aria-label={`Lengths of ${joint.name}`}>
      {lengthsOf(support).map(({ key, label, value }) => (
        <QuantityField key={key} label={label} value={value} quantity="length" step={1} onChange={set(key)} />
      ))}
      {support.shaft && (
        <QuantityField label="Shaft ⌀" value={support.shaft.diameter} quantity="length" step={1} onChange={setShaft} />
      )}
    </fieldset>
  );
}

function lengthsOf(support: Support): { key: SupportLength; label: string; value: number }[] {
  const hub = { key: 'hub_mm' as const, label: 'Hub', value: support.hub };
  if (support.arrangement === 'ring') return [hub];
  const span = { key: 'span_mm' as const, label: 'Span', value: support.span };
  if (support.arrangement === 'clevis') {
    return [span, { key: 'offset_mm', label: 'Offset', value: support.offset }, hub];
  }
  return [span, { key: 'overhang_mm', label: 'Overhang', value: support.overhang }, hub];
}
