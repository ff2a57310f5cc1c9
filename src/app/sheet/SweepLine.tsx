/** One sentence that says what the worst loads are worst over, and can be changed in place. */
import { countText, secondsText } from '../../report/shown.ts';
import { type ArmOnSheet, useArm, useDocument } from '../store/documentStore.ts';
import {
  askSweep,
  casesWaiting,
  isCurrent,
  type SweepState,
  stepFor,
  stopSweep,
  sweepNow,
  useSweep,
} from '../store/sweepStore.ts';
import { ProofPart } from './ProofPart.tsx';
import { QuantityField } from './QuantityField.tsx';

export function SweepLine() {
  const sheet = useArm();
  const state = useSweep();
  const file = useDocument((document) => document.draft ?? document.file);
  if (!sheet || !file) return <section className="sweep-line" aria-label="Sweep" />;
  const running = state.status === 'running';
  const text = stateText(state, isCurrent(state, file), leftOutText(state, sheet));
  const step = stepFor(file, state);
  const setStep = (next: number) => {
    if (!(next >= (0.01 * Math.PI) / 180)) return 'A step is at least 0.01°.';
    askSweep({ step: Math.min(next, 2 * Math.PI) });
    return null;
  };
  return (
    <section className="sweep-line" aria-label="Sweep of the poses">
      <span>Worst over</span>
      <label className="choice">
        <span className="for-readers">Cases to sweep</span>
        <select
          value={state.case ?? ''}
          onChange={(event) => askSweep({ case: event.target.value === '' ? null : event.target.value })}
        >
          <option value="">all cases</option>
          {sheet.arm.cases.map((load) => (
            <option key={load.name}>{load.name}</option>
          ))}
        </select>
      </label>
      <span>and a grid of poses in steps of</span>
      <QuantityField label="Step of the grid" quiet value={step} quantity="angle" step={1} onChange={setStep} />
      {running ? (
        <button type="button" className="stop" onClick={stopSweep}>
          Stop
        </button>
      ) : (
        <button type="button" onClick={sweepNow}>
          Sweep
        </button>
      )}
      <progress
        max={1}
        value={state.total > 0 ? state.done / state.total : 0}
        aria-label="Progress of the sweep"
        className={running ? '' : 'rest'}
      />
      <span className="sweep-state" role="status" title={text}>
        {text}
      </span>
      <ProofPart />
    </section>
  );
}

/** Cases that were asked for and not swept yet. */
function leftOutText(state: SweepState, sheet: ArmOnSheet): string {
  const out = casesWaiting(sheet, state).map((name) => `“${name}”`);
  return out.length > 0 ? `, without ${out.join(', ')}: press Sweep` : '';
}

function stateText(state: SweepState, current: boolean, leftOut: string): string {
  const { status, done, total, result, trouble } = state;
  if (status === 'running') return `${countText(done)} of ${countText(total)} poses`;
  if (status === 'failed') return trouble ?? 'The sweep failed.';
  if (!result) return 'not swept yet';
  const span = `${countText(result.done)} poses, ${secondsText(result.seconds)}`;
  if (!current) return `out of date, sweep again (was ${span})`;
  if (result.partial) return `stopped, partial: ${countText(result.done)} of ${countText(result.poses)} poses`;
  return `${span}${leftOut}`;
}
