/** The way of the load from the tip, joint by joint, into the ground: which joint is in trouble, at one glance. */
import { Fragment } from 'react';
import { MomentBand } from '../figures/MomentBand.tsx';
import { sectionShape } from '../figures/sectionGeometry.ts';
import { THUMB } from '../figures/thumbnail.ts';
import { type ArmOnSheet, useArm } from '../store/documentStore.ts';
import { rowOf } from '../store/sweepStore.ts';
import { useWorst } from '../store/worstStore.ts';
import { JointCell } from './JointCell.tsx';
import { GroundCell, TipCell } from './PathEnds.tsx';

export function LoadPath() {
  const sheet = useArm();
  const rows = useWorst((state) => state.rows);
  if (!sheet) return <section className="load-path" aria-label="Load path" />;
  const order = sheet.chain.jointIndex.map((_, i) => i).reverse();
  const moments = order.map((i) => rowOf(rows, sheet.chain.jointIndex[i]!, null, 'moment')?.value ?? Number.NaN);
  const largest = Math.max(0, ...moments.filter((moment) => Number.isFinite(moment)));
  const scale = commonScale(sheet);
  return (
    <section className="load-path" aria-label="Load path from the tip to the ground">
      <ol>
        <TipCell sheet={sheet} />
        {order.map((i, k) => (
          <Fragment key={sheet.chain.names[i]}>
            {k > 0 && (
              <MomentBand moment={moments[k - 1]!} largest={largest} from={sheet.chain.names[order[k - 1]!]!} />
            )}
            <JointCell sheet={sheet} index={i} scale={scale} rows={rows} />
          </Fragment>
        ))}
        <MomentBand moment={moments.at(-1) ?? Number.NaN} largest={largest} from={sheet.chain.names[0]!} />
        <GroundCell />
      </ol>
    </section>
  );
}

/** One scale for every thumbnail, px a mm, so that a large joint looks large beside a small one. */
function commonScale({ arm }: ArmOnSheet): number {
  let scale = 4;
  for (const joint of arm.joints) {
    if (!joint.support) continue;
    // A large gear may run out of its picture; it must not shrink the joints.
    const { bounds } = sectionShape(joint.support, null, arm.bearings);
    const across = (THUMB.width - 12) / (bounds.s1 - bounds.s0);
    const up = (THUMB.height - 4) / (bounds.r1 - bounds.r0);
    scale = Math.min(scale, across, up);
  }
  return scale;
}
