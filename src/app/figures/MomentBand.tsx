/** What one joint hands to the next: a band as thick as its worst tilting moment. */
import { SHOWN_UNITS } from '../../units/format.ts';
import { shownNumber } from '../sheet/shownNumber.ts';
import { useView } from '../store/viewStore.ts';

const HEIGHT = 74;

export interface MomentBandProps {
  /** N·m; NaN where it is not known. */
  readonly moment: number;
  readonly largest: number;
  /** The joint that hands it on. */
  readonly from: string;
}

/** The band fills the room between two joints; its nose points to the ground. */
export function MomentBand({ moment, largest, from }: MomentBandProps) {
  const units = useView((state) => state.units);
  const known = Number.isFinite(moment) && largest > 0;
  const thick = known ? Math.max(1.2, (moment / largest) * (HEIGHT - 14)) : 0;
  const unit = SHOWN_UNITS[units].moment;
  const number = known ? shownNumber(moment, 'moment', units) : '–';
  const nose = Math.min(9, 3 + thick / 4);
  const middle = HEIGHT / 2;
  const top = middle - thick / 2;
  return (
    <li className="moment-band">
      <span className="for-readers">
        {from} hands on at worst {number} {unit}
      </span>
      <svg width="100%" height={HEIGHT} aria-hidden="true" focusable="false">
        {known ? (
          <>
            <rect
              className="band"
              x="0"
              y={top}
              width="100%"
              height={thick}
              style={{ width: `calc(100% - ${nose}px)` }}
            />
            <svg x="100%" y="0" overflow="visible" role="presentation">
              <path className="band" d={`M${-nose - 0.5} ${top}L0 ${middle}L${-nose - 0.5} ${top + thick}Z`} />
            </svg>
          </>
        ) : (
          <line x1="2" x2="98%" y1={middle} y2={middle} className="thin-line dashed" />
        )}
      </svg>
      <span aria-hidden="true">
        <b>{number}</b>
        <span className="unit">{unit}</span>
      </span>
    </li>
  );
}
