/** Edits of one joint's support in the arm file, in millimetres as the file has them. */
import type { ArmFile, BearingFile, JointFile, SupportFile } from '../../arm/armFile.ts';
import { withBearings } from '../../arm/withBearings.ts';

function withJoint(file: ArmFile, index: number, change: (joint: JointFile) => JointFile): ArmFile {
  return { ...file, joints: file.joints.map((joint, k) => (k === index ? change(joint) : joint)) };
}

/** A number typed or dragged is kept to a tenth of a micrometre, so that the file stays readable. */
function tidy(mm: number): number {
  return Math.round(mm * 1e4) / 1e4;
}

export type SupportLength = 'span_mm' | 'overhang_mm' | 'offset_mm' | 'hub_mm';

export function withSupportLength(file: ArmFile, index: number, key: SupportLength, mm: number): ArmFile {
  return withJoint(file, index, (joint) => {
    if (joint.kind !== 'revolute' || !joint.support) return joint;
    return { ...joint, support: { ...joint.support, [key]: tidy(mm) } as SupportFile };
  });
}

export function withShaftDiameter(file: ArmFile, index: number, mm: number): ArmFile {
  return withJoint(file, index, (joint) => {
    if (joint.kind !== 'revolute' || !joint.support?.shaft) return joint;
    const shaft = { ...joint.support.shaft, diameter_mm: tidy(mm) };
    return { ...joint, support: { ...joint.support, shaft } };
  });
}

/** Another bearing for one place of a joint (null: none named), `entry` put into the table where it is not there yet. */
export function withBearing(
  file: ArmFile,
  index: number,
  place: 'A' | 'B' | 'ring',
  name: string | null,
  entry?: BearingFile,
): ArmFile {
  const known = name !== null && entry && !Object.hasOwn(file.bearings ?? {}, name) ? { [name]: entry } : {};
  return withJoint(withBearings(file, known), index, (joint) => {
    if (joint.kind !== 'revolute' || !joint.support) return joint;
    const { support } = joint;
    if (support.arrangement === 'ring') {
      const { bearing: _, ...rest } = support;
      return { ...joint, support: name === null ? rest : { ...rest, bearing: name } };
    }
    const end = place === 'B' ? 'B' : 'A';
    const { [end]: _, ...others } = support.bearings ?? {};
    const bearings = name === null ? others : { ...support.bearings, [end]: name };
    return { ...joint, support: { ...support, bearings } };
  });
}

/** Another arrangement for the joint, its hub plane, thrust, bearings and shaft as they are. */
export function withArrangement(
  file: ArmFile,
  index: number,
  layout:
    | { readonly arrangement: 'clevis'; readonly span: number; readonly offset: number }
    | {
        readonly arrangement: 'cantilever';
        readonly span: number;
        readonly overhang: number;
        readonly side: '+' | '-';
      },
): ArmFile {
  return withJoint(file, index, (joint) => {
    if (joint.kind !== 'revolute' || !joint.support || joint.support.arrangement === 'ring') return joint;
    const { hub_mm, thrust, adjusted, bearings, shaft } = joint.support;
    const common = {
      hub_mm,
      span_mm: tidy(layout.span),
      thrust,
      ...(adjusted && { adjusted }),
      ...(bearings && { bearings }),
      ...(shaft && { shaft }),
    };
    const support: SupportFile =
      layout.arrangement === 'clevis'
        ? { arrangement: 'clevis', ...common, offset_mm: tidy(layout.offset) }
        : { arrangement: 'cantilever', ...common, overhang_mm: tidy(layout.overhang), side: layout.side };
    return { ...joint, support };
  });
}
