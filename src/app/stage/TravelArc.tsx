/** The travel of the selected joint: a sector about its axis, its two ends, and the axis itself as a centre line. */
import { useEffect, useMemo } from 'react';
import {
  BufferGeometry,
  DoubleSide,
  Float32BufferAttribute,
  LineBasicMaterial,
  LineDashedMaterial,
  LineSegments,
  Mesh,
  MeshBasicMaterial,
} from 'three';
import type { Chain } from '../../mechanics/chain.ts';
import { useTone } from '../store/tone.ts';
import type { JointLook } from './linkSolids.ts';
import { STAGE_TONES } from './stageTones.ts';

export interface TravelArcProps {
  readonly chain: Chain;
  readonly index: number;
  readonly look: JointLook;
  readonly size: number;
}

export function TravelArc({ chain, index, look, size }: TravelArcProps) {
  const { accent } = STAGE_TONES[useTone()];
  const parts = useMemo(() => {
    const { zero, radius } = linkWay(chain, index, look, size);
    const z = (look.hub.from + look.hub.to) / 2;
    const from = zero + chain.from[index]!;
    const to = zero + chain.to[index]!;
    const steps = Math.max(2, Math.ceil((to - from) / 0.05));
    const lines: number[] = [];
    const faces: number[] = [];
    const at = (angle: number, r: number) => [r * Math.cos(angle), r * Math.sin(angle), z];
    for (let k = 0; k < steps; k++) {
      const a = from + ((to - from) * k) / steps;
      const b = from + ((to - from) * (k + 1)) / steps;
      lines.push(...at(a, radius), ...at(b, radius));
      faces.push(0, 0, z, ...at(a, radius), ...at(b, radius));
    }
    if (!chain.full[index]) {
      lines.push(0, 0, z, ...at(from, radius * 1.06), 0, 0, z, ...at(to, radius * 1.06));
    }
    const arc = new LineSegments(
      lineGeometry(lines),
      new LineBasicMaterial({ color: accent, transparent: true, opacity: 0.8 }),
    );
    const sector = new Mesh(
      lineGeometry(faces),
      new MeshBasicMaterial({ color: accent, transparent: true, opacity: 0.07, side: DoubleSide, depthWrite: false }),
    );
    const reach = Math.max(look.hub.radius * 2.2, size * 0.04);
    const stations = [look.hub.from, look.hub.to, ...look.rings.map((ring) => ring.station)];
    const axis = new LineSegments(
      lineGeometry([0, 0, Math.min(...stations) - reach, 0, 0, Math.max(...stations) + reach]),
      new LineDashedMaterial({ color: accent, dashSize: size * 0.02, gapSize: size * 0.008, depthTest: false }),
    );
    axis.computeLineDistances();
    axis.renderOrder = 3;
    for (const part of [arc, sector, axis]) part.raycast = () => undefined;
    return [arc, sector, axis];
  }, [chain, index, look, size, accent]);
  useEffect(
    () => () => {
      for (const part of parts) {
        part.geometry.dispose();
        (part.material as LineBasicMaterial).dispose();
      }
    },
    [parts],
  );
  return parts.map((part) => <primitive key={part.uuid} object={part} />);
}

function lineGeometry(points: readonly number[]): BufferGeometry {
  return new BufferGeometry().setAttribute('position', new Float32BufferAttribute(points, 3));
}

/** Where the link points at angle 0, about the joint axis, and a radius that suits its length. */
function linkWay(chain: Chain, index: number, look: JointLook, size: number) {
  const last = index + 1 >= chain.n;
  const x = last ? chain.tipOrigin[0]! : chain.origin[3 * index + 3]!;
  const y = last ? chain.tipOrigin[1]! : chain.origin[3 * index + 4]!;
  const across = Math.hypot(x, y);
  const radius = Math.max(across * 0.6, look.hub.radius * 2.6, size * 0.06);
  return { zero: across > 1e-6 ? Math.atan2(y, x) : 0, radius };
}
