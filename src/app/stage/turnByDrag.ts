/** Turning a joint by dragging its link: the point that was taken stays under the pointer as far as the joint lets it. */
import { type Camera, Matrix4, Vector2, Vector3 } from 'three';
import type { Chain } from '../../mechanics/chain.ts';
import { poseStore, setAngle } from '../store/poseStore.ts';
import { framesAt } from './forwardFrames.ts';

export interface TurnStart {
  readonly chain: Chain;
  readonly index: number;
  /** Point on the link, base frame. */
  readonly hit: Vector3;
  readonly camera: Camera;
  readonly canvas: HTMLCanvasElement;
}

/** Below this many px a radian the joint is seen so edge-on that a drag says nothing. */
const LEAST = 6;
const MOST_AT_ONCE = 0.35;

export function turnByDrag({ chain, index, hit, camera, canvas }: TurnStart): void {
  const start = framesAt(chain, poseStore.getState().pose).links[index]!;
  const local = hit.clone().applyMatrix4(new Matrix4().copy(start).invert());
  const toScreen = (point: Vector3) => {
    const box = canvas.getBoundingClientRect();
    const at = point.clone().project(camera);
    return new Vector2(box.left + ((at.x + 1) / 2) * box.width, box.top + ((1 - at.y) / 2) * box.height);
  };
  const move = (next: PointerEvent) => {
    const pointer = new Vector2(next.clientX, next.clientY);
    for (let k = 0; k < 4; k++) {
      const pose = poseStore.getState().pose;
      const link = framesAt(chain, pose).links[index]!;
      const point = local.clone().applyMatrix4(link);
      const ahead = local
        .clone()
        .applyAxisAngle(new Vector3(0, 0, 1), 1e-3)
        .applyMatrix4(link);
      const at = toScreen(point);
      const slope = toScreen(ahead).sub(at).multiplyScalar(1e3);
      if (slope.length() < LEAST) return;
      const turn = pointer.clone().sub(at).dot(slope) / slope.lengthSq();
      const step = Math.min(MOST_AT_ONCE, Math.max(-MOST_AT_ONCE, turn));
      if (Math.abs(step) < 1e-5) return;
      setAngle(chain, index, pose[index]! + step);
    }
  };
  const finish = () => {
    removeEventListener('pointermove', move);
    removeEventListener('pointerup', finish);
    removeEventListener('pointercancel', finish);
    canvas.style.cursor = '';
  };
  canvas.style.cursor = 'grabbing';
  addEventListener('pointermove', move);
  addEventListener('pointerup', finish);
  addEventListener('pointercancel', finish);
}
