/** How far the worst is proved: what nothing within the travel exceeds, and the gap that is left. */
import type { CheckRow } from '../../studies/results.ts';
import { useDocument } from '../store/documentStore.ts';
import { proveNow, stopProof, useProof } from '../store/proofStore.ts';
import { useWorst } from '../store/worstStore.ts';

export function ProofPart() {
  const { status, gap, of, trouble } = useProof();
  const file = useDocument((state) => state.draft ?? state.file);
  const rows = useWorst((state) => state.searched) ?? [];
  const running = status === 'running';
  const text = proofText(rows, status === 'failed' ? trouble : null, of !== null && of === file, gap, running);
  return (
    <span className="proof-part">
      <span className="proof-state" role="status" title={text}>
        {text}
      </span>
      {running ? (
        <button type="button" className="stop" onClick={stopProof}>
          Stop proof
        </button>
      ) : (
        <button type="button" onClick={proveNow} disabled={!file}>
          Prove
        </button>
      )}
    </span>
  );
}

function proofText(
  rows: readonly CheckRow[],
  trouble: string | null,
  present: boolean,
  asked: number,
  running: boolean,
): string {
  if (trouble) return `The proof failed: ${trouble}`;
  const bounded = rows.filter((row) => row.gap !== null && Number.isFinite(row.gap));
  if (!present || bounded.length === 0) return running ? 'Proof under way' : 'Not proved';
  const all = rows.filter((row) => row.pose.length > 0).length;
  const closed = bounded.filter((row) => row.gap! <= asked).length;
  if (closed === all)
    return `Proved: no pose in travel is worse by more than ${percent(Math.max(...bounded.map((row) => row.gap!)))}`;
  const widest = Math.max(...bounded.map((row) => row.gap!));
  return `${closed} of ${all} checks proved to ${percent(asked)}, widest gap ${percent(widest)}`;
}

function percent(share: number): string {
  return `${Number((share * 100).toPrecision(2))} %`;
}
