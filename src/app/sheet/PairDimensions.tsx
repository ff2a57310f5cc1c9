/** Span, overhang and offset of a joint drawing; their arrowheads can be dragged and the arm follows. */
import type { PairSupport } from '../../arm/arm.ts';
import { SHOWN_UNITS } from '../../units/format.ts';
import { fromSI } from '../../units/unit.ts';
import { Dimension } from '../figures/Dimension.tsx';
import type { SectionView } from '../figures/JointSection.tsx';
import type { SectionShape } from '../figures/sectionGeometry.ts';
import { draftFile, settleDraft } from '../store/documentStore.ts';
import { type SupportLength, withSupportLength } from '../store/supportEdits.ts';
import { useView } from '../store/viewStore.ts';

interface PairDimensionsProps {
  readonly at: number;
  readonly support: PairSupport;
  readonly shape: SectionShape;
  readonly view: SectionView;
}

export function PairDimensions({ at, support, shape, view }: PairDimensionsProps) {
  const units = useView((state) => state.units);
  const px = (s: number) => view.x + s * 1000 * view.scale;
  const below = view.y - shape.bounds.r0 * view.scale;
  const line = below + 22;
  const text = (metres: number) => {
    const unit = SHOWN_UNITS[units].length;
    return String(Number(fromSI(metres, unit).toFixed(unit === 'mm' ? 2 : 3)));
  };
  const drag = (key: SupportLength, from: number, way: number) => (end: 'from' | 'to', moved: number) => {
    const outwards = end === 'to' ? way : -way;
    // Dragged in half millimetres; the field beside takes any number.
    const mm = Math.round((from * 1000 + (outwards * moved) / view.scale) * 2) / 2;
    draftFile((file) => withSupportLength(file, at, key, key === 'offset_mm' ? mm : Math.max(0.5, mm)));
  };
  const { stationA, stationB, hub, span, overhang, offset, arrangement } = support;
  const clevis = arrangement === 'clevis';
  return (
    <g>
      <Dimension
        from={px(stationA)}
        to={px(stationB)}
        start={view.y}
        line={line}
        text={text(span)}
        // A clevis grows both ways from its middle, a cantilever away from its hub.
        onDrag={drag('span_mm', span, Math.sign(stationB - stationA) * (clevis ? 2 : 1))}
        onDrop={settleDraft}
      />
      {clevis ? (
        offset !== 0 && (
          <Dimension
            from={px(hub)}
            to={px((stationA + stationB) / 2)}
            start={view.y}
            line={line + 20}
            text={text(Math.abs(offset))}
            onDrag={drag('offset_mm', offset, 1)}
            onDrop={settleDraft}
          />
        )
      ) : (
        <Dimension
          from={px(hub)}
          to={px(stationA)}
          start={view.y}
          line={line}
          text={text(overhang)}
          onDrag={drag('overhang_mm', overhang, Math.sign(stationA - hub) || Math.sign(stationB - hub))}
          onDrop={settleDraft}
        />
      )}
    </g>
  );
}
