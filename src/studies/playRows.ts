/**
 * Play and stiffness as rows beside those of the other checks:
 *
 *   - `tip error` of the arm (`jointIndex` -1), m: `value` attained, `bound` proved; it passes by the bound alone.
 *   - `play tilt` of each joint, rad each way, and `lost motion` of each bearing of a pair, m: reported only.
 */
import type { Arm } from '../arm/arm.ts';
import { targetsOf } from '../capacity/targets.ts';
import { judge, REASONS } from './assessVerdict.ts';
import type { JointPlayResult, PlayResult } from './play.ts';
import type { CheckRow } from './results.ts';
import { missingRow, reported, WHOLE_ARM } from './rowsWithoutPose.ts';

/** Rows of a play study: joints from ground to tip, then the tip. */
export function playRows(arm: Arm, play: PlayResult): readonly CheckRow[] {
  return [...play.joints.flatMap((one) => jointRows(arm, one)), tipRow(arm, play)];
}

function jointRows(arm: Arm, one: JointPlayResult): readonly CheckRow[] {
  const head = { joint: one.joint, jointIndex: one.jointIndex };
  const tilt = { ...head, bearing: null, check: 'play tilt', unit: 'rad' };
  const reason = one.unassessed.find((words) => words.startsWith('play')) ?? one.unassessed[0];
  const notes = one.notes.length > 0 ? one.notes.join('; ') : null;
  const rows =
    one.tilt === null
      ? [missingRow(tilt, reason ?? 'the play is not known')]
      : [{ ...reported({ ...tilt, value: one.tilt }), source: notes }];
  const lost = one.motion.map((motion): CheckRow => {
    const name = { ...head, bearing: motion.side, check: 'lost motion', unit: 'm' };
    if (motion.shift === null || !motion.from) return missingRow(name, motion.unassessed ?? 'the play is not known');
    const words = motion.reverses ? CHANGES : motion.free ? NOT_FOUND : KEEPS;
    return {
      ...reported({ ...name, value: motion.shift }),
      case: motion.from.case,
      pose: motion.from.pose,
      reason: motion.free ? LEFT_OUT : null,
      source: arm.duty ? `${words}; along the duty it jumps over ${motion.onPath.length} times` : words,
    };
  });
  return [...rows, ...lost];
}

const KEEPS = 'the load keeps its side';
const CHANGES = 'the load changes side within the travel';
const NOT_FOUND = 'no pose looked at changes the side of the load';
const LEFT_OUT =
  'at rest: what a case leaves free is left out, save for some directions of a tip force `any`, and may move the load to the other side';

const NOT_TOGETHER =
  'no pose found exceeds the allowable, but the most of every joint added up does: they need not occur together';

function tipRow(arm: Arm, { joints, tip }: PlayResult): CheckRow {
  const head = { joint: arm.name, jointIndex: WHOLE_ARM, bearing: null, check: 'tip error', unit: 'm' };
  if (tip.found === null || tip.bound === null) {
    const open = joints.flatMap((one) => one.unassessed.map((words) => `${one.joint}: ${words}`));
    return missingRow(head, open.join('; '));
  }
  const target = targetsOf(arm).tipError;
  const unassessed = target.value === null ? target.source : null;
  const judged = judge({ allowable: target.value, floor: 0, beyond: null, unassessed }, tip.found, tip.bound, 'travel');
  const notes = [...new Set(joints.flatMap((one) => one.notes.map((note) => note.replace(/^(A|B|ring): /, ''))))];
  return {
    ...reported({ ...head, value: tip.found }),
    case: tip.case,
    pose: tip.pose,
    free: tip.tipForce ? { tipForce: tip.tipForce, speed: null, accel: null } : null,
    bound: tip.bound,
    gap: tip.bound > 0 ? (tip.bound - tip.found) / tip.bound : 0,
    certified: false,
    allowable: target.value,
    ...judged,
    // More time would not close this gap.
    reason: judged.reason === REASONS['open gap'] ? NOT_TOGETHER : judged.reason,
    source: [`tip error asked for: ${target.source}`, ...notes].join('; '),
  };
}
