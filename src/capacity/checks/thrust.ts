/** Thrust on a bearing of a kind that takes none: any at all is over. */
import { axialForms } from '../../mechanics/bearingPair.ts';
import { carriesThrust } from '../rolling/index.ts';
import type { Rule } from '../rule.ts';
import { type CapacityCheck, formCheck } from './check.ts';
import { isRingParts, named, type PairParts, type RingParts } from './jointParts.ts';

export const THRUST_RULE: Rule = {
  name: 'thrust on a radial bearing',
  formula: '|Fa| = 0 on cylindrical and needle rollers and on plain bushings without a flange',
  source: 'ISO 76:2006 and ISO 281:2007 give these kinds no axial load; common practice',
  trust: 'common practice',
  units: 'N',
  range: 'bearings of a pair that locate',
};

/** What rounding may leave of a thrust that is none: N, and a share of the forces on the joint (the search closes gaps at 1e-9 of them). */
const ROUNDING = 1e-6;
const ROUNDING_SHARE = 1e-8;

export function thrustChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  if (isRingParts(parts)) return [];
  const { thrust } = parts.support;
  return (['A', 'B'] as const).flatMap((side) => {
    const bearing = parts.bearings[side];
    if ('unassessed' in bearing || (thrust !== 'both' && thrust !== side)) return [];
    const { kind } = bearing.value;
    // A flange takes it: the check of its pressure.
    if (bearing.value.kind === 'plain-bushing' && bearing.value.flangeOuter !== null) return [];
    if (kind !== 'plain-bushing' && carriesThrust(kind)) return [];
    const name = named(parts, side, {
      check: 'thrust',
      label: 'thrust on a radial bearing',
      unit: 'N',
      rule: THRUST_RULE,
    });
    return [
      formCheck(name, axialForms(thrust, side), {
        allowable: 0,
        floor: ROUNDING + ROUNDING_SHARE * parts.forceScale,
        beyond:
          kind === 'plain-bushing'
            ? 'the file says of no flange or washer that could take the thrust of a plain bushing: fill in `flange_outer_mm`, or let the other bearing locate'
            : null,
        source:
          kind === 'plain-bushing'
            ? 'a plain bushing takes no thrust by itself'
            : `${kind} bearings take no thrust here`,
      }),
    ];
  });
}
