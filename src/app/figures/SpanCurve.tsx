/** Worst radial load of the harder bearing against span, for the clevis (full line) and the cantilever (dashed). */
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { SHOWN_UNITS, type UnitSystem } from '../../units/format.ts';
import { fromSI } from '../../units/unit.ts';

export interface SpanPoint {
  /** m and N. */
  readonly span: number;
  readonly clevis: number;
  readonly cantilever: number;
}

export interface SpanCurveProps {
  readonly points: readonly SpanPoint[];
  /** Spans of the two layouts shown, m. */
  readonly clevisSpan: number;
  readonly cantileverSpan: number;
  readonly width: number;
  readonly height: number;
  readonly units: UnitSystem;
}

const EDGE = { left: 46, right: 84, top: 14, bottom: 32 } as const;

export function SpanCurve({ points, clevisSpan, cantileverSpan, width, height, units }: SpanCurveProps) {
  const lengthUnit = SHOWN_UNITS[units].length;
  const forceUnit = SHOWN_UNITS[units].force;
  const shown = points.map((point) => ({
    span: fromSI(point.span, lengthUnit),
    clevis: fromSI(point.clevis, forceUnit),
    cantilever: fromSI(point.cantilever, forceUnit),
  }));
  const finite = shown.flatMap((point) => [point.clevis, point.cantilever]).filter(Number.isFinite);
  if (shown.length < 2 || finite.length === 0) return null;
  const x = scaleLinear()
    .domain([0, shown.at(-1)!.span])
    .range([EDGE.left, width - EDGE.right]);
  const y = scaleLinear()
    .domain([0, Math.max(...finite) * 1.04])
    .nice(4)
    .range([height - EDGE.bottom, EDGE.top]);
  const curve = (key: 'clevis' | 'cantilever') =>
    line<(typeof shown)[number]>()
      .defined((point) => Number.isFinite(point[key]))
      .x((point) => x(point.span))
      .y((point) => y(point[key]))(shown) ?? '';
  const ends = spread(y(shown.at(-1)!.clevis), y(shown.at(-1)!.cantilever));
  const crossing = breakEven(shown);
  return (
    <svg
      className="span-curve"
      width={width}
      height={height}
      role="img"
      aria-label={curveText(shown, crossing, lengthUnit)}
    >
      {y.ticks(4).map((tick) => (
        <g key={tick}>
          <line x1={EDGE.left} x2={width - EDGE.right} y1={y(tick)} y2={y(tick)} className="rule-line" />
          <text x={EDGE.left - 6} y={y(tick) + 4} textAnchor="end">
            {tick}
          </text>
        </g>
      ))}
      {x.ticks(5).map((tick) => (
        <g key={tick}>
          <line
            x1={x(tick)}
            x2={x(tick)}
            y1={height - EDGE.bottom}
            y2={height - EDGE.bottom + 4}
            className="thin-line"
          />
          <text x={x(tick)} y={height - EDGE.bottom + 16} textAnchor="middle">
            {tick}
          </text>
        </g>
      ))}
      <line x1={EDGE.left} x2={width - EDGE.right} y1={y(0)} y2={y(0)} className="thin-line" />
      <text x={width - EDGE.right} y={height - 3} textAnchor="end">
        span, {lengthUnit}
      </text>
      <text x={2} y={EDGE.top - 3}>
        {forceUnit}
      </text>
      <path d={curve('clevis')} className="curve" />
      <path d={curve('cantilever')} className="curve dashed" />
      <text x={width - EDGE.right + 6} y={ends[0] + 4}>
        clevis
      </text>
      <text x={width - EDGE.right + 6} y={ends[1] + 4}>
        cantilever
      </text>
      <Mark points={shown} of="clevis" span={fromSI(clevisSpan, lengthUnit)} x={x} y={y} />
      <Mark points={shown} of="cantilever" span={fromSI(cantileverSpan, lengthUnit)} x={x} y={y} />
      {crossing && (
        <g className="crossing">
          <line x1={x(crossing.span)} x2={x(crossing.span)} y1={y(crossing.load)} y2={y(0)} />
          <text x={x(crossing.span) + 5} y={y(0) - 5}>
            even at about {Number(crossing.span.toPrecision(2))}
          </text>
        </g>
      )}
    </svg>
  );
}

type Shown = { readonly span: number; readonly clevis: number; readonly cantilever: number };

interface MarkProps {
  readonly points: readonly Shown[];
  readonly of: 'clevis' | 'cantilever';
  readonly span: number;
  readonly x: (value: number) => number;
  readonly y: (value: number) => number;
}

function Mark({ points, of, span, x, y }: MarkProps) {
  const at = points.find((point) => Math.abs(point.span - span) <= 1e-9 * Math.abs(span));
  if (!at || !Number.isFinite(at[of])) return null;
  return <circle cx={x(at.span)} cy={y(at[of])} r="4.5" className={of === 'clevis' ? 'mark' : 'mark open'} />;
}

/** The first span where the lines cross, read off between two points of the curve. */
function breakEven(points: readonly Shown[]): { span: number; load: number } | null {
  for (let k = 1; k < points.length; k++) {
    const a = points[k - 1]!;
    const b = points[k]!;
    const before = a.clevis - a.cantilever;
    const after = b.clevis - b.cantilever;
    if (before * after < 0) {
      const t = before / (before - after);
      return { span: a.span + t * (b.span - a.span), load: a.clevis + t * (b.clevis - a.clevis) };
    }
  }
  return null;
}

/** Two labels, at least a line apart. */
function spread(a: number, b: number): readonly [number, number] {
  const gap = 14;
  if (Math.abs(a - b) >= gap) return [a, b];
  const middle = (a + b) / 2;
  return a <= b ? [middle - gap / 2, middle + gap / 2] : [middle + gap / 2, middle - gap / 2];
}

function curveText(points: readonly Shown[], crossing: { span: number } | null, unit: string): string {
  const first = points[0]!;
  const last = points.at(-1)!;
  const way = (key: 'clevis' | 'cantilever') =>
    `${key} from ${first[key].toPrecision(3)} at ${first.span} to ${last[key].toPrecision(3)} at ${last.span} ${unit}`;
  const even = crossing ? `; even at about ${crossing.span.toPrecision(2)} ${unit}` : '; the lines do not cross';
  return `Worst radial load against span: ${way('clevis')}, ${way('cantilever')}${even}`;
}
