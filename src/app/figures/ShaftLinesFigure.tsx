/** Bending moment (full, hatched down to its base line) and deflection (dashed) of a shaft, under its section and on the same stations. */
import { area, line } from 'd3-shape';
import type { BeamLines } from '../../mechanics/beamLines.ts';

export interface ShaftLinesFigureProps {
  readonly lines: BeamLines;
  /** px of a station in m. */
  readonly at: (station: number) => number;
  readonly top: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  /** Largest values in words, with their units. */
  readonly momentText: string;
  readonly deflectionText: string;
}

export function ShaftLinesFigure(props: ShaftLinesFigureProps) {
  const { lines, at, top, height, left, right } = props;
  const half = height / 2;
  const stations = lines.station.map((_, k) => k);
  const most = (values: readonly number[]) => Math.max(...values.map(Math.abs), Number.MIN_VALUE);
  const momentBase = top + half - 4;
  const bendBase = top + half + 14;
  const up = (half - 12) / most(lines.moment);
  const down = (half - 22) / most(lines.deflection);
  const moment = area<number>()
    .x((k) => at(lines.station[k]!))
    .y0(momentBase)
    .y1((k) => momentBase - lines.moment[k]! * up);
  const bent = line<number>()
    .x((k) => at(lines.station[k]!))
    .y((k) => bendBase + lines.deflection[k]! * down);
  return (
    <g className="shaft-lines">
      <line x1={left} x2={right} y1={momentBase} y2={momentBase} className="thin-line" />
      <path d={moment(stations) ?? ''} className="moment-line" />
      <line x1={left} x2={right} y1={bendBase} y2={bendBase} className="centre-line" />
      <path d={bent(stations) ?? ''} className="bent-line" />
      <text x={right + 8} y={momentBase - 2}>
        {props.momentText}
      </text>
      <text x={right + 8} y={bendBase + 12}>
        {props.deflectionText}
      </text>
    </g>
  );
}
