/** Loads of the pose on stage on a joint drawing, as arrows on the bearings. */
import { rotateBack3 } from '../../math/vector.ts';
import type { PoseJoint } from '../../studies/results.ts';
import { Arrow } from '../figures/Arrow.tsx';
import type { SectionView } from '../figures/JointSection.tsx';
import type { SectionShape } from '../figures/sectionGeometry.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';

export interface PlaneVector {
  readonly name: string;
  readonly x: number;
  readonly y: number;
}

/** Radial loads on the bearings in the plane square to the axis, N; x is the housing's reference direction. */
export function planeVectors(sheet: ArmOnSheet, index: number, loads: PoseJoint | undefined): PlaneVector[] {
  const out = new Float64Array(3);
  return (['A', 'B', 'ring'] as const).flatMap((name) => {
    const load = loads?.bearings[name];
    if (!load) return [];
    rotateBack3(out, 0, sheet.chain.housing, 9 * index, load.radialVector, 0);
    return [{ name, x: out[0]!, y: out[1]! }];
  });
}

interface PoseArrowsProps {
  readonly sheet: ArmOnSheet;
  readonly index: number;
  readonly shape: SectionShape;
  readonly view: SectionView;
  readonly loads: PoseJoint | undefined;
  /** px a N. */
  readonly arrow: number;
}

/** Loads on the bearings, drawn in the plane of the larger one, which points down. */
export function PoseArrows({ sheet, index, shape, view, loads, arrow }: PoseArrowsProps) {
  const vectors = planeVectors(sheet, index, loads);
  const main = vectors.reduce<PlaneVector | null>(
    (best, each) => (!best || Math.hypot(each.x, each.y) > Math.hypot(best.x, best.y) ? each : best),
    null,
  );
  const size = main ? Math.hypot(main.x, main.y) : 0;
  if (!main || !(size > 0)) return null;
  return (
    <g>
      {shape.bearings.map((box) => {
        const vector = vectors.find((each) => each.name === box.name);
        const load = loads?.bearings[box.name];
        if (!vector || !load) return null;
        const along = (vector.x * main.x + vector.y * main.y) / size;
        const x = view.x + box.station * view.scale;
        return (
          <g key={box.name}>
            <Arrow x={x} y={view.y} dx={0} dy={along * arrow} />
            <Arrow x={x} y={view.y} dx={load.axial * arrow} dy={0} />
          </g>
        );
      })}
    </g>
  );
}
