/** What the view buttons ask of the camera, and what the drawing over the stage needs from it; outside React, at frame rate. */
import type { OrthographicCamera } from 'three';
import { create } from 'zustand';

export type ViewName = 'free' | 'front' | 'side' | 'top' | 'axis';

export interface StageAsk {
  readonly view: ViewName;
  /** Counts the askings, so that the same view can be asked for again. */
  readonly turn: number;
}

export const useStageAsk = create<StageAsk>(() => ({ view: 'free', turn: 0 }));

export function askView(view: ViewName): void {
  useStageAsk.setState((state) => ({ view, turn: state.turn + 1 }));
}

/** The camera and the size of the stage in CSS px, as the last frame was drawn; null before the first. */
export const lastFrame: { camera: OrthographicCamera | null; width: number; height: number } = {
  camera: null,
  width: 1,
  height: 1,
};

/** Listeners of a drawn frame. */
const watchers = new Set<() => void>();

export function onFrame(watch: () => void): () => void {
  watchers.add(watch);
  return () => {
    watchers.delete(watch);
  };
}

export function frameDrawn(camera: OrthographicCamera, width: number, height: number): void {
  lastFrame.camera = camera;
  lastFrame.width = width;
  lastFrame.height = height;
  for (const watch of watchers) watch();
}
