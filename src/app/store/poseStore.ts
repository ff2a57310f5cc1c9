/** The pose on stage, rad, one angle a revolute joint. It changes at frame rate, so the stage listens to it without React. */
import { createStore, useStore } from 'zustand';
import type { Chain } from '../../mechanics/chain.ts';

export interface PoseState {
  readonly pose: readonly number[];
  /** A way is being played. */
  readonly playing: boolean;
}

export const poseStore = createStore<PoseState>(() => ({ pose: [], playing: false }));

/** What the panels show: the same pose, but while it moves only so often as a number can be read. */
const readPose = createStore<{ readonly pose: readonly number[] }>(() => ({ pose: [] }));
const READ_EVERY = 45;
let reading: ReturnType<typeof setTimeout> | undefined;
let readAt = Number.NEGATIVE_INFINITY;

function read(): void {
  clearTimeout(reading);
  reading = undefined;
  readAt = performance.now();
  const { pose } = poseStore.getState();
  if (readPose.getState().pose !== pose) readPose.setState({ pose });
}

poseStore.subscribe(() => {
  if (performance.now() - readAt >= READ_EVERY) read();
  else reading ??= setTimeout(read, READ_EVERY);
});

export function usePose(): readonly number[] {
  return useStore(readPose, (state) => state.pose);
}

export function usePlaying(): boolean {
  return useStore(poseStore, (state) => state.playing);
}

let frame = 0;

function stopPlaying(): void {
  cancelAnimationFrame(frame);
  frame = 0;
}

export function setPose(pose: readonly number[]): void {
  stopPlaying();
  poseStore.setState({ pose, playing: false });
}

/** An angle within travel: turned by whole turns where that helps, else the nearer end. */
export function withinTravel(chain: Chain, i: number, angle: number): number {
  const from = chain.from[i]!;
  const to = chain.to[i]!;
  if (chain.full[i]) return from + ((((angle - from) % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI));
  return Math.min(to, Math.max(from, angle));
}

export function setAngle(chain: Chain, i: number, angle: number): void {
  const pose = [...poseStore.getState().pose];
  pose[i] = withinTravel(chain, i, angle);
  setPose(pose);
}

/** Every joint at zero, or at the end of its travel nearest to it. */
export function restPose(chain: Chain): number[] {
  return Array.from({ length: chain.n }, (_, i) => withinTravel(chain, i, 0));
}

/** Shows the way from the present pose to another one, each joint straight; at once where motion is not wanted. */
export function playTo(target: readonly number[]): void {
  stopPlaying();
  const start = poseStore.getState().pose;
  const still = matchMedia('(prefers-reduced-motion: reduce)').matches;
  const far = Math.max(...target.map((angle, i) => Math.abs(angle - start[i]!)));
  if (still || start.length !== target.length || !(far > 1e-9)) {
    setPose(target);
    return;
  }
  // About a right angle a second, but never a long wait.
  const duration = Math.min(2400, Math.max(500, (far / (Math.PI / 2)) * 1000));
  const begin = performance.now();
  const step = (now: number) => {
    const t = Math.min(1, Math.max(0, (now - begin) / duration));
    const eased = t * t * (3 - 2 * t);
    const pose = t < 1 ? target.map((angle, i) => start[i]! + (angle - start[i]!) * eased) : [...target];
    poseStore.setState({ pose, playing: t < 1 });
    if (t < 1) frame = requestAnimationFrame(step);
  };
  frame = requestAnimationFrame(step);
}
