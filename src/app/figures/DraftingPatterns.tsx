/** Hatches and arrowheads that every drawing on the sheet shares; set once, near the top of the page. */
export function DraftingPatterns() {
  return (
    <svg className="drafting-patterns" width="0" height="0" aria-hidden="true" focusable="false">
      <defs>
        <Hatch id="hatch-link" angle={45} gap={6} />
        <Hatch id="hatch-housing" angle={-45} gap={6} />
        <Hatch id="hatch-link-small" angle={45} gap={3.4} />
        <Hatch id="hatch-housing-small" angle={-45} gap={3.4} />
        <Hatch id="hatch-ground" angle={-45} gap={6} />
        <Hatch id="hatch-line-fill" angle={0} gap={4} />
        <Hatch id="hatch-bushing" angle={45} gap={2.6} />
        <Hatch id="hatch-unrated" angle={-60} gap={5} />
        <pattern id="hatch-over" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width="5" height="5" className="over-fill" />
          <line x1="1" y1="0" x2="1" y2="5" className="over-line" />
        </pattern>
      </defs>
    </svg>
  );
}

function Hatch({ id, angle, gap }: { id: string; angle: number; gap: number }) {
  return (
    <pattern id={id} width={gap} height={gap} patternUnits="userSpaceOnUse" patternTransform={`rotate(${angle})`}>
      <line x1="0" y1="0" x2="0" y2={gap} className="hatch-line" />
    </pattern>
  );
}
