/** A dimension along the axis: extension lines, arrowheads, its number; an arrowhead that may be dragged says so. */
import type { PointerEvent } from 'react';

export interface DimensionProps {
  /** px: the two measured points along the drawing, and where the dimension line runs. */
  readonly from: number;
  readonly to: number;
  readonly line: number;
  /** Where the extension lines start. */
  readonly start: number;
  readonly text: string;
  /** Called with the movement in px since the press while an end is dragged, and once when it is let go. */
  readonly onDrag?: (end: 'from' | 'to', moved: number) => void;
  readonly onDrop?: (kept: boolean) => void;
}

const HEAD = 8;

export function Dimension({ from, to, line, start, text, onDrag, onDrop }: DimensionProps) {
  const left = Math.min(from, to);
  const right = Math.max(from, to);
  const narrow = right - left < 3 * HEAD + 8;
  const middle = (left + right) / 2;
  return (
    <g className="dimension">
      {[from, to].map((x, k) => (
        <line key={k === 0 ? 'from' : 'to'} x1={x} x2={x} y1={start} y2={line + 5 * Math.sign(line - start)} />
      ))}
      {narrow ? (
        <line x1={left - 18} x2={right + 18} y1={line} y2={line} />
      ) : (
        <line x1={left} x2={right} y1={line} y2={line} />
      )}
      <Head x={left} y={line} way={narrow ? 1 : -1} />
      <Head x={right} y={line} way={narrow ? -1 : 1} />
      <text x={narrow ? right + 22 : middle} y={narrow ? line + 4 : line - 5} textAnchor={narrow ? 'start' : 'middle'}>
        {text}
      </text>
      {onDrag &&
        onDrop &&
        (['from', 'to'] as const).map((end) => (
          <Handle key={end} x={end === 'from' ? from : to} y={line} end={end} onDrag={onDrag} onDrop={onDrop} />
        ))}
    </g>
  );
}

function Head({ x, y, way }: { x: number; y: number; way: 1 | -1 }) {
  return <path className="dimension-head" d={`M${x} ${y}l${-way * HEAD} ${-HEAD * 0.3}v${HEAD * 0.6}Z`} />;
}

interface HandleProps {
  readonly x: number;
  readonly y: number;
  readonly end: 'from' | 'to';
  readonly onDrag: (end: 'from' | 'to', moved: number) => void;
  readonly onDrop: (kept: boolean) => void;
}

/** For the mouse and the finger alone: the number field of the same dimension serves the keyboard. */
function Handle({ x, y, end, onDrag, onDrop }: HandleProps) {
  const press = (event: PointerEvent<SVGCircleElement>) => {
    if (event.button !== 0) return;
    event.preventDefault();
    const target = event.currentTarget;
    const startX = event.clientX;
    target.setPointerCapture(event.pointerId);
    const move = (next: globalThis.PointerEvent) => onDrag(end, next.clientX - startX);
    const finish = (kept: boolean) => {
      target.removeEventListener('pointermove', move);
      target.removeEventListener('pointerup', keep);
      target.removeEventListener('pointercancel', drop);
      removeEventListener('keydown', onKey);
      onDrop(kept);
    };
    const keep = () => finish(true);
    const drop = () => finish(false);
    const onKey = (key: globalThis.KeyboardEvent) => key.key === 'Escape' && finish(false);
    target.addEventListener('pointermove', move);
    target.addEventListener('pointerup', keep);
    target.addEventListener('pointercancel', drop);
    addEventListener('keydown', onKey);
  };
  return <circle className="drag-handle" cx={x} cy={y} r="9" onPointerDown={press} />;
}
