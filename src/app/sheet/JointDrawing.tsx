/** The joint in section at a stated scale, with the loads of the pose on stage; span, overhang and offset can be dragged. */
import { useMemo } from 'react';
import type { Support } from '../../arm/arm.ts';
import type { BeamLines } from '../../mechanics/beamLines.ts';
import type { PoseJoint } from '../../studies/results.ts';
import { Arrow } from '../figures/Arrow.tsx';
import { drawingScale, roundDown } from '../figures/drawingScale.ts';
import { EndView } from '../figures/EndView.tsx';
import { JointSection, type SectionView } from '../figures/JointSection.tsx';
import { ShaftLinesFigure } from '../figures/ShaftLinesFigure.tsx';
import { type SectionShape, sectionShape } from '../figures/sectionGeometry.ts';
import { useSize } from '../figures/useSize.ts';
import { heldOf, standingFill } from '../figures/utilisationScale.ts';
import { type ArmOnSheet, armOf, useDocument } from '../store/documentStore.ts';
import { shaftLinesAt } from '../store/engine.ts';
import { governingOf, usePoseRows } from '../store/governing.ts';
import { rowOf } from '../store/sweepStore.ts';
import { useTone } from '../store/tone.ts';
import { useView } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { PairDimensions } from './PairDimensions.tsx';
import { PoseArrows, planeVectors } from './PoseArrows.tsx';
import { shownQuantity } from './shownNumber.ts';

export interface JointDrawingProps {
  readonly sheet: ArmOnSheet;
  /** Index into the arm file's joints, and into the chain. */
  readonly joint: number;
  readonly index: number;
  readonly loads: PoseJoint | undefined;
}

/** Longest arrow of a worst load, px, the room the end view takes, and that of the shaft's lines. */
const ARROW = 54;
const END = 128;
const LINES = 84;
/** A second dimension line under the first. */
const OFFSET = 18;

export function JointDrawing(props: JointDrawingProps) {
  const { name, support } = props.sheet.arm.joints[props.joint]!;
  if (!support) return <p className="panel-note">{name} has no support in the file: its joint load alone is known.</p>;
  return <SupportedDrawing {...props} support={support} />;
}

function SupportedDrawing({
  sheet,
  joint: at,
  index,
  loads,
  support,
}: JointDrawingProps & { readonly support: Support }) {
  const [frame, size] = useSize<HTMLDivElement>();
  const settled = useDocument((state) => state.file);
  const rows = useWorst((state) => state.rows);
  const units = useView((state) => state.units);
  const chosen = useView((state) => state.bearing);
  const tone = useTone();
  const joint = sheet.arm.joints[at]!;
  const shape = sectionShape(support, joint.drive, sheet.arm.bearings);
  // The scale is that of the settled arm, so that the drawing does not run away under a drag.
  const steady = settled ? armOf(settled).arm.joints[at] : undefined;
  const bounds = steady?.support ? sectionShape(steady.support, steady.drive, sheet.arm.bearings).bounds : shape.bounds;
  const largest = Math.max(
    ...shape.bearings.flatMap(({ name }) => [
      rowOf(rows, at, name, 'radial')?.value ?? 0,
      loads?.bearings[name]?.radial ?? 0,
    ]),
  );
  const bent = useShaftLines(sheet, at, index);
  const offset = support.arrangement === 'clevis' && support.offset !== 0 ? OFFSET : 0;
  const height = size ? size.height - (bent ? LINES : 0) - offset : 0;
  const newton = roundDown(largest * 0.6);
  const arrow = largest > 0 ? ARROW / largest : 0;
  const scale = size && drawingScale(bounds.s1 - bounds.s0, bounds.r1 - bounds.r0, size.width - END - 76, height - 54);
  const view = size && scale && placed(bounds, scale.px, size.width - END, height);
  const title = `Section of ${joint.name} along its axis, ${support.arrangement}, scale ${scale?.text ?? ''}`;
  return (
    <div className="joint-drawing" ref={frame}>
      {size && scale && view && (
        <svg width={size.width} height={size.height} role="img" aria-label={title}>
          <JointSection
            shape={shape}
            view={view}
            chosen={chosen}
            fill={(name) => standingFill(heldOf(governingOf(rows, at, name)), tone)}
          />
          <HubPlane shape={shape} view={view} />
          {support.arrangement !== 'ring' && <PairDimensions at={at} support={support} shape={shape} view={view} />}
          <BearingLetters shape={shape} view={view} />
          <PoseArrows sheet={sheet} index={index} shape={shape} view={view} loads={loads} arrow={arrow} />
          {bent && <BentShaft lines={bent} view={view} top={height + offset} room={LINES} shape={shape} />}
          <EndView
            x={size.width - END / 2 - 2}
            y={Math.max(END / 2 + 22, (height - 20) / 2)}
            radius={END / 2 - 8}
            vectors={planeVectors(sheet, index, loads)}
            arrow={arrow}
          />
          <g className="scale-note" transform={`translate(${size.width - END + 8} ${height - 10})`}>
            <Arrow x={0} y={-13} dx={newton * arrow} dy={0} />
            <text>{shownQuantity(newton, 'force', units, 1)}</text>
            <text x={END - 14} textAnchor="end">
              scale {scale.text}
            </text>
          </g>
        </svg>
      )}
    </div>
  );
}

