/** Shares of a value as bars from one base line: what adds to it to the right, what takes from it to the left. */
export interface ShareBar {
  readonly key: string;
  readonly label: string;
  readonly value: number;
  readonly text: string;
}

const ROW = 22;
const LABEL = 132;
const NUMBER = 92;

export function ShareBars({ bars, width, title }: { bars: readonly ShareBar[]; width: number; title: string }) {
  const most = Math.max(...bars.map((bar) => bar.value), 0);
  const least = Math.min(...bars.map((bar) => bar.value), 0);
  const room = Math.max(60, width - LABEL - NUMBER - 8);
  const px = most > least ? room / (most - least) : 0;
  const base = LABEL - least * px;
  return (
    <svg className="share-bars" width={width} height={bars.length * ROW + 8} role="img" aria-label={title}>
      {bars.map((bar, k) => {
        const y = k * ROW + 4;
        const length = Math.abs(bar.value) * px;
        return (
          <g key={bar.key}>
            <text x={LABEL - 10} y={y + 13} textAnchor="end">
              {bar.label}
            </text>
            <rect
              x={bar.value >= 0 ? base : base - length}
              y={y + 3}
              width={Math.max(0.5, length)}
              height={ROW - 10}
              className={bar.value >= 0 ? 'share' : 'share relief'}
            />
            <text x={width - 4} y={y + 13} textAnchor="end" className="share-number">
              {bar.text}
            </text>
          </g>
        );
      })}
      <line x1={base} x2={base} y1="2" y2={bars.length * ROW + 4} className="thin-line" />
    </svg>
  );
}
