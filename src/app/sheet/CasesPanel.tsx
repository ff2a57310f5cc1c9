/** What the arm must carry and what the design must reach: the load cases and the targets of the file, to be edited. */
import { useState } from 'react';
import type { ArmFile, CaseFile } from '../../arm/armFile.ts';
import { freeCaseName, withCase, withCaseName, withNewCase, withoutCase } from '../store/caseEdits.ts';
import { editFile, useArm } from '../store/documentStore.ts';
import { showCase, useView } from '../store/viewStore.ts';
import { CaseLoads } from './CaseLoads.tsx';
import { CaseMotion } from './CaseMotion.tsx';
import { type Put, refusalOf } from './caseField.ts';
import { EntryField } from './EntryField.tsx';
import { TargetFields } from './TargetFields.tsx';

export function CasesPanel() {
  const sheet = useArm();
  const name = useView((state) => state.case);
  const [fault, setFault] = useState<string | null>(null);
  if (!sheet) return null;
  const { file } = sheet;
  const cases = file.cases ?? [];
  const index = cases.findIndex((one) => one.name === name);
  const load = cases[index];
  const put: Put = (change) => {
    const refused = refusalOf(editFile(change));
    setFault(refused);
    return refused === null;
  };
  const add = (like?: CaseFile) => {
    const fresh = freeCaseName(file, like?.name ?? 'new case');
    if (put((now) => withNewCase(now, fresh, like))) showCase(fresh);
  };
  return (
    <div className="cases-panel">
      <section aria-labelledby="case-heading">
        <div className="panel-bar">
          <h3 id="case-heading">Load case</h3>
          <button type="button" className="plain-button" onClick={() => add()}>
            New
          </button>
          <button type="button" className="plain-button" onClick={() => add(load)} disabled={!load}>
            Copy
          </button>
          <button
            type="button"
            className="plain-button"
            onClick={() => put((now) => withoutCase(now, index))}
            disabled={!load}
          >
            Remove
          </button>
        </div>
        {fault && (
          <p className="edit-fault" role="alert">
            {fault}
          </p>
        )}
        <ul className="case-list" aria-label="Load cases">
          {sheet.arm.cases.map((one) => (
            <li key={one.name}>
              <button
                type="button"
                aria-pressed={one.name === name}
                onClick={() => {
                  setFault(null);
                  showCase(one.name);
                }}
              >
                {one.name}
              </button>
            </li>
          ))}
        </ul>
        {load ? (
          <CaseFields key={index} file={file} load={load} index={index} put={put} />
        ) : (
          <p className="panel-note">The file has no case: the arm carries its own weight. “New” makes one.</p>
        )}
      </section>
      <TargetFields sheet={sheet} />
    </div>
  );
}

interface CaseFieldsProps {
  readonly file: ArmFile;
  readonly load: CaseFile;
  readonly index: number;
  readonly put: Put;
}

function CaseFields({ file, load, index, put }: CaseFieldsProps) {
  const rename = (name: string) => {
    const wish = name.trim();
    if (wish !== load.name && put((now) => withCaseName(now, index, wish))) showCase(wish);
  };
  return (
    <>
      <div className="case-fields">
        <label className="case-name-field">
          <span>Name</span>
          <input
            key={load.name}
            defaultValue={load.name}
            maxLength={120}
            autoComplete="off"
            spellCheck={false}
            onBlur={(event) => rename(event.target.value)}
            onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
          />
        </label>
        <EntryField
          label="Factor on every load"
          value={load.factor}
          quantity={null}
          otherwise="1"
          onChange={(factor) => refusalOf(editFile((now) => withCase(now, index, { factor })))}
        />
      </div>
      <CaseLoads load={load} index={index} put={put} />
      <CaseMotion file={file} load={load} index={index} put={put} />
    </>
  );
}
