/** The same link on a clevis and on a cantilever: both sections on one scale, what each carries at worst, and how span changes it. */
import { useEffect, useMemo } from 'react';
import { type ComparePlan, type Layout, planCompare } from '../../studies/comparePlan.ts';
import { SpanCurve } from '../figures/SpanCurve.tsx';
import { useSize } from '../figures/useSize.ts';
import { compareNow, forgetCompareOptions, setCompareOptions, stopCompare, useCompare } from '../store/compareStore.ts';
import { type ArmOnSheet, useArm } from '../store/documentStore.ts';
import { useSweep } from '../store/sweepStore.ts';
import { useView } from '../store/viewStore.ts';
import { QuantityField } from './QuantityField.tsx';
import { WaysSections } from './WaysSections.tsx';
import { WaysTable } from './WaysTable.tsx';

export function WaysPanel() {
  const sheet = useArm();
  const at = useView((state) => state.joint);
  const options = useCompare((state) => state.options);
  const joint = sheet?.arm.joints[at];
  const plan = useMemo(
    () => (sheet && joint ? planCompare(sheet.arm, sheet.chain, joint.name, options) : null),
    [sheet, joint, options],
  );
  // biome-ignore lint/correctness/useExhaustiveDependencies: the numbers typed for one joint end with it
  useEffect(() => forgetCompareOptions, [at]);
  if (!sheet || !joint || !plan) return null;
  if ('refused' in plan) return <p className="panel-note">Nothing to compare: {plan.refused}.</p>;
  return <Ways sheet={sheet} at={at} plan={plan} />;
}

function Ways({ sheet, at, plan }: { sheet: ArmOnSheet; at: number; plan: ComparePlan }) {
  const { options, result, running, trouble } = useCompare();
  const step = useSweep((state) => state.step);
  const swept = useSweep((state) => state.case);
  const units = useView((state) => state.units);
  const [frame, size] = useSize<HTMLDivElement>();
  // biome-ignore lint/correctness/useExhaustiveDependencies: a change of any of these asks for a new comparison
  useEffect(() => {
    const wait = setTimeout(() => compareNow(sheet, plan.joint), 120);
    return () => {
      clearTimeout(wait);
      stopCompare();
    };
  }, [sheet, plan.joint, options, step, swept]);
  const points = result?.spans.map((row) => ({
    span: row.span,
    clevis: Math.max(row.clevis[0].value, row.clevis[1].value),
    cantilever: Math.max(row.cantilever[0].value, row.cantilever[1].value),
  }));
  return (
    <div className="ways">
      <WaysSections sheet={sheet} at={at} plan={plan} />
      <div className="ways-lengths">
        <WayLengths plan={plan} layout={plan.clevis} />
        <WayLengths plan={plan} layout={plan.cantilever} />
      </div>
      <div className="ways-results" aria-busy={running}>
        <WaysTable plan={plan} result={result} />
        <div className="ways-curve" ref={frame}>
          {points && size && (
            <SpanCurve
              points={points}
              clevisSpan={plan.clevis.span}
              cantileverSpan={plan.cantilever.span}
              width={size.width}
              height={size.height}
              units={units}
            />
          )}
        </div>
      </div>
      {trouble && (
        <p className="panel-note" role="alert">
          {trouble}
        </p>
      )}
      <p className="ways-note">
        One pass over the poses serves both: the load on the joint does not depend on how it is carried.{' '}
        {plan.assumptions.map((text) => `${text[0]!.toUpperCase()}${text.slice(1)}.`).join(' ')}
      </p>
    </div>
  );
}

/** Numbers of one of the two; they change nothing in the arm. */
function WayLengths({ plan, layout }: { plan: ComparePlan; layout: Layout }) {
  const clevis = layout.arrangement === 'clevis';
  const set = (key: 'clevisSpan' | 'cantileverSpan' | 'overhang', least: number) => (value: number) => {
    if (!(value > least || (key === 'overhang' && value >= 0))) return 'A length above 0 is needed.';
    setCompareOptions({ [key]: value });
    return null;
  };
  return (
    <fieldset className="lengths" aria-label={`Lengths of the ${layout.arrangement}`}>
      <QuantityField
        label="Span"
        value={layout.span}
        quantity="length"
        step={1}
        onChange={set(clevis ? 'clevisSpan' : 'cantileverSpan', 0)}
      />
      {!clevis && (
        <>
          <QuantityField
            label="Overhang"
            value={layout.overhang}
            quantity="length"
            step={1}
            onChange={set('overhang', 0)}
          />
          <label className="choice">
            <span>Side</span>
            <select
              value={plan.cantilever.side}
              onChange={(event) => setCompareOptions({ side: event.target.value as '+' | '-' })}
            >
              <option value="+">+</option>
              <option value="-">−</option>
            </select>
          </label>
        </>
      )}
    </fieldset>
  );
}
