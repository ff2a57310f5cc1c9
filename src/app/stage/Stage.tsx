/** The stage: the arm in three dimensions, drawn only when something changed. Loaded after the sheet is there. */
import { Canvas } from '@react-three/fiber';
import { useMemo } from 'react';
import { useArm } from '../store/documentStore.ts';
import { useTone } from '../store/tone.ts';
import { useSelectedChainIndex } from '../store/viewStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { ArmModel } from './ArmModel.tsx';
import { CameraRig } from './CameraRig.tsx';
import { LoadArrows } from './LoadArrows.tsx';
import { armSize } from './linkSolids.ts';
import { rendersInSoftware } from './renderer.ts';
import { StageLetters } from './StageLetters.tsx';
import { SweptTrace } from './SweptTrace.tsx';
import { askView, useStageAsk, type ViewName } from './stageStore.ts';
import { STAGE_TONES } from './stageTones.ts';

const VIEWS: readonly { readonly name: ViewName; readonly label: string }[] = [
  { name: 'free', label: 'Whole arm' },
  { name: 'front', label: 'Front' },
  { name: 'side', label: 'Side' },
  { name: 'top', label: 'Top' },
  { name: 'axis', label: 'Along the axis' },
];

/** Longest arrow, as a share of the arm's size: the hardest bearing at its worst. */
const LONGEST = 0.24;

export default function Stage() {
  const sheet = useArm();
  const tone = useTone();
  const software = useMemo(rendersInSoftware, []);
  const rows = useWorst((state) => state.rows);
  const index = useSelectedChainIndex();
  if (!sheet) return null;
  if (software === null) {
    return (
      <p className="panel-note">
        This browser offers no WebGL, so there is no stage. Everything else on the sheet works.
      </p>
    );
  }
  const size = armSize(sheet.chain);
  const radial = rows?.filter((row) => row.check === 'radial' && row.value > 0).map((row) => row.value) ?? [];
  const scale = radial.length > 0 ? (LONGEST * size) / Math.max(...radial) : 0;
  const { paper } = STAGE_TONES[tone];
  return (
    <>
      <div className="stage-canvas">
        <Canvas
          orthographic
          flat
          frameloop="demand"
          dpr={software ? 1 : [1, 2]}
          gl={{ antialias: !software, powerPreference: 'high-performance', preserveDrawingBuffer: true }}
          aria-hidden="true"
        >
          <color attach="background" args={[paper]} />
          <ambientLight intensity={tone === 'paper' ? 2.35 : 1.5} />
          <directionalLight position={[2, -3, 4]} intensity={tone === 'paper' ? 0.95 : 1.9} />
          <ArmModel sheet={sheet} />
          <SweptTrace sheet={sheet} />
          <LoadArrows sheet={sheet} index={index} scale={scale} />
          <CameraRig sheet={sheet} index={index} />
        </Canvas>
      </div>
      <StageLetters sheet={sheet} index={index} scale={scale} />
      <ViewButtons />
    </>
  );
}

function ViewButtons() {
  const present = useStageAsk((state) => state.view);
  return (
    <fieldset className="view-buttons" aria-label="View of the stage">
      {VIEWS.map(({ name, label }) => (
        <button key={name} type="button" aria-pressed={present === name} onClick={() => askView(name)}>
          {label}
        </button>
      ))}
    </fieldset>
  );
}
