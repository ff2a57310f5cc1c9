/** Payload and tip force of a case. */
import type { CaseFile } from '../../arm/armFile.ts';
import { fromSI, toSI } from '../../units/unit.ts';
import { withCase } from '../store/caseEdits.ts';
import { editFile } from '../store/documentStore.ts';
import { CasePart } from './CasePart.tsx';
import { AXES, type Put, refusalOf, tidied, type Vector, withComponent } from './caseField.ts';
import { EntryField } from './EntryField.tsx';

export interface CasePartProps {
  readonly load: CaseFile;
  readonly index: number;
  readonly put: Put;
}

export function CaseLoads({ load, index, put }: CasePartProps) {
  return (
    <>
      <PayloadPart load={load} index={index} put={put} />
      <TipForcePart load={load} index={index} put={put} />
    </>
  );
}

function PayloadPart({ load, index, put }: CasePartProps) {
  const { payload } = load;
  const set = (change: Partial<NonNullable<CaseFile['payload']>>) =>
    refusalOf(editFile((now) => withCase(now, index, { payload: { ...payload!, ...change } })));
  return (
    <CasePart
      title="Payload"
      there={payload !== undefined}
      onChange={(there) => {
        const fresh = there ? { mass_kg: 1, centre_mm: [0, 0, 0] as [number, number, number] } : undefined;
        put((now) => withCase(now, index, { payload: fresh }));
      }}
    >
      {payload && (
        <div className="case-fields">
          <EntryField
            label="Mass"
            value={payload.mass_kg}
            quantity="mass"
            otherwise={null}
            onChange={(mass) => set({ mass_kg: tidied(mass!) })}
          />
          <span className="vector-fields">
            <span>Centre, from the tip</span>
            {AXES.map((axis, k) => (
              <EntryField
                key={axis}
                label={axis}
                value={toSI(payload.centre_mm[k]!, 'mm')}
                quantity="length"
                otherwise={null}
                onChange={(v) => set({ centre_mm: withComponent(payload.centre_mm, k, tidied(fromSI(v!, 'mm'))) })}
              />
            ))}
          </span>
          {payload.inertia_kg_m2 && <span className="aside">Its inertia stays as the file has it.</span>}
        </div>
      )}
    </CasePart>
  );
}

type Direction = NonNullable<CaseFile['tip_force']>['direction'];

function frameOf(direction: Direction): 'any' | 'base' | 'tool' {
  return direction === 'any' ? 'any' : 'base' in direction ? 'base' : 'tool';
}

function vectorOf(direction: Direction): Vector {
  return direction === 'any' ? [0, 0, -1] : 'base' in direction ? direction.base : direction.tool;
}

function directionOf(frame: string, vector: Vector): Direction {
  const own: [number, number, number] = [...vector];
  return frame === 'base' ? { base: own } : frame === 'tool' ? { tool: own } : 'any';
}

function TipForcePart({ load, index, put }: CasePartProps) {
  const force = load.tip_force;
  const set = (change: Partial<NonNullable<CaseFile['tip_force']>>) =>
    refusalOf(editFile((now) => withCase(now, index, { tip_force: { ...force!, ...change } })));
  const frame = force ? frameOf(force.direction) : 'any';
  return (
    <CasePart
      title="Tip force"
      there={force !== undefined}
      onChange={(there) => {
        const fresh = there ? { force_N: 10, direction: 'any' as const } : undefined;
        put((now) => withCase(now, index, { tip_force: fresh }));
      }}
    >
      {force && (
        <div className="case-fields">
          <EntryField
            label="Size"
            value={force.force_N}
            quantity="force"
            otherwise={null}
            onChange={(size) => set({ force_N: tidied(size!) })}
          />
          <label className="choice">
            <span>Direction</span>
            <select
              value={frame}
              onChange={(event) =>
                put((now) =>
                  withCase(now, index, {
                    tip_force: { ...force, direction: directionOf(event.target.value, vectorOf(force.direction)) },
                  }),
                )
              }
            >
              <option value="any">any: the worst at each pose</option>
              <option value="base">fixed to the ground</option>
              <option value="tool">fixed to the tip</option>
            </select>
          </label>
          {frame !== 'any' && (
            <span className="vector-fields">
              <span>along</span>
              {AXES.map((axis, k) => (
                <EntryField
                  key={axis}
                  label={axis}
                  value={vectorOf(force.direction)[k]!}
                  quantity={null}
                  otherwise={null}
                  onChange={(v) =>
                    set({ direction: directionOf(frame, withComponent(vectorOf(force.direction), k, tidied(v!))) })
                  }
                />
              ))}
            </span>
          )}
        </div>
      )}
    </CasePart>
  );
}