function placed(bounds: SectionShape['bounds'], px: number, width: number, height: number): SectionView {
  const across = (bounds.s0 + bounds.s1) / 2;
  const up = (bounds.r0 + bounds.r1) / 2;
  return { scale: px, x: (width - 8) / 2 - across * px, y: (height - 36) / 2 + up * px };
}

interface BentShaftProps {
  readonly lines: BeamLines;
  readonly view: SectionView;
  readonly shape: SectionShape;
  readonly top: number;
  readonly room: number;
}

function BentShaft({ lines, view, shape, top, room }: BentShaftProps) {
  const units = useView((state) => state.units);
  const px = (station: number) => view.x + station * 1000 * view.scale;
  return (
    <ShaftLinesFigure
      lines={lines}
      at={px}
      top={top - 14}
      height={room + 6}
      left={px(shape.bounds.s0 / 1000)}
      right={px(shape.bounds.s1 / 1000)}
      momentText={`bending ${shownQuantity(Math.max(...lines.moment), 'moment', units)}`}
      deflectionText={`bent by ${shownQuantity(Math.max(...lines.deflection), 'clearance', units)}`}
    />
  );
}

/** The shaft's lines under the load that strains it most at the pose on stage; null where no shaft is known. */
function useShaftLines(sheet: ArmOnSheet, at: number, index: number): BeamLines | null {
  const row = usePoseRows().find((each) => each.jointIndex === at && each.check === 'stress');
  return useMemo(() => (row ? shaftLinesAt(sheet.arm, sheet.chain, index, row) : null), [sheet, index, row]);
}

function HubPlane({ shape, view }: { shape: SectionShape; view: SectionView }) {
  const x = view.x + shape.hubPlane * view.scale;
  return (
    <g>
      <line
        x1={x}
        x2={x}
        y1={view.y - shape.bounds.r1 * view.scale - 6}
        y2={view.y - shape.bounds.r0 * view.scale + 6}
        className="centre-line"
      />
      <text className="drawing-letter" x={x + 4} y={view.y - shape.bounds.r1 * view.scale + 2}>
        hub
      </text>
    </g>
  );
}

function BearingLetters({ shape, view }: { shape: SectionShape; view: SectionView }) {
  return (
    <g className="drawing-letter">
      {shape.bearings.map((box) => (
        <text
          key={box.name}
          x={view.x + box.station * view.scale}
          y={view.y - (box.outer / 2) * view.scale - 7}
          textAnchor="middle"
          className="letter-ground"
        >
          {box.name === 'ring' ? 'ring' : box.name}
        </text>
      ))}
    </g>
  );
}
