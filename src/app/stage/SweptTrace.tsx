/** A faint trace of the poses swept: the arm as a thin line in a spread of the grid's poses, as far as the sweep has come. */
import { useThree } from '@react-three/fiber';
import { useEffect, useMemo } from 'react';
import { BufferGeometry, Float32BufferAttribute, LineBasicMaterial, LineSegments } from 'three';
import { gridOf, poseAt } from '../../mechanics/gridSweepGrid.ts';
import { type ArmOnSheet, useDocument } from '../store/documentStore.ts';
import { stepFor, useSweep } from '../store/sweepStore.ts';
import { useTone } from '../store/tone.ts';
import { outlinePoints } from './forwardFrames.ts';
import { STAGE_TONES } from './stageTones.ts';

const POSES = 220;
/** Steps of the golden section spread any number of poses evenly over the grid. */
const GOLDEN = (Math.sqrt(5) - 1) / 2;

export function SweptTrace({ sheet }: { sheet: ArmOnSheet }) {
  const { ink } = STAGE_TONES[useTone()];
  const invalidate = useThree((state) => state.invalidate);
  const dragging = useDocument((state) => state.draft !== null);
  const step = useSweep((state) => stepFor(sheet.file, state));
  const share = useSweep((state) => (state.total > 0 ? state.done / state.total : 0));
  const lines = useMemo(() => (dragging ? [] : linesOf(sheet, step)), [sheet, step, dragging]);
  const trace = useMemo(() => {
    const geometry = new BufferGeometry().setAttribute('position', new Float32BufferAttribute(lines, 3));
    const material = new LineBasicMaterial({ color: ink, transparent: true, opacity: 0.06, depthWrite: false });
    const segments = new LineSegments(geometry, material);
    segments.raycast = () => undefined;
    segments.renderOrder = -1;
    return { segments, geometry, material };
  }, [lines, ink]);
  useEffect(
    () => () => {
      trace.geometry.dispose();
      trace.material.dispose();
    },
    [trace],
  );
  useEffect(() => {
    // Whole poses only: six numbers a line, a line a joint.
    const drawn = Math.round((share * lines.length) / (6 * sheet.chain.n));
    trace.geometry.setDrawRange(0, 2 * sheet.chain.n * drawn);
    invalidate();
  }, [trace, share, sheet, lines, invalidate]);
  return <primitive object={trace.segments} />;
}

/** Both ends of each link's line, from the first joint to the tip, pose after pose. */
function linesOf({ chain }: ArmOnSheet, step: number): number[] {
  const outcome = gridOf(chain, { step });
  if (!outcome.ok) return [];
  const pose = new Float64Array(chain.n);
  const lines: number[] = [];
  // A coarse grid has few poses: drawn over and over they would stand out.
  const count = Math.min(POSES, Math.ceil(outcome.grid.poses / 4));
  for (let k = 0; k < count; k++) {
    poseAt(outcome.grid, Math.floor(((k * GOLDEN) % 1) * outcome.grid.poses), pose);
    const points = outlinePoints(chain, [...pose]);
    for (let i = 1; i < points.length; i++) lines.push(...points[i - 1]!.toArray(), ...points[i]!.toArray());
  }
  return lines;
}
