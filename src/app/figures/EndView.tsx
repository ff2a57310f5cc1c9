/** The joint seen along its axis from its positive end: which way each bearing's radial load points in the housing. */
import { Arrow } from './Arrow.tsx';

export interface EndViewProps {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly vectors: readonly { readonly name: string; readonly x: number; readonly y: number }[];
  /** px a N. */
  readonly arrow: number;
}

export function EndView({ x, y, radius, vectors, arrow }: EndViewProps) {
  return (
    <g className="end-view">
      <circle cx={x} cy={y} r={radius * 0.62} className="thin-line" />
      <line x1={x - radius} x2={x + radius} y1={y} y2={y} className="centre-line" />
      <line x1={x} x2={x} y1={y - radius} y2={y + radius} className="centre-line" />
      <text className="drawing-letter" x={x + radius} y={y - 5} textAnchor="end">
        x
      </text>
      <text className="scale-note" x={x} y={y - radius - 16} textAnchor="middle">
        along the axis
      </text>
      {vectors.map(({ name, x: fx, y: fy }) => {
        const dx = fx * arrow;
        const dy = -fy * arrow;
        const length = Math.hypot(dx, dy);
        if (!(length > 1.5)) return null;
        return (
          <g key={name}>
            <Arrow x={x} y={y} dx={dx} dy={dy} />
            <text
              className="drawing-letter letter-ground"
              x={x + dx + (dx / length) * 9}
              y={y + dy + (dy / length) * 9 + 4}
              textAnchor="middle"
            >
              {name}
            </text>
          </g>
        );
      })}
    </g>
  );
}
