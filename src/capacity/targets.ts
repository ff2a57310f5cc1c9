/**
 * What the design must reach: the demands of the arm file, and stated defaults where it makes none. A target that depends on the material
 * or on the task has no default: its value is then null, and what needs it stays unassessed.
 */
import type { Arm, RollingBearing } from '../arm/arm.ts';
import { elementOf, usualStaticSafety } from './rolling/index.ts';

export interface Target {
  /** SI; null: no demand in the file, and none that would fit every arm. */
  readonly value: number | null;
  /** Whether the arm file gives it. */
  readonly given: boolean;
  /** Where a default comes from; `arm file` where given. */
  readonly source: string;
}

export interface TargetList {
  /** Least C0/P0 of a ball and of a roller bearing. */
  readonly staticSafetyBall: Target;
  readonly staticSafetyRoller: Target;
  /** s. */
  readonly life: Target;
  readonly reliability: Target;
  readonly shaftYieldSafety: Target;
  readonly shaftFatigueSafety: Target;
  /** Of the shaft against fatigue, not of the rating life. */
  readonly shaftReliability: Target;
  /** rad; null: the bearing's own limit alone. */
  readonly slope: Target;
  /** m. */
  readonly tipError: Target;
  /** Pa; null: the bushing's own limit alone. */
  readonly pressure: Target;
  /** Pa·m/s; null: the bushing's own limit alone. */
  readonly pv: Target;
}

const HOUR = 3600;
/** For starts and stops that no case holds: common practice multiplies the load by 1.2 to 2. */
const STARTS_AND_STOPS = 1.5;
const DEFAULTS = { lifeHours: 20000, reliability: 0.9, yieldSafety: 1.5, fatigueSafety: 1.5, shaftReliability: 0.99 };

const GUIDE = 'guide value of ISO 76:2006 for normal, smooth use (from memory)';
const SHAFT = 'common practice, 1.5 to 2 for a ductile material and loads worked out';

function target(given: number | null, otherwise: number | null, source: string): Target {
  return given === null
    ? { value: otherwise, given: false, source }
    : { value: given, given: true, source: 'arm file' };
}

/** Static safety of an element: the guide value by kind; more where no case holds the starts and stops of the arm. */
function staticSafety(arm: Arm, usual: number): Target {
  const moves = arm.cases.some((load) => load.motion !== null);
  const why = moves
    ? GUIDE
    : `${GUIDE}, times 1.5 for starts and stops, which no case holds (common practice 1.2 to 2)`;
  return target(arm.targets.staticSafety, moves ? usual : usual * STARTS_AND_STOPS, why);
}

/** The file's reliability where it asks for more than is usual for a shaft. */
function shaftReliability(given: number | null): Target {
  const usual = DEFAULTS.shaftReliability;
  return target(given !== null && given > usual ? given : null, usual, 'common practice for the strength of a shaft');
}

/** The targets of an arm, each with its source. */
export function targetsOf(arm: Arm): TargetList {
  const { targets } = arm;
  return {
    staticSafetyBall: staticSafety(arm, usualStaticSafety({ kind: 'deep-groove' })),
    staticSafetyRoller: staticSafety(arm, usualStaticSafety({ kind: 'cylindrical-roller' })),
    life: target(
      targets.life,
      DEFAULTS.lifeHours * HOUR,
      'common practice, 20 000 to 30 000 h for a machine used 8 h a day',
    ),
    reliability: target(targets.reliability, DEFAULTS.reliability, 'basic rating life of ISO 281:2007'),
    shaftYieldSafety: target(targets.shaftYieldSafety, DEFAULTS.yieldSafety, SHAFT),
    shaftFatigueSafety: target(targets.shaftFatigueSafety, DEFAULTS.fatigueSafety, SHAFT),
    shaftReliability: shaftReliability(targets.reliability),
    slope: target(targets.slope, null, 'the limit of each bearing'),
    tipError: target(targets.tipError, null, 'depends on the task: fill in `tip_error_mm`'),
    pressure: target(targets.pressure, null, 'depends on the bushing material: its `pressure_limit_MPa`'),
    pv: target(targets.pv, null, 'depends on the bushing material: its `pv_limit_MPa_m_s`'),
  };
}

/** The static safety that a rolling bearing must have, by its rolling elements. */
export function staticSafetyTarget(targets: TargetList, bearing: Pick<RollingBearing, 'kind'>): Target {
  return elementOf(bearing.kind) === 'ball' ? targets.staticSafetyBall : targets.staticSafetyRoller;
}
