/** A field over two angles: isolines with their values, and where there is a limit its utilisation in the sheet's own scale. */
import { contours } from 'd3-contour';
import { scaleLinear } from 'd3-scale';
import type { PoseMap } from '../store/poseMap.ts';
import type { SheetTone } from './utilisationScale.ts';
import { utilisationColour } from './utilisationScale.ts';

export interface ContourFieldProps {
  readonly map: PoseMap;
  /** Ends of both sides, rad. */
  readonly across: readonly [number, number];
  readonly up: readonly [number, number];
  readonly acrossName: string;
  readonly upName: string;
  readonly allowable: number | null;
  /** From SI to the numbers on the isolines. */
  readonly shown: (value: number) => number;
  readonly here: readonly [number, number];
  readonly tone: SheetTone;
  readonly width: number;
  readonly height: number;
  readonly title: string;
  readonly onGo: (across: number, up: number) => void;
}

const EDGE = { left: 58, right: 14, top: 10, bottom: 40 } as const;
const DEG = 180 / Math.PI;

export function ContourField(props: ContourFieldProps) {
  const { map, across, up, allowable, here, tone, width, height } = props;
  const { columns, rows, values } = map;
  const room = { x: width - EDGE.left - EDGE.right, y: height - EDGE.top - EDGE.bottom };
  const x = scaleLinear()
    .domain(across)
    .range([EDGE.left, EDGE.left + room.x]);
  const y = scaleLinear()
    .domain(up)
    .range([EDGE.top + room.y, EDGE.top]);
  const finite = [...values].filter(Number.isFinite);
  const most = Math.max(...finite);
  const least = Math.min(...finite);
  // What differs by rounding alone is the same everywhere.
  const flat = !(most - least > 1e-9 * Math.max(Math.abs(most), Math.abs(least)));
  const levels = flat
    ? []
    : scaleLinear()
        .domain([props.shown(least), props.shown(most)])
        .ticks(8);
  const unit = props.shown(1) - props.shown(0);
  // A contour's grid has its values in the middle of cells: half a cell is taken off at each side.
  const place = ([cx, cy]: readonly number[]): readonly [number, number] => [
    EDGE.left + ((cx! - 0.5) / (columns - 1)) * room.x,
    EDGE.top + room.y - ((cy! - 0.5) / (rows - 1)) * room.y,
  ];
  const path = (ring: readonly (readonly number[])[]) =>
    `M${ring
      .map((point) =>
        place(point)
          .map((v) => v.toFixed(1))
          .join(' '),
      )
      .join('L')}Z`;
  const field = contours().size([columns, rows]);
  const shape = (level: number) =>
    field
      .contour([...values], level)
      .coordinates.flatMap((polygon) => polygon.map(path))
      .join('');
  const bands = allowable ? Array.from({ length: 12 }, (_, k) => k / 12) : [];
  const numbers: { level: number; at: readonly [number, number] }[] = [];
  levels.forEach((level, k) => {
    const share = (k + 1) / (levels.length + 1);
    const point = labelPlace(field.contour([...values], level / unit).coordinates, columns, rows, share);
    const at = point && place(point);
    const free = numbers.every(({ at: [px, py] }) => at && Math.hypot(at[0] - px, (at[1] - py) * 2) > 38);
    if (at && free) numbers.push({ level, at });
  });
  const go = (event: React.MouseEvent<SVGRectElement>) => {
    const box = event.currentTarget.ownerSVGElement!.getBoundingClientRect();
    props.onGo(x.invert(event.clientX - box.left), y.invert(event.clientY - box.top));
  };
  return (
    <svg className="contour-field" width={width} height={height} role="img" aria-label={props.title}>
      <clipPath id="field-room">
        <rect x={EDGE.left} y={EDGE.top} width={room.x} height={room.y} />
      </clipPath>
      <g clipPath="url(#field-room)">
        {allowable !== null &&
          bands.map((u) => (
            <path
              key={u}
              d={shape(u * allowable || Math.min(least, 0) - 1)}
              fill={utilisationColour(u + 1 / 24, tone)}
              fillRule="evenodd"
            />
          ))}
        {allowable !== null && most > allowable && (
          <path d={shape(allowable)} style={{ fill: 'url(#hatch-over)' }} fillRule="evenodd" />
        )}
        {levels.map((level) => (
          <path key={level} d={shape(level / unit)} className="isoline" />
        ))}
        {allowable !== null && <path d={shape(allowable)} className="isoline limit" />}
      </g>
      {numbers.map(({ level, at: [px, py] }) => (
        <text key={level} x={px} y={py + 4} textAnchor="middle" className="letter-ground iso-number">
          {level}
        </text>
      ))}
      {flat && (
        <text
          x={EDGE.left + room.x / 2}
          y={EDGE.top + room.y / 2}
          textAnchor="middle"
          className="letter-ground flat-field"
        >
          the same in all these poses: {Number(props.shown(most).toPrecision(4))}
        </text>
      )}
      {/* biome-ignore lint/a11y/noStaticElementInteractions: a short way for the mouse; the number fields of the joints serve the keyboard */}
      <rect x={EDGE.left} y={EDGE.top} width={room.x} height={room.y} className="field-frame" onClick={go} />
      {degreeTicks(across, 7).map((tick) => (
        <text key={tick} x={x(tick / DEG)} y={EDGE.top + room.y + 15} textAnchor="middle">
          {tick}
        </text>
      ))}
      {degreeTicks(up, 6).map((tick) => (
        <text key={tick} x={EDGE.left - 6} y={y(tick / DEG) + 4} textAnchor="end">
          {tick}
        </text>
      ))}
      <text x={EDGE.left + room.x} y={height - 6} textAnchor="end">
        {props.acrossName}, °
      </text>
      <text transform={`translate(12 ${EDGE.top}) rotate(-90)`} textAnchor="end">
        {props.upName}, °
      </text>
      <g className="here" transform={`translate(${x(here[0])} ${y(here[1])})`}>
        <circle r="6" />
        <path d="M-11 0H11M0 -11V11" />
      </g>
    </svg>
  );
}

function degreeTicks([from, to]: readonly [number, number], count: number): number[] {
  return scaleLinear()
    .domain([from * DEG, to * DEG])
    .ticks(count);
}

/** A point of the longest ring, away from the edges of the field; null where a line lies at the edge alone. */
function labelPlace(
  polygons: readonly number[][][][],
  columns: number,
  rows: number,
  share: number,
): readonly [number, number] | null {
  const ring = polygons.flat().reduce<number[][]>((longest, one) => (one.length > longest.length ? one : longest), []);
  const inside = ring.filter(([cx, cy]) => cx! > 3 && cx! < columns - 3 && cy! > 3 && cy! < rows - 3);
  const point = inside[Math.floor(inside.length * share)];
  return point ? [point[0]!, point[1]!] : null;
}
