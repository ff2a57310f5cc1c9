/** Loads on the bearings of the selected joint and at the tip, to one scale for the whole arm; they follow the pose without React. */
import { useFrame, useThree } from '@react-three/fiber';
import { useEffect, useMemo } from 'react';
import { ConeGeometry, CylinderGeometry, Group, Matrix4, Mesh, MeshBasicMaterial, Quaternion, Vector3 } from 'three';
import { rotateBack3 } from '../../math/vector.ts';
import type { ArmOnSheet } from '../store/documentStore.ts';
import { tipForceAt } from '../store/goTo.ts';
import { loadsAt } from '../store/loads.ts';
import { poseStore } from '../store/poseStore.ts';
import { useTone } from '../store/tone.ts';
import { useView } from '../store/viewStore.ts';
import { framesAt } from './forwardFrames.ts';
import { STAGE_TONES } from './stageTones.ts';

export interface ShownLoad {
  readonly label: 'A' | 'B' | 'ring' | 'tip' | 'thrust';
  /** Where it acts and how it points, base frame; m and N. */
  readonly at: Vector3;
  readonly force: Vector3;
}

/** Radial and axial load on each bearing of joint `index`, and the tip force of the case where it has a direction. */
export function shownLoads(sheet: ArmOnSheet, pose: readonly number[], index: number, name: string): ShownLoad[] {
  const { arm, chain } = sheet;
  const frames = framesAt(chain, pose);
  const shown: ShownLoad[] = [];
  const housing = frames.housings[index];
  const joint = arm.joints[chain.jointIndex[index] ?? -1];
  const loads = loadsAt(sheet, pose, name)?.joints[index]?.bearings;
  const { support } = joint ?? {};
  if (housing && support && loads) {
    const stations =
      support.arrangement === 'ring'
        ? ([['ring', support.station]] as const)
        : ([
            ['A', support.stationA],
            ['B', support.stationB],
          ] as const);
    const turn = new Matrix4().extractRotation(housing);
    const own = new Float64Array(3);
    for (const [label, station] of stations) {
      const load = loads[label];
      if (!load) continue;
      rotateBack3(own, 0, chain.housing, 9 * index, load.radialVector, 0);
      const at = new Vector3(0, 0, station).applyMatrix4(housing);
      shown.push({ label, at, force: new Vector3(own[0], own[1], own[2]).applyMatrix4(turn) });
      if (load.axial !== 0)
        shown.push({ label: 'thrust', at, force: new Vector3(0, 0, load.axial).applyMatrix4(turn) });
    }
  }
  const tip = chain.cases.find((load) => load.name === name);
  if (tip && (tip.force === 'base' || tip.force === 'tool')) {
    const way = new Vector3(...tip.forceUnit);
    if (tip.force === 'tool') way.applyMatrix4(new Matrix4().extractRotation(frames.links[chain.n - 1]!));
    shown.push({ label: 'tip', at: frames.tip, force: way.multiplyScalar(tip.magnitude) });
  }
  const free = tip?.force === 'any' ? tipForceAt(pose, name) : null;
  if (tip && free) {
    shown.push({ label: 'tip', at: frames.tip, force: new Vector3(...free).multiplyScalar(tip.magnitude) });
  }
  return shown;
}

export interface LoadArrowsProps {
  readonly sheet: ArmOnSheet;
  readonly index: number;
  /** m a N. */
  readonly scale: number;
}

/** Two radial loads, their thrust, and the tip force. */
const MOST = 5;

export function LoadArrows({ sheet, index, scale }: LoadArrowsProps) {
  const tone = STAGE_TONES[useTone()];
  const name = useView((state) => state.case);
  const invalidate = useThree((state) => state.invalidate);
  const arrows = useMemo(() => makeArrows(tone.ink), [tone]);
  useEffect(() => () => arrows.dispose(), [arrows]);
  useEffect(() => {
    const apply = () => {
      const { pose } = poseStore.getState();
      arrows.show(pose.length === sheet.chain.n ? shownLoads(sheet, pose, index, name) : [], scale);
      invalidate();
    };
    apply();
    return poseStore.subscribe(apply);
  }, [arrows, sheet, index, name, scale, invalidate]);
  useFrame(({ camera }) => arrows.fit(1 / camera.zoom));
  return <primitive object={arrows.group} />;
}

/** Half the width of a stem, the length of a head and half its width, px. */
const STEM = 1.3;
const HEAD = 11;
const HEAD_HALF = 3.6;

/** Arrows that are as long as their load says and as thick as a line of the drawing, at any zoom. */
function makeArrows(ink: string) {
  const material = new MeshBasicMaterial({ color: ink, depthTest: false, transparent: true });
  const stem = new CylinderGeometry(1, 1, 1, 10).translate(0, 0.5, 0);
  const head = new ConeGeometry(1, 1, 14).translate(0, -0.5, 0);
  const group = new Group();
  const parts = Array.from({ length: MOST }, () => {
    const arrow = new Group();
    const line = new Mesh(stem, material);
    const point = new Mesh(head, material);
    for (const part of [line, point]) {
      part.renderOrder = 4;
      part.raycast = () => undefined;
    }
    arrow.add(line, point);
    group.add(arrow);
    return { arrow, line, point, length: 0 };
  });
  const up = new Vector3(0, 1, 0);
  return {
    group,
    /** An arrow starts where the load acts and ends `scale` times the load further on. */
    show(loads: readonly ShownLoad[], scale: number): void {
      parts.forEach((part, k) => {
        const load = loads[k];
        part.length = load ? load.force.length() * scale : 0;
        part.arrow.visible = part.length > 0;
        if (!load || !part.arrow.visible) return;
        part.arrow.position.copy(load.at);
        part.arrow.quaternion.copy(new Quaternion().setFromUnitVectors(up, load.force.clone().normalize()));
      });
    },
    /** `px`: m a px. */
    fit(px: number): void {
      for (const { line, point, length } of parts) {
        const headLength = Math.min(HEAD * px, length);
        line.scale.set(STEM * px, Math.max(1e-9, length - headLength), STEM * px);
        point.scale.set(HEAD_HALF * px, Math.max(1e-9, headLength), HEAD_HALF * px);
        point.position.set(0, length, 0);
      }
    },
    dispose(): void {
      for (const thing of [material, stem, head]) thing.dispose();
    },
  };
}
