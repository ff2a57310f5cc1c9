/** A load arrow, px: from its tail to its head, with its letter and number beside the head. */
export interface ArrowProps {
  readonly x: number;
  readonly y: number;
  readonly dx: number;
  readonly dy: number;
  readonly className?: string;
}

export function Arrow({ x, y, dx, dy, className = 'load-arrow' }: ArrowProps) {
  const length = Math.hypot(dx, dy);
  if (!(length > 1.5)) return null;
  const head = Math.min(9, length);
  const ux = dx / length;
  const uy = dy / length;
  const tipX = x + dx;
  const tipY = y + dy;
  const backX = tipX - ux * head;
  const backY = tipY - uy * head;
  const half = head * 0.36;
  return (
    <g className={className}>
      <line x1={x} y1={y} x2={backX} y2={backY} />
      <path
        d={`M${tipX} ${tipY}L${backX - uy * half} ${backY + ux * half}L${backX + uy * half} ${backY - ux * half}Z`}
      />
    </g>
  );
}
