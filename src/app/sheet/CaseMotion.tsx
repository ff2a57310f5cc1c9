/** Speeds and accelerations of a case, one number a joint that turns. */
import type { ArmFile } from '../../arm/armFile.ts';
import { fromSI, toSI } from '../../units/unit.ts';
import { withCase } from '../store/caseEdits.ts';
import { editFile } from '../store/documentStore.ts';
import type { CasePartProps } from './CaseLoads.tsx';
import { CasePart } from './CasePart.tsx';
import { refusalOf, tidied } from './caseField.ts';
import { EntryField } from './EntryField.tsx';

const KEYS = [
  { key: 'speed_deg_s', label: 'Speed', quantity: 'angularSpeed', unit: '°/s' },
  { key: 'accel_deg_s2', label: 'Acceleration', quantity: 'angularAcceleration', unit: '°/s²' },
] as const;

export function CaseMotion({ file, load, index, put }: CasePartProps & { readonly file: ArmFile }) {
  const { motion } = load;
  const names = file.joints.filter((joint) => joint.kind === 'revolute').map((joint) => joint.name);
  const set = (key: (typeof KEYS)[number]['key'], k: number, value: number) =>
    refusalOf(
      editFile((now) => withCase(now, index, { motion: { ...motion!, [key]: motion![key].with(k, tidied(value)) } })),
    );
  return (
    <CasePart
      title="Motion, anything within these limits"
      there={motion !== undefined}
      onChange={(there) => {
        const fresh = there ? { speed_deg_s: names.map(() => 30), accel_deg_s2: names.map(() => 100) } : undefined;
        put((now) => withCase(now, index, { motion: fresh }));
      }}
    >
      {motion && (
        <table className="motion-table">
          <thead>
            <tr>
              <th scope="col">Joint</th>
              {KEYS.map(({ key, label }) => (
                <th key={key} scope="col">
                  {label}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {names.map((name, k) => (
              <tr key={name}>
                <th scope="row">{name}</th>
                {KEYS.map(({ key, label, quantity, unit }) => (
                  <td key={key}>
                    <EntryField
                      label={`${label} of ${name}`}
                      quiet
                      value={toSI(motion[key][k]!, unit)}
                      quantity={quantity}
                      otherwise={null}
                      onChange={(value) => set(key, k, fromSI(value!, unit))}
                    />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </CasePart>
  );
}
