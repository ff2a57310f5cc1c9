/** A joint in section on one scale: the thumbnail of the load path, the joint drawing and the two ways all draw it with this. */
import type { BearingName } from '../../studies/results.ts';
import type { BearingBox, Box, SectionShape } from './sectionGeometry.ts';

export interface SectionView {
  /** px a mm. */
  readonly scale: number;
  /** Where s = 0, r = 0 of the section stands, px. */
  readonly x: number;
  readonly y: number;
}

export interface JointSectionProps {
  readonly shape: SectionShape;
  readonly view: SectionView;
  /** Small: finer hatch, no centre marks beyond the shaft. */
  readonly small?: boolean;
  /** Fill of each bearing, such as its utilisation, and a hatch over it; none: paper. */
  readonly fill?: (name: BearingName) => { readonly fill: string; readonly over: string | null };
  readonly chosen?: BearingName | null;
}

export function JointSection({ shape, view, small = false, fill, chosen = null }: JointSectionProps) {
  const size = small ? '-small' : '';
  return (
    <g className={small ? 'section small' : 'section'}>
      {shape.housing.map((box) => (
        <CutBox key={boxKey('h', box)} box={box} view={view} hatch={`url(#hatch-housing${size})`} />
      ))}
      {shape.hub.map((box) => (
        <CutBox key={boxKey('k', box)} box={box} view={view} hatch={`url(#hatch-link${size})`} />
      ))}
      {shape.drive && <DriveShape drive={shape.drive} view={view} />}
      <ShaftShape shape={shape} view={view} />
      {shape.bearings.map((box) => (
        <BearingShape
          key={box.name}
          box={box}
          view={view}
          look={fill?.(box.name) ?? { fill: 'var(--paper)', over: null }}
          chosen={chosen === box.name}
        />
      ))}
      <CentreLine shape={shape} view={view} reach={small ? 4 : 14} />
    </g>
  );
}

function boxKey(kind: string, box: Box): string {
  return `${kind}${box.s0}:${box.r0}:${box.s1}`;
}

function rect(box: Box, { scale, x, y }: SectionView) {
  return {
    x: x + box.s0 * scale,
    y: y - box.r1 * scale,
    width: Math.max(0, (box.s1 - box.s0) * scale),
    height: Math.max(0, (box.r1 - box.r0) * scale),
  };
}

function CutBox({ box, view, hatch }: { box: Box; view: SectionView; hatch: string }) {
  const at = rect(box, view);
  return (
    <g>
      <rect {...at} className="cut-ground" />
      <rect {...at} className="cut" style={{ fill: hatch }} />
    </g>
  );
}

function ShaftShape({ shape, view }: { shape: SectionShape; view: SectionView }) {
  const kind = shape.shaftNominal ? 'shaft nominal' : 'shaft';
  return (
    <g>
      {shape.shaft.map((part) => (
        <g key={part.s0}>
          <rect {...rect({ s0: part.s0, s1: part.s1, r0: -part.radius, r1: part.radius }, view)} className={kind} />
          {part.bore > 0 && (
            <rect {...rect({ s0: part.s0, s1: part.s1, r0: -part.bore, r1: part.bore }, view)} className="shaft-bore" />
          )}
        </g>
      ))}
    </g>
  );
}

interface BearingShapeProps {
  readonly box: BearingBox;
  readonly view: SectionView;
  readonly look: { readonly fill: string; readonly over: string | null };
  readonly chosen: boolean;
}

function BearingShape({ box, view, look, chosen }: BearingShapeProps) {
  const s0 = box.station - box.width / 2;
  const s1 = box.station + box.width / 2;
  const kind = `bearing${box.nominal ? ' nominal' : ''}${chosen ? ' chosen' : ''}`;
  return (
    <g className={kind}>
      {[1, -1].map((sign) => {
        const r = [(sign * box.bore) / 2, (sign * box.outer) / 2];
        const at = rect({ s0, s1, r0: Math.min(...r), r1: Math.max(...r) }, view);
        const { x, y, width, height } = at;
        return (
          <g key={sign}>
            <rect {...at} className="cut-ground" />
            <rect {...at} className="bearing-box" style={{ fill: look.fill }} />
            {look.over && <rect {...at} style={{ fill: look.over }} />}
            {box.plain ? (
              <rect {...at} style={{ fill: 'url(#hatch-bushing)' }} />
            ) : (
              <path
                d={`M${x} ${y}l${width} ${height}M${x + width} ${y}l${-width} ${height}`}
                className="bearing-cross"
              />
            )}
          </g>
        );
      })}
    </g>
  );
}

function DriveShape({ drive, view }: { drive: NonNullable<SectionShape['drive']>; view: SectionView }) {
  const { box, radius, kind } = drive;
  const { scale, x, y } = view;
  const x0 = x + box.s0 * scale;
  const x1 = x + box.s1 * scale;
  return (
    <g className="drive">
      <rect {...rect({ ...box, r0: -box.r1 }, view)} className="drive-body" />
      {[radius, -radius].map((r) => (
        <line
          key={r}
          x1={x0 - 4}
          x2={x1 + 4}
          y1={y - r * scale}
          y2={y - r * scale}
          className={kind === 'gear' ? 'centre-line' : 'thin-line'}
        />
      ))}
    </g>
  );
}

function CentreLine({ shape, view, reach }: { shape: SectionShape; view: SectionView; reach: number }) {
  const { scale, x, y } = view;
  return (
    <line
      x1={x + shape.bounds.s0 * scale - reach}
      x2={x + shape.bounds.s1 * scale + reach}
      y1={y}
      y2={y}
      className="centre-line"
    />
  );
}
