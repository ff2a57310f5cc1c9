/** The arm on stage: nested joints, each turning its link and all that stands on it. Poses reach the scene without React. */
import { type ThreeEvent, useThree } from '@react-three/fiber';
import { useEffect, useMemo, useRef } from 'react';
import {
  BufferGeometry,
  EdgesGeometry,
  Float32BufferAttribute,
  type Group,
  LineBasicMaterial,
  MeshLambertMaterial,
} from 'three';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { poseStore } from '../store/poseStore.ts';
import { useTone } from '../store/tone.ts';
import { selectJoint, useView } from '../store/viewStore.ts';
import { BearingRings } from './BearingRings.tsx';
import { outlineMaterial } from './inkMaterials.ts';
import {
  armSize,
  groundMount,
  groundStrokes,
  housingMatrix,
  type JointLook,
  jointLook,
  linkSolid,
} from './linkSolids.ts';
import { STAGE_TONES } from './stageTones.ts';
import { TravelArc } from './TravelArc.tsx';
import { turnByDrag } from './turnByDrag.ts';

interface Inks {
  readonly solid: MeshLambertMaterial;
  readonly outline: ReturnType<typeof outlineMaterial>;
  readonly chosen: ReturnType<typeof outlineMaterial>;
  readonly edge: LineBasicMaterial;
}

function useInks(): Inks {
  const tone = STAGE_TONES[useTone()];
  const ratio = useThree((state) => state.gl.getPixelRatio());
  const inks = useMemo(
    () => ({
      solid: new MeshLambertMaterial({
        color: tone.solid,
        polygonOffset: true,
        polygonOffsetFactor: 1,
        polygonOffsetUnits: 1,
      }),
      outline: outlineMaterial(tone.ink, 1.6 * ratio),
      chosen: outlineMaterial(tone.accent, 2.6 * ratio),
      edge: new LineBasicMaterial({ color: tone.ink, transparent: true, opacity: 0.55 }),
    }),
    [tone, ratio],
  );
  useEffect(
    () => () => {
      for (const ink of Object.values(inks)) ink.dispose();
    },
    [inks],
  );
  return inks;
}

export function ArmModel({ sheet }: { sheet: ArmOnSheet }) {
  const { arm, chain } = sheet;
  const inks = useInks();
  const invalidate = useThree((state) => state.invalidate);
  const turning = useRef<(Group | null)[]>([]);
  const size = armSize(chain);
  const looks = useMemo(() => chain.jointIndex.map((k) => jointLook(arm.joints[k]!, arm, size)), [arm, chain, size]);

  useEffect(() => {
    const apply = () => {
      const { pose } = poseStore.getState();
      for (let i = 0; i < chain.n; i++) {
        const group = turning.current[i];
        if (group) group.rotation.z = pose[i] ?? 0;
      }
      invalidate();
    };
    apply();
    return poseStore.subscribe(apply);
  }, [chain, invalidate]);

  return (
    <>
      <Ground sheet={sheet} looks={looks} size={size} inks={inks} />
      <JointFrame sheet={sheet} looks={looks} index={0} size={size} inks={inks} turning={turning.current} />
    </>
  );
}

interface PartProps {
  readonly sheet: ArmOnSheet;
  readonly looks: readonly JointLook[];
  readonly index: number;
  readonly size: number;
  readonly inks: Inks;
}

function JointFrame(props: PartProps & { readonly turning: (Group | null)[] }) {
  const { sheet, looks, index, size, turning } = props;
  const { chain } = sheet;
  const place = useMemo(() => housingMatrix(chain, index), [chain, index]);
  const selected = useView((state) => state.joint === chain.jointIndex[index]);
  return (
    <group matrixAutoUpdate={false} matrix={place}>
      <BearingRings look={looks[index]!} jointIndex={chain.jointIndex[index]!} />
      {selected && <TravelArc chain={chain} index={index} look={looks[index]!} size={size} />}
      <group
        ref={(group) => {
          turning[index] = group;
        }}
      >
        <LinkSolid {...props} />
        {index + 1 < chain.n && <JointFrame {...props} index={index + 1} />}
      </group>
    </group>
  );
}

function Ground({ sheet, looks, size, inks }: Omit<PartProps, 'index'>) {
  const { chain } = sheet;
  const { solid, edges, strokes } = useMemo(() => {
    const { solid: body, mount, radius } = groundMount(chain, looks, size);
    const lines = new BufferGeometry();
    lines.setAttribute('position', new Float32BufferAttribute(groundStrokes(mount, radius), 3));
    return { solid: body, edges: body && new EdgesGeometry(body, 24), strokes: lines };
  }, [chain, looks, size]);
  useEffect(
    () => () => {
      for (const shape of [solid, edges, strokes]) shape?.dispose();
    },
    [solid, edges, strokes],
  );
  return (
    <>
      {solid && <mesh geometry={solid} material={inks.solid} />}
      {solid && <mesh geometry={solid} material={inks.outline} raycast={() => null} />}
      {edges && <lineSegments geometry={edges} material={inks.edge} raycast={() => null} />}
      <lineSegments geometry={strokes} material={inks.edge} raycast={() => null} />
    </>
  );
}

function LinkSolid({ sheet, looks, index, size, inks }: PartProps) {
  const { chain } = sheet;
  const { camera, gl } = useThree();
  const solid = useMemo(() => linkSolid(chain, looks, index, size), [chain, looks, index, size]);
  const edges = useMemo(() => solid && new EdgesGeometry(solid, 24), [solid]);
  const selected = useView((state) => state.joint === chain.jointIndex[index]);
  useEffect(
    () => () => {
      solid?.dispose();
      edges?.dispose();
    },
    [solid, edges],
  );
  if (!solid || !edges) return null;
  const press = (event: ThreeEvent<PointerEvent>) => {
    if (event.button !== 0) return;
    event.stopPropagation();
    // Keeps the camera where it is: its controls listen further out.
    event.nativeEvent.stopPropagation();
    selectJoint(chain.jointIndex[index]!);
    turnByDrag({ chain, index, hit: event.point, camera, canvas: gl.domElement });
  };
  return (
    <>
      <mesh
        geometry={solid}
        material={inks.solid}
        onPointerDown={press}
        onPointerOver={(event) => {
          event.stopPropagation();
          gl.domElement.style.cursor = 'grab';
        }}
        onPointerOut={() => {
          gl.domElement.style.cursor = '';
        }}
      />
      <mesh geometry={solid} material={selected ? inks.chosen : inks.outline} raycast={() => null} />
      <lineSegments geometry={edges} material={inks.edge} raycast={() => null} />
    </>
  );
}
