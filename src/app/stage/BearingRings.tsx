/** Each bearing as a ring of its own size at its true station, in the colour of its utilisation; hatched over 1 and where unrated. */
import { useThree } from '@react-three/fiber';
import { useEffect, useMemo } from 'react';
import { EdgesGeometry, LatheGeometry, LineBasicMaterial, MeshBasicMaterial, Vector2 } from 'three';
import type { BearingName } from '../../studies/results.ts';
import { heldOf, standing, utilisationColour } from '../figures/utilisationScale.ts';
import { useGoverning } from '../store/governing.ts';
import { useTone } from '../store/tone.ts';
import { selectJoint, useView } from '../store/viewStore.ts';
import { hatchMaterial, outlineMaterial } from './inkMaterials.ts';
import type { JointLook } from './linkSolids.ts';
import { STAGE_TONES } from './stageTones.ts';

export function BearingRings({ look, jointIndex }: { look: JointLook; jointIndex: number }) {
  return look.rings.map((ring) => <Ring key={ring.name} ring={ring} jointIndex={jointIndex} />);
}

interface RingProps {
  readonly ring: JointLook['rings'][number];
  readonly jointIndex: number;
}

function Ring({ ring, jointIndex }: RingProps) {
  const { name, bore, outer, width, station } = ring;
  const tone = useTone();
  const ratio = useThree((state) => state.gl.getPixelRatio());
  const worst = useGoverning(jointIndex, name);
  const held = heldOf(worst);
  const state = standing(held);
  const utilisation = held?.found ?? 0;
  const chosen = useView((state) => state.joint === jointIndex && (state.bearing === null || state.bearing === name));
  const shape = useMemo(() => ringGeometry(bore, outer, width), [bore, outer, width]);
  const edges = useMemo(() => new EdgesGeometry(shape, 40), [shape]);
  const inks = useMemo(() => {
    const { ink, accent, over, paper, faint } = STAGE_TONES[tone];
    const fill =
      state === 'within'
        ? new MeshBasicMaterial({ color: utilisationColour(utilisation, tone) })
        : state === 'open'
          ? hatchMaterial(utilisationColour(utilisation, tone), faint, 7 * ratio, 0.22)
          : state === 'over'
            ? hatchMaterial(over, paper, 6 * ratio, 0.34)
            : hatchMaterial(paper, faint, 7 * ratio, 0.22);
    return {
      fill,
      outline: outlineMaterial(chosen ? accent : ink, (chosen ? 2.8 : 1.8) * ratio),
      edge: new LineBasicMaterial({ color: chosen ? accent : ink }),
    };
  }, [state, utilisation, tone, chosen, ratio]);
  useEffect(
    () => () => {
      for (const ink of Object.values(inks)) ink.dispose();
    },
    [inks],
  );
  useEffect(
    () => () => {
      shape.dispose();
      edges.dispose();
    },
    [shape, edges],
  );
  return (
    <group position={[0, 0, station]}>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: a solid on the stage; the load path chooses bearings by keyboard */}
      <mesh
        geometry={shape}
        material={inks.fill}
        onClick={(event) => {
          event.stopPropagation();
          selectJoint(jointIndex, name as BearingName);
        }}
      />
      <mesh geometry={shape} material={inks.outline} raycast={() => null} />
      <lineSegments geometry={edges} material={inks.edge} raycast={() => null} />
    </group>
  );
}

/** A ring about z, m; `bore` and `outer` are radii. */
function ringGeometry(bore: number, outer: number, width: number): LatheGeometry {
  const half = width / 2;
  const profile = [
    [bore, -half],
    [outer, -half],
    [outer, half],
    [bore, half],
    [bore, -half],
  ].map(([r, z]) => new Vector2(r, z));
  const lathe = new LatheGeometry(profile, 48);
  lathe.rotateX(Math.PI / 2);
  // Faces of their own, so that the outline and the edges know the corners.
  const faces = lathe.toNonIndexed() as LatheGeometry;
  faces.computeVertexNormals();
  lathe.dispose();
  return faces;
}
