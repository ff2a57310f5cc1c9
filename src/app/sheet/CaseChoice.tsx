import { useArm } from '../store/documentStore.ts';
import { showCase, useView } from '../store/viewStore.ts';

/** Whose loads the pose on stage shows. */
export function CaseChoice() {
  const sheet = useArm();
  const name = useView((state) => state.case);
  return (
    <label className="choice case-choice">
      <span>Case on stage</span>
      <select value={name} onChange={(event) => showCase(event.target.value)}>
        {sheet?.arm.cases.map((load) => (
          <option key={load.name}>{load.name}</option>
        ))}
      </select>
    </label>
  );
}
