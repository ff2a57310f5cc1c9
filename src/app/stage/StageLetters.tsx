/** Letters over the stage: joint names on leaders, the loads shown, the tip, gravity, and the scale of the arrows. */
import { useEffect, useRef } from 'react';
import { type Camera, Vector3 } from 'three';
import type { UnitSystem } from '../../units/format.ts';
import { roundDown } from '../figures/drawingScale.ts';
import { shownQuantity } from '../sheet/shownNumber.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { poseStore } from '../store/poseStore.ts';
import { useView } from '../store/viewStore.ts';
import { framesAt } from './forwardFrames.ts';
import { shownLoads } from './LoadArrows.tsx';
import { lastFrame, onFrame } from './stageStore.ts';

export interface StageLettersProps {
  readonly sheet: ArmOnSheet;
  readonly index: number;
  /** m a N. */
  readonly scale: number;
}

/** Loads that have a letter; the thrust has its arrow alone. */
const LETTERS = ['A', 'B', 'ring', 'tip'] as const;

interface Place {
  readonly x: number;
  readonly y: number;
}

function place(point: Vector3, camera: Camera): Place {
  const at = point.clone().project(camera);
  return { x: ((at.x + 1) / 2) * lastFrame.width, y: ((1 - at.y) / 2) * lastFrame.height };
}

/** A direction of the base frame on the screen, as long as it is seen (1 where it lies across the view). */
function seen(way: Vector3, camera: Camera): Place {
  const at = way.clone().normalize().transformDirection(camera.matrixWorldInverse);
  return { x: at.x, y: -at.y };
}

export function StageLetters({ sheet, index, scale }: StageLettersProps) {
  const drawing = useRef<SVGSVGElement>(null);
  const name = useView((state) => state.case);
  const units = useView((state) => state.units);
  const selected = useView((state) => state.joint);
  const { chain, arm } = sheet;
  const load = arm.cases.find((each) => each.name === name);
  const tip =
    load?.tipForce?.direction === 'any' ? `${shownQuantity(load.tipForce.magnitude, 'force', units)}, any way` : '';
  const payload = load?.payload ? shownQuantity(load.payload.mass, 'mass', units) : '';
  const tipText = [payload, tip].filter((each) => each !== '').join(' + ');
  useEffect(() => {
    const update = () => {
      const { camera } = lastFrame;
      const { pose } = poseStore.getState();
      if (!drawing.current || !camera || pose.length !== chain.n) return;
      const part = (id: string) => drawing.current!.querySelector<SVGGElement>(`[data-part="${id}"]`);
      const frames = framesAt(chain, pose);
      const anchors = frames.housings.map((housing, i) => {
        const { support } = arm.joints[chain.jointIndex[i]!]!;
        return place(new Vector3(0, 0, support?.hub ?? 0).applyMatrix4(housing), camera);
      });
      const tipAt = place(frames.tip, camera);
      const ring = { x0: tipAt.x - 15, x1: tipAt.x + 15, y0: tipAt.y - 15, y1: tipAt.y + 15 };
      const taken = [roomOf(tipText, tipAt.x + 18, tipAt.y + 4, 'start'), ring, BUTTONS];
      for (const label of LETTERS) part(`load ${label}`)?.setAttribute('visibility', 'hidden');
      for (const load of shownLoads(sheet, pose, index, name)) {
        const group = part(`load ${load.label}`);
        const at = place(load.at, camera);
        const head = place(load.at.clone().addScaledVector(load.force, scale), camera);
        const length = Math.hypot(head.x - at.x, head.y - at.y);
        const way = length > 1 ? { x: (head.x - at.x) / length, y: (head.y - at.y) / length } : { x: 0, y: -1 };
        const text = `${load.label} ${shownQuantity(load.force.length(), 'force', units)}`;
        const anchor = way.x < -0.3 ? 'end' : way.x > 0.3 ? 'start' : 'middle';
        const letterAt = { x: head.x + way.x * 8, y: head.y + way.y * 10 + 4 };
        for (let k = 0; k < 5 && taken.some((box) => meets(box, roomOf(text, letterAt.x, letterAt.y, anchor))); k++) {
          letterAt.y += 14;
        }
        taken.push(roomOf(text, letterAt.x, letterAt.y, anchor));
        setLetter(group, letterAt, text, anchor);
      }
      layTip(part('tip'), tipAt);
      layNames(anchors, chain.names, taken, part);
      layGravity(part('gravity'), chain.gravity, camera);
      layScale(part('scale'), scale, camera.zoom, units);
    };
    update();
    return onFrame(update);
  }, [sheet, chain, arm, index, name, scale, units, tipText]);

  return (
    <svg className="stage-letters" ref={drawing} aria-hidden="true" focusable="false">
      {chain.names.map((joint, i) => (
        <g key={joint} data-part={`name ${i}`} className={chain.jointIndex[i] === selected ? 'name chosen' : 'name'}>
          <line />
          <text>{joint}</text>
        </g>
      ))}
      <g data-part="tip" className="tip-mark">
        <circle r="4" />
        {tip && <circle r="13" className="any-way" />}
        <text x="18" y="4">
          {tipText}
        </text>
      </g>
      {LETTERS.map((label) => (
        <g key={label} data-part={`load ${label}`} className="load-letter">
          <text />
        </g>
      ))}
      <g data-part="gravity" className="gravity">
        <line />
        <path />
        <text />
      </g>
      <g data-part="scale" className="arrow-scale">
        <line />
        <path d="M0 0l-9 -3.2v6.4Z" />
        <text />
      </g>
    </svg>
  );
}

