/** A utilisation as a bar: the limit is the tick, what goes beyond the end is cut; an unrated one is an empty hatched outline. */
import { useTone } from '../store/tone.ts';
import { BAR_FULL, type Held, standing, standingFill } from './utilisationScale.ts';

export interface UtilisationBarProps {
  readonly held: Held | null;
  /** Of the pose on stage: a needle on the bar. */
  readonly now?: number | null;
}

export function UtilisationBar({ held, now = null }: UtilisationBarProps) {
  const tone = useTone();
  const state = standing(held);
  const share = state === 'unrated' ? 1 : Math.min(1, (held?.found ?? BAR_FULL) / BAR_FULL);
  const reach = `${Math.min(1, (held?.most ?? 0) / BAR_FULL) * 100}%`;
  const width = `${(Number.isFinite(share) ? share : 1) * 100}%`;
  const limit = `${100 / BAR_FULL}%`;
  const needle = now !== null && now >= 0 ? `${Math.min(1, now / BAR_FULL) * 100}%` : null;
  const { fill, over } = standingFill(held, tone);
  return (
    <svg className={`utilisation-bar ${state}`} aria-hidden="true" focusable="false">
      <rect x="0" y="3" width="100%" height="9" className="bar-ground" />
      <rect x="0" y="3" width={width} height="9" fill={state === 'unrated' ? 'url(#hatch-unrated)' : fill} />
      {over && <rect x="0" y="3" width="100%" height="9" fill={over} />}
      {isOpen(held) && <line x1={width} x2={reach} y1="7.5" y2="7.5" className="bar-reach" />}
      <rect x="0" y="3" width="100%" height="9" className="bar-frame" />
      {state !== 'unrated' && <line x1={limit} x2={limit} y1="0" y2="15" className="bar-limit" />}
      {needle !== null && state !== 'unrated' && <line x1={needle} x2={needle} y1="1" y2="14" className="bar-needle" />}
    </svg>
  );
}

/** Gap between what is attained and what nothing exceeds, above which both are shown. */
const SHOWN_GAP = 0.02;

function isOpen(held: Held | null): boolean {
  return held !== null && held.found !== null && held.most !== null && held.most - held.found > SHOWN_GAP * held.most;
}

function figure(value: number): string {
  return value < 9.995 ? value.toFixed(2) : value.toPrecision(3);
}

/** The number beside a bar or in a table, with what keeps it from passing; two numbers while the proof leaves a gap. */
export function utilisationText(held: Held | null): string {
  const state = standing(held);
  if (state === 'unrated' || !held || held.found === null) return state === 'over' ? 'over' : 'not rated';
  const number = isOpen(held) ? `${figure(held.found)} to ${figure(held.most!)}` : figure(held.found);
  return `${number}${state === 'over' ? ' over' : state === 'open' ? ' open' : ''}`;
}
