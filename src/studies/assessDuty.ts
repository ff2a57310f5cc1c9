/** What only a duty can tell, as checks that stay unassessed where the arm file has none. */
import type { Arm } from '../arm/arm.ts';
import { type CapacityCheck, isRingParts, jointParts, missingCheck } from '../capacity/index.ts';
import { PV_RULE } from '../capacity/plain/index.ts';
import { LIFE_RULE } from '../capacity/rolling/index.ts';
import type { Chain } from '../mechanics/chain.ts';

const NO_DUTY = 'no duty in the file: fill in `duty`';

/** Life of every rolling bearing and PV of every bushing, unassessed; empty where the arm has a duty. */
export function dutyGaps(arm: Arm, chain: Chain): readonly CapacityCheck[] {
  if (arm.duty !== null) return [];
  return chain.jointIndex.flatMap((jointIndex, joint) => {
    const parts = jointParts(arm, chain, joint);
    if (!parts) return [];
    const sides = isRingParts(parts)
      ? [{ side: 'ring' as const, bearing: parts.bearing }]
      : (['A', 'B'] as const).map((side) => ({ side, bearing: parts.bearings[side] }));
    return sides.flatMap(({ side, bearing }): readonly CapacityCheck[] => {
      if ('unassessed' in bearing) return [];
      const plain = bearing.value.kind === 'plain-bushing';
      const name = plain
        ? { check: 'pv', label: 'pressure times sliding speed', unit: 'Pa·m/s', rule: PV_RULE }
        : { check: 'life', label: 'rating life', unit: 's', rule: LIFE_RULE };
      return [missingCheck({ ...name, joint, jointIndex, bearing: side }, NO_DUTY)];
    });
  });
}