interface Box {
  readonly x0: number;
  readonly x1: number;
  readonly y0: number;
  readonly y1: number;
}

/** About the room a text of 12 px takes. */
function roomOf(text: string, x: number, y: number, anchor: string): Box {
  const width = text.length * 6.6 + 6;
  const x0 = anchor === 'start' ? x : anchor === 'end' ? x - width : x - width / 2;
  return { x0, x1: x0 + width, y0: y - 12, y1: y + 5 };
}

/** What the view buttons cover. */
const BUTTONS: Box = { x0: 0, x1: 330, y0: 0, y1: 28 };

function meets(a: Box, b: Box): boolean {
  return a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;
}

/** Where a name may stand beside its joint, in the order tried. */
const PLACES = [-26, 30, -44, 48, -62, 66, -80, 84].flatMap((dy) => [
  { dx: 34, dy, anchor: 'start' },
  { dx: -34, dy, anchor: 'end' },
]);

/** Names stand on leaders beside the arm's joints, never on top of one another nor of what stands already. */
function layNames(
  anchors: readonly Place[],
  names: readonly string[],
  taken: readonly Box[],
  part: (id: string) => SVGGElement | null,
): void {
  const boxes = [...taken];
  anchors.forEach((at, i) => {
    const group = part(`name ${i}`);
    const line = group?.querySelector('line');
    const text = group?.querySelector('text');
    if (!line || !text) return;
    const room = (place: (typeof PLACES)[number]) =>
      roomOf(names[i]!, at.x + place.dx, at.y + place.dy + 4, place.anchor);
    const place = PLACES.find((each) => !boxes.some((box) => meets(box, room(each)))) ?? PLACES[0]!;
    boxes.push(room(place));
    const x = at.x + place.dx;
    const y = at.y + place.dy;
    const values = { x1: at.x, y1: at.y, x2: x - Math.sign(place.dx) * 3, y2: y };
    for (const [key, value] of Object.entries(values)) line.setAttribute(key, value.toFixed(1));
    text.setAttribute('x', x.toFixed(1));
    text.setAttribute('y', (y + 4).toFixed(1));
    text.setAttribute('text-anchor', place.anchor);
  });
}

function setLetter(group: SVGGElement | null, at: Place, text: string, anchor: string): void {
  const letter = group?.querySelector('text');
  if (!group || !letter) return;
  group.setAttribute('visibility', 'visible');
  letter.setAttribute('x', at.x.toFixed(1));
  letter.setAttribute('y', at.y.toFixed(1));
  letter.setAttribute('text-anchor', anchor);
  letter.textContent = text;
}

function layTip(group: SVGGElement | null, at: Place): void {
  group?.setAttribute('transform', `translate(${at.x.toFixed(1)} ${at.y.toFixed(1)})`);
}

const GRAVITY = 38;

/** A plumb line in the corner: which way is down, foreshortened as the view has it. */
function layGravity(group: SVGGElement | null, gravity: readonly number[], camera: Camera): void {
  const size = Math.hypot(...gravity);
  group?.setAttribute('visibility', size > 0 ? 'visible' : 'hidden');
  if (!group || !(size > 0)) return;
  const way = seen(new Vector3(gravity[0], gravity[1], gravity[2]), camera);
  const dx = way.x * GRAVITY;
  const dy = way.y * GRAVITY;
  const length = Math.hypot(dx, dy);
  const start = { x: 30, y: lastFrame.height - 64 };
  const line = group.querySelector('line')!;
  const values = { x1: start.x, y1: start.y, x2: start.x + dx, y2: start.y + dy };
  for (const [key, value] of Object.entries(values)) line.setAttribute(key, value.toFixed(1));
  const head = group.querySelector('path')!;
  const angle = (Math.atan2(dy, dx) * 180) / Math.PI;
  head.setAttribute('d', length > 4 ? 'M0 0l-9 -3.2v6.4Z' : 'M-3 0a3 3 0 1 0 6 0a3 3 0 1 0 -6 0');
  head.setAttribute(
    'transform',
    `translate(${values.x2.toFixed(1)} ${values.y2.toFixed(1)}) rotate(${angle.toFixed(1)})`,
  );
  const text = group.querySelector('text')!;
  text.setAttribute('x', String(start.x + 10));
  text.setAttribute('y', String(start.y + 6));
  text.textContent = 'gravity';
}

function layScale(group: SVGGElement | null, scale: number, zoom: number, units: UnitSystem): void {
  const px = scale * zoom;
  group?.setAttribute('visibility', px > 0 && Number.isFinite(px) ? 'visible' : 'hidden');
  if (!group || !(px > 0)) return;
  // In round pounds where loads are shown in pounds.
  const one = units === 'inch' ? 4.4482216152605 : 1;
  const load = roundDown(90 / px / one) * one;
  const length = load * px;
  const x = 100;
  const y = lastFrame.height - 22;
  const line = group.querySelector('line')!;
  for (const [key, value] of Object.entries({ x1: x, y1: y, x2: x + length - 8, y2: y })) {
    line.setAttribute(key, value.toFixed(1));
  }
  group.querySelector('path')!.setAttribute('transform', `translate(${(x + length).toFixed(1)} ${y})`);
  const text = group.querySelector('text')!;
  text.setAttribute('x', (x + length + 8).toFixed(1));
  text.setAttribute('y', String(y + 4));
  text.textContent = shownQuantity(load, 'force', units, 1);
}
