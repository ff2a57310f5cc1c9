/**
 * What would help most: how the worst value of a check moves with each dimension, mass and travel limit. By the envelope theorem the
 * slope of a maximum is the slope at the pose that attains it with that pose held (at a travel limit the pose goes with the limit), so
 * nothing needs to be searched again.
 *
 * Where two poses (or two places on a shaft, or two forms) tie, the slope is that of the one reported. The worst then has a corner: it rises at
 * least as fast as this slope says one way, and falls at most as fast the other way, because the pose reported remains a pose. So a slope
 * never promises more than a larger value, and one that promises a smaller value may be cut short by the other pose. Where the value at the
 * held pose has a corner itself, as when a bearing stands just on a step of its shaft, the slope is the mean of both sides and says so.
 */
import type { Arm } from '../arm/arm.ts';
import { withLinkMass, withPair } from '../arm/changeArm.ts';
import { type Chain, flattenArm, WRENCH } from '../mechanics/chain.ts';
import { type CheckForm, checkValue } from '../mechanics/form.ts';
import { dynamicLoads, poseScratch } from '../mechanics/newtonEuler.ts';
import type { CheckRow } from './results.ts';

/** The checks of an arm, in any order; a row finds its own by joint, bearing and name. */
export type ChecksOf = (arm: Arm, chain: Chain) => readonly CheckForm[];

export interface Slope {
  readonly what: 'span' | 'overhang' | 'mass' | 'travel from' | 'travel to';
  /** Joint or link it belongs to. */
  readonly name: string;
  /** Of the quantity now: m, kg or rad. */
  readonly now: number;
  /** Change of the check's value for one unit of the quantity, its unit per m, kg or rad. */
  readonly slope: number;
  /** Whether the two sides differ, for the quantity stands just where the value bends or jumps: then `slope` is their mean. */
  readonly corner: boolean;
  /** What a modest step would bring, as a share of the value: 10 % of a length or mass, 5° of travel; negative helps. */
  readonly gain: number;
}

/** Relative step of the central differences; values here are smooth rational functions, so the error is about its square. */
const STEP = 1e-4;
/** Difference of the slopes of both sides, as a share of their mean, that no smooth value has over so small a step; rounding of a value. */
const CORNER = 0.02;
const ROUNDING = 1e-12;
const LENGTH_STEP = 0.1;
const TRAVEL_STEP = (5 * Math.PI) / 180;
/** How close to a limit counts as at it, rad. */
const AT_LIMIT = 1e-7;

/** The check that a row speaks of. */
export function checkOfRow(chain: Chain, row: CheckRow, checks: readonly CheckForm[]): CheckForm | null {
  const joint = chain.jointIndex.indexOf(row.jointIndex);
  return checks.find((c) => c.joint === joint && c.bearing === row.bearing && c.check === row.check) ?? null;
}

/** Value of the row's check on another arm, its pose and free parts held; NaN where that arm has no such check. */
export function valueHeld(arm: Arm, row: CheckRow, checksOf: ChecksOf, pose: readonly number[] = row.pose): number {
  const chain = flattenArm(arm);
  const load = chain.cases.find((c) => c.name === row.case);
  const check = checkOfRow(chain, row, checksOf(arm, chain));
  if (!load || !check) return Number.NaN;
  const still = new Float64Array(chain.n);
  const rates = { speed: row.free?.speed ?? still, accel: row.free?.accel ?? still };
  const out = new Float64Array(WRENCH * chain.n);
  dynamicLoads(chain, load, pose, rates, out, poseScratch(chain.n), row.free?.tipForce ?? null);
  return checkValue(check, out, WRENCH * check.joint);
}

/** Slopes of one row, those that would help most by a modest step first; quantities without effect are left out. */
export function slopesOf(arm: Arm, row: CheckRow, checksOf: ChecksOf): readonly Slope[] {
  const slopes: Slope[] = [];
  const add = (what: Slope['what'], name: string, now: number, step: number, at: (to: number) => number) => {
    const h = STEP * (now !== 0 ? Math.abs(now) : 1);
    // Nothing lies below zero: there the difference is one-sided.
    const low = now - h < 0 ? now : now - h;
    const [up, here, down] = [at(now + h), at(now), at(low)];
    const slope = (up - down) / (now + h - low);
    if (!Number.isFinite(slope) || Math.abs(slope) * h < 1e-13 * Math.abs(row.value)) return;
    const bend = low < now ? Math.abs((up - here) / h - (here - down) / (now - low)) : 0;
    const corner = bend > CORNER * Math.abs(slope) + (ROUNDING * Math.abs(here)) / h;
    slopes.push({ what, name, now, slope, corner, gain: (-Math.abs(slope) * step) / Math.abs(row.value) });
  };
  arm.joints.forEach((joint, k) => {
    const { support, link } = joint;
    if (k === row.jointIndex && support && support.arrangement !== 'ring') {
      const held = (changed: Arm) => valueHeld(changed, row, checksOf);
      add('span', joint.name, support.span, LENGTH_STEP * support.span, (span) => held(withPair(arm, k, { span })));
      if (support.arrangement === 'cantilever') {
        const { overhang } = support;
        add('overhang', joint.name, overhang, LENGTH_STEP * overhang, (to) => held(withPair(arm, k, { overhang: to })));
      }
    }
    if (link.mass > 0) {
      add('mass', link.name, link.mass, LENGTH_STEP * link.mass, (mass) =>
        valueHeld(withLinkMass(arm, k, mass / link.mass), row, checksOf),
      );
    }
  });
  addTravel(arm, row, checksOf, slopes);
  return slopes.sort((a, b) => a.gain - b.gain);
}

/** At a travel limit the pose moves with it; elsewhere a limit makes no difference to first order. */
function addTravel(arm: Arm, row: CheckRow, checksOf: ChecksOf, slopes: Slope[]): void {
  const chain = flattenArm(arm);
  for (let i = 0; i < chain.n; i++) {
    if (chain.full[i] === 1) continue;
    for (const what of ['travel from', 'travel to'] as const) {
      const limit = what === 'travel from' ? chain.from[i]! : chain.to[i]!;
      if (Math.abs(row.pose[i]! - limit) > AT_LIMIT) continue;
      const at = (d: number) =>
        valueHeld(
          arm,
          row,
          checksOf,
          row.pose.map((q, k) => (k === i ? q + d : q)),
        );
      const slope = (at(STEP) - at(-STEP)) / (2 * STEP);
      // The pose leans on the limit it would like to pass; the other end of a joint without travel holds nothing.
      const outward = what === 'travel from' ? -slope : slope;
      if (!(outward > 1e-9 * Math.abs(row.value))) continue;
      slopes.push({
        what,
        name: chain.names[i]!,
        now: limit,
        slope,
        corner: false,
        gain: (-Math.abs(slope) * TRAVEL_STEP) / Math.abs(row.value),
      });
    }
  }
}
