/** Where frames and points of the arm stand on stage at a pose. */
import { Matrix4, Vector3 } from 'three';
import type { Chain } from '../../mechanics/chain.ts';
import { housingMatrix } from './linkSolids.ts';

export interface Frames {
  /** Housing of each joint, and each link (turned), in the base frame. */
  readonly housings: readonly Matrix4[];
  readonly links: readonly Matrix4[];
  readonly tip: Vector3;
}

export function framesAt(chain: Chain, pose: readonly number[]): Frames {
  const housings: Matrix4[] = [];
  const links: Matrix4[] = [];
  let here = new Matrix4();
  for (let i = 0; i < chain.n; i++) {
    const housing = here.clone().multiply(housingMatrix(chain, i));
    housings.push(housing);
    here = housing.clone().multiply(new Matrix4().makeRotationZ(pose[i] ?? 0));
    links.push(here);
  }
  const tip = new Vector3(chain.tipOrigin[0], chain.tipOrigin[1], chain.tipOrigin[2]).applyMatrix4(here);
  return { housings, links, tip };
}

/** Points that a view of the arm should hold: each joint's origin and the tip. */
export function outlinePoints(chain: Chain, pose: readonly number[]): Vector3[] {
  const { housings, tip } = framesAt(chain, pose);
  return [...housings.map((frame) => new Vector3().setFromMatrixPosition(frame)), tip];
}
