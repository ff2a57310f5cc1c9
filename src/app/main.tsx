/** The page: brings back the last sheet or opens the first model, sweeps it, and shows it. */
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Sheet } from './sheet/Sheet.tsx';
import { presentArm, useDocument } from './store/documentStore.ts';
import { goToWorst, hardestRow } from './store/goTo.ts';
import { lastingAfterEdits } from './store/lastingStore.ts';
import { keepSheet, openLastSheet } from './store/persistence.ts';
import { poseStore, restPose, setPose } from './store/poseStore.ts';
import { proveAfterEdits } from './store/proofStore.ts';
import { sweepAfterEdits } from './store/sweepStore.ts';
import { followTone } from './store/tone.ts';
import { keepViewInArm } from './store/viewStore.ts';
import { followWorst, useWorst } from './store/worstStore.ts';
import './sheet/styles/sheet.css';

/** A newly opened arm goes to where it is worst as soon as that is known, unless its pose was touched or brought back. */
let untouched: readonly number[] | null = null;

function armChanged(fresh: boolean): void {
  const sheet = presentArm();
  if (!sheet) return;
  keepViewInArm(
    sheet.arm.joints,
    sheet.arm.cases.map((load) => load.name),
  );
  const { pose } = poseStore.getState();
  const fits = pose.length === sheet.chain.n;
  if (fresh || !fits) {
    untouched = restPose(sheet.chain);
    setPose(untouched);
  }
}

function goToTrouble(): void {
  const { searched: rows, of } = useWorst.getState();
  // What is still that of an arm before it leads nowhere here.
  if (!rows || of !== presentArm()?.file || !untouched || poseStore.getState().pose !== untouched) return;
  untouched = null;
  const row = hardestRow(rows);
  if (row) goToWorst(row, false);
}

followTone();
sweepAfterEdits();
proveAfterEdits();
lastingAfterEdits();
followWorst();
useDocument.subscribe((state, before) => {
  if (state.file !== before.file || state.draft !== before.draft) armChanged(state.origin !== before.origin);
});
useWorst.subscribe((state, before) => {
  if (state.searched !== before.searched) goToTrouble();
});
createRoot(document.getElementById('sheet')!).render(
  <StrictMode>
    <Sheet />
  </StrictMode>,
);
openLastSheet().then((broughtBack) => {
  if (broughtBack) untouched = null;
  keepSheet();
});
