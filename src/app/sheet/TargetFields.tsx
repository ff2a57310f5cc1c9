/** What the design must reach. A target that the file leaves out shows its default, or why there is none, and where that comes from. */
import type { Target, TargetList } from '../../capacity/targets.ts';
import { targetsOf } from '../../capacity/targets.ts';
import type { Quantity } from '../../units/format.ts';
import { fromSI, toSI } from '../../units/unit.ts';
import { type TargetsFile, withTarget } from '../store/caseEdits.ts';
import { type ArmOnSheet, editFile } from '../store/documentStore.ts';
import { useView } from '../store/viewStore.ts';
import { refusalOf, tidied } from './caseField.ts';
import { EntryField } from './EntryField.tsx';
import { FileWords } from './FileWords.tsx';
import { shownNumber } from './shownNumber.ts';

interface Entry {
  readonly key: keyof TargetsFile;
  readonly label: string;
  readonly quantity: Quantity | null;
  /** Of the file; empty: a plain number. */
  readonly unit: string;
  readonly target: (list: TargetList) => Target;
}

const ENTRIES: readonly Entry[] = [
  {
    key: 'static_safety',
    label: 'Static safety, at least',
    quantity: null,
    unit: '',
    target: (t) => t.staticSafetyBall,
  },
  { key: 'life_h', label: 'Life, at least', quantity: 'life', unit: 'h', target: (t) => t.life },
  { key: 'reliability', label: 'Reliability of the life', quantity: null, unit: '', target: (t) => t.reliability },
  {
    key: 'shaft_yield_safety',
    label: 'Shaft against yield',
    quantity: null,
    unit: '',
    target: (t) => t.shaftYieldSafety,
  },
  {
    key: 'shaft_fatigue_safety',
    label: 'Shaft against fatigue',
    quantity: null,
    unit: '',
    target: (t) => t.shaftFatigueSafety,
  },
  { key: 'slope_mrad', label: 'Slope at a bearing, at most', quantity: 'slope', unit: 'mrad', target: (t) => t.slope },
  { key: 'tip_error_mm', label: 'Tip error, at most', quantity: 'length', unit: 'mm', target: (t) => t.tipError },
  {
    key: 'pressure_MPa',
    label: 'Bushing pressure, at most',
    quantity: 'stress',
    unit: 'MPa',
    target: (t) => t.pressure,
  },
  { key: 'pv_MPa_m_s', label: 'Bushing PV, at most', quantity: 'pv', unit: 'MPa·m/s', target: (t) => t.pv },
];

export function TargetFields({ sheet }: { sheet: ArmOnSheet }) {
  const list = targetsOf(sheet.arm);
  return (
    <section aria-labelledby="targets-heading" className="target-fields">
      <div className="panel-bar">
        <h3 id="targets-heading">Targets</h3>
      </div>
      <ul>
        {ENTRIES.map((entry) => (
          <TargetField key={entry.key} entry={entry} given={sheet.file.targets?.[entry.key]} list={list} />
        ))}
      </ul>
    </section>
  );
}

function TargetField({ entry, given, list }: { entry: Entry; given: number | undefined; list: TargetList }) {
  const units = useView((state) => state.units);
  const { key, label, quantity, unit } = entry;
  const target = entry.target(list);
  const usual =
    target.value === null ? 'none' : quantity ? shownNumber(target.value, quantity, units) : `${target.value}`;
  return (
    <li>
      <EntryField
        label={label}
        value={given === undefined || unit === '' ? given : toSI(given, unit)}
        quantity={quantity}
        otherwise={usual}
        onChange={(value) =>
          refusalOf(
            editFile((now) =>
              withTarget(now, key, value === undefined || unit === '' ? value : tidied(fromSI(value, unit))),
            ),
          )
        }
      />
      {!target.given && (
        <span className="aside">
          <FileWords text={target.value === null ? target.source : `default: ${target.source}`} />
        </span>
      )}
    </li>
  );
}
