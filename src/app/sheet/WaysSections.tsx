/** Clevis and cantilever in section, hub planes level and on one scale. */
import type { PairSupport } from '../../arm/arm.ts';
import type { ComparePlan, Layout } from '../../studies/comparePlan.ts';
import { drawingScale } from '../figures/drawingScale.ts';
import { JointSection } from '../figures/JointSection.tsx';
import { type Box, sectionShape } from '../figures/sectionGeometry.ts';
import { useSize } from '../figures/useSize.ts';
import { type ArmOnSheet, editFile } from '../store/documentStore.ts';
import { withArrangement } from '../store/supportEdits.ts';

export interface WaysSectionsProps {
  readonly sheet: ArmOnSheet;
  readonly at: number;
  readonly plan: ComparePlan;
}

export function WaysSections({ sheet, at, plan }: WaysSectionsProps) {
  const [frame, size] = useSize<HTMLDivElement>();
  const joint = sheet.arm.joints[at]!;
  const shapes = [plan.clevis, plan.cantilever].map((layout) => ({
    layout,
    shape: sectionShape(laidOut(joint.support as PairSupport, layout), joint.drive, sheet.arm.bearings),
  }));
  const across = Math.max(...shapes.map(({ shape }) => shape.bounds.s1 - shape.bounds.s0));
  const up = Math.max(...shapes.map(({ shape }) => shape.bounds.r1 - shape.bounds.r0));
  const width = size ? size.width / 2 : 0;
  const height = size ? size.height : 0;
  const scale = size && drawingScale(across, up, width - 44, height - 36);
  return (
    <div className="ways-sections" ref={frame}>
      {scale &&
        shapes.map(({ layout, shape }) => (
          <figure key={layout.arrangement}>
            <svg
              width={width}
              height={height}
              role="img"
              aria-label={`${layout.arrangement} in section, scale ${scale.text}`}
            >
              <JointSection
                shape={shape}
                view={{ scale: scale.px, ...middle(shape.bounds, scale.px, width, height) }}
              />
              <text className="scale-note" x={width - 8} y={height - 6} textAnchor="end">
                {scale.text}
              </text>
            </svg>
            <figcaption>
              {layout.arrangement}
              {plan.asFile === layout.arrangement ? (
                <span className="as-file"> on the arm</span>
              ) : (
                <button type="button" className="plain-button" onClick={() => takeOver(at, layout)}>
                  Put on the arm
                </button>
              )}
            </figcaption>
          </figure>
        ))}
    </div>
  );
}

function laidOut(support: PairSupport, layout: Layout): PairSupport {
  return { ...support, ...layout };
}

function middle(bounds: Box, scale: number, width: number, height: number) {
  return {
    x: width / 2 - ((bounds.s0 + bounds.s1) / 2) * scale,
    y: (height + 20) / 2 + ((bounds.r0 + bounds.r1) / 2) * scale,
  };
}

function takeOver(at: number, layout: Layout): void {
  editFile((file) =>
    withArrangement(
      file,
      at,
      layout.arrangement === 'clevis'
        ? { arrangement: 'clevis', span: layout.span * 1000, offset: layout.offset * 1000 }
        : {
            arrangement: 'cantilever',
            span: layout.span * 1000,
            overhang: layout.overhang * 1000,
            side: layout.side,
          },
    ),
  );
}
