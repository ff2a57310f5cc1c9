/** The camera: an axonometric view without perspective, upright against gravity, that holds the whole arm. */
import { useFrame, useThree } from '@react-three/fiber';
import { useEffect, useMemo, useRef } from 'react';
import { type OrthographicCamera, Vector3 } from 'three';
import { OrbitControls } from 'three/addons/controls/OrbitControls.js';
import type { Chain } from '../../mechanics/chain.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { poseStore } from '../store/poseStore.ts';
import { useView } from '../store/viewStore.ts';
import { framesAt, outlinePoints } from './forwardFrames.ts';
import { bufferSize } from './inkMaterials.ts';
import { armSize, groundMount, jointLook } from './linkSolids.ts';
import { frameDrawn, useStageAsk, type ViewName } from './stageStore.ts';

/** Up on the sheet: against gravity, or the base's z where there is none. */
export function upOf(chain: Chain): Vector3 {
  const up = new Vector3(...chain.gravity).negate();
  return up.length() > 1e-9 ? up.normalize() : new Vector3(0, 0, 1);
}

/** From where a view looks, as a direction away from the arm. */
function viewFrom(view: ViewName, chain: Chain, pose: readonly number[], joint: number): Vector3 {
  const up = upOf(chain);
  const x = Math.abs(up.x) < 0.9 ? new Vector3(1, 0, 0) : new Vector3(0, 0, 1);
  const right = x.sub(up.clone().multiplyScalar(x.dot(up))).normalize();
  const back = up.clone().cross(right);
  if (view === 'front') return back.negate();
  if (view === 'side') return right;
  if (view === 'top') return up;
  if (view === 'axis') {
    const frame = framesAt(chain, pose).housings[joint];
    return frame ? new Vector3().setFromMatrixColumn(frame, 2) : back.negate();
  }
  // Three quarters, turned so that the arm's reach lies across the view and not into it.
  const reach = framesAt(chain, pose).tip;
  const along = reach.sub(up.clone().multiplyScalar(reach.dot(up)));
  const across = along.length() > 1e-6 ? along.normalize() : right;
  const side = across.clone().cross(up);
  return side.multiplyScalar(0.9).addScaledVector(across, 0.38).addScaledVector(up, 0.42).normalize();
}

/** Room around the arm for letters and for the buttons along the edges, px. */
const MARGIN = { across: 96, up: 72 } as const;

export function CameraRig({ sheet, index }: { sheet: ArmOnSheet; index: number }) {
  const { arm, chain } = sheet;
  const camera = useThree((state) => state.camera) as OrthographicCamera;
  const canvas = useThree((state) => state.gl.domElement);
  const size = useThree((state) => state.size);
  const gl = useThree((state) => state.gl);
  const invalidate = useThree((state) => state.invalidate);
  const ask = useStageAsk();
  const controls = useRef<OrbitControls | null>(null);
  const extent = armSize(chain);
  const mount = useMemo(() => {
    const looks = chain.jointIndex.map((k) => jointLook(arm.joints[k]!, arm, extent));
    const { solid, mount: place } = groundMount(chain, looks, extent);
    solid?.dispose();
    return place.at;
  }, [arm, chain, extent]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: a new arm or a new asking points the camera, nothing else does
  useEffect(() => {
    const place = canvas.closest('.stage') as HTMLElement;
    camera.up.copy(upOf(chain));
    const orbit = new OrbitControls(camera, place);
    orbit.enableDamping = false;
    orbit.zoomToCursor = true;
    orbit.addEventListener('change', () => invalidate());
    controls.current = orbit;
    const { pose } = poseStore.getState();
    const from = viewFrom(ask.view, chain, pose, index);
    if (ask.view === 'top' || ask.view === 'axis') {
      const up = upOf(chain);
      if (Math.abs(from.dot(up)) > 0.99) camera.up.copy(viewFrom('side', chain, pose, index).cross(up).negate());
    }
    aim(camera, orbit, from, [mount, ...outlinePoints(chain, pose)], extent, size);
    invalidate();
    return () => {
      orbit.dispose();
      controls.current = null;
    };
  }, [chain.n, extent, ask.turn, camera, canvas]);

  // When a way has been played or a pose was jumped to, the view follows only if the arm has left it.
  useEffect(() => {
    const settle = () => {
      const orbit = controls.current;
      const { pose, playing } = poseStore.getState();
      if (!orbit || playing || pose.length !== chain.n) return;
      const points = [mount, ...outlinePoints(chain, pose)];
      if (points.every((point) => onStage(point, camera))) return;
      const from = camera.position.clone().sub(orbit.target).normalize();
      aim(camera, orbit, from, points, extent, size);
      invalidate();
    };
    let wait: ReturnType<typeof setTimeout> | undefined;
    const leave = poseStore.subscribe(() => {
      clearTimeout(wait);
      wait = setTimeout(settle, 180);
    });
    return () => {
      leave();
      clearTimeout(wait);
    };
  }, [camera, chain, extent, mount, invalidate, size]);

  useFrame(() => {
    gl.getDrawingBufferSize(bufferSize);
    frameDrawn(camera, size.width, size.height);
  });
  // Selecting another joint changes what the labels say.
  const joint = useView((state) => state.joint);
  // biome-ignore lint/correctness/useExhaustiveDependencies: a frame is drawn when the selection changes
  useEffect(() => invalidate(), [joint, invalidate]);
  return null;
}

function onStage(point: Vector3, camera: OrthographicCamera): boolean {
  const at = point.clone().project(camera);
  return Math.abs(at.x) < 0.97 && Math.abs(at.y) < 0.97;
}

function aim(
  camera: OrthographicCamera,
  orbit: OrbitControls,
  from: Vector3,
  points: readonly Vector3[],
  extent: number,
  size: { readonly width: number; readonly height: number },
): void {
  // Look along `from`, then fit the points' extent across and up the view.
  camera.position.copy(from).multiplyScalar(extent * 4);
  camera.lookAt(0, 0, 0);
  camera.updateMatrixWorld();
  const inView = points.map((point) => point.clone().applyMatrix4(camera.matrixWorldInverse));
  const range = (values: number[]): [number, number] => [Math.min(...values), Math.max(...values)];
  const [x0, x1] = range(inView.map((point) => point.x));
  const [y0, y1] = range(inView.map((point) => point.y));
  const depth = inView.reduce((sum, point) => sum + point.z, 0) / inView.length;
  const middle = new Vector3((x0 + x1) / 2, (y0 + y1) / 2, depth).applyMatrix4(camera.matrixWorld);
  orbit.target.copy(middle);
  camera.position.copy(middle).addScaledVector(from, extent * 4);
  camera.near = 0;
  camera.far = extent * 10;
  const across = Math.max(x1 - x0, extent * 0.25);
  const up = Math.max(y1 - y0, extent * 0.25);
  camera.zoom = Math.min(
    Math.max(60, size.width - 2 * MARGIN.across) / across,
    Math.max(60, size.height - 2 * MARGIN.up) / up,
  );
  camera.updateProjectionMatrix();
  orbit.update();
}
