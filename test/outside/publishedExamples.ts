/**
 * Worked examples from books and open course files, inputs and results in SI (1 lbf = 4.4482216 N, 1 in = 25.4 mm). Tags: `verified`,
 * read in a source that could be opened; `recomputed`, derived again from the published formula. Loads point down and reactions
 * up are positive; couples are anticlockwise.
 */
export const OVERHANG = {
  source: 'Hibbeler, Mechanics of Materials, Example 12.12, p. 612 (answers read in an open companion notebook)',
  tag: 'verified',
  load: 22241.11,
  span: 3.6576,
  overhang: 3.6576,
  reactionFar: -22241.11,
  reactionNear: 44482.22,
  tolerance: 0.002,
} as const;

export const BETWEEN = {
  source: 'Hibbeler, Mechanics of Materials, Example 12.10, p. 610 (answers read in an open companion notebook)',
  tag: 'verified',
  load: 16000,
  span: 8,
  loadFromLeft: 6,
  reactionLeft: 4000,
  reactionRight: 12000,
  tolerance: 0.002,
} as const;

export const COUPLES = [
  {
    source: 'statics; Shigley Table A-9, simple supports with moment load (from memory)',
    tag: 'recomputed',
    place: 'beyond the right bearing',
    station: 0.1,
    couple: 50,
    span: 0.08,
    reactionLeft: 625,
    reactionRight: -625,
    tolerance: 1e-6,
  },
  {
    source: 'statics',
    tag: 'recomputed',
    place: 'mid span',
    station: 0.04,
    couple: 50,
    span: 0.08,
    reactionLeft: 625,
    reactionRight: -625,
    tolerance: 1e-6,
  },
] as const;

/** Loads the bearings carry, A at z = 0 and B at z = span, axis z. */
export const VECTOR_PAIR = {
  source: 'statics (constructed)',
  tag: 'recomputed',
  span: 0.05,
  force: [120, -200, 40],
  forcePoint: [0, 0, 0.11],
  couple: [3, -2, 1.5],
  radialA: [-104, 300],
  radialB: [224, -500],
  sizeA: 317.5154,
  sizeB: 547.8832,
  axial: 40,
  torque: 1.5,
  tolerance: 1e-9,
  printedTolerance: 1e-6,
} as const;

/** Angles q1 from the horizontal, q2 relative; torques that hold the arm up. */
export const TWO_LINK_ARMS = [
  {
    source: 'Spong, Hutchinson & Vidyasagar, Robot Modeling and Control, two-link arm; numbers constructed',
    tag: 'recomputed',
    m1: 2,
    m2: 1,
    l1: 0.4,
    c1: 0.2,
    c2: 0.15,
    q1: 0,
    q2: 0,
    g: 9.81,
    torque1: 9.3195,
    torque2: 1.4715,
    force1: 29.43,
    force2: 9.81,
    tolerance: 1e-9,
  },
  {
    source: 'Craig, Introduction to Robotics, two-link example with masses at the link ends (from memory)',
    tag: 'recomputed',
    m1: 2,
    m2: 1,
    l1: 0.5,
    c1: 0.5,
    c2: 0.3,
    q1: 0.3490659,
    q2: 0.6981317,
    g: 9.81,
    torque1: 15.29908,
    torque2: 1.4715,
    force1: 29.43,
    force2: 9.81,
    // Angles and torque are printed to seven figures.
    tolerance: 1e-6,
  },
] as const;

/** A spur gear in the middle of a shaft on two bearings: resultant of tooth force and largest bending moment. */
export const GEAR_SHAFT = {
  source: 'Wentzell, Machine Design, Examples 17.1 and 17.2, pp. 379-383 (answers read in an open companion notebook)',
  tag: 'verified',
  torque: 20.33727,
  pitchDiameter: 0.1016,
  pressureAngleDeg: 20,
  span: 0.381,
  resultant: 426.0329,
  bending: 40.57963,
  tolerance: 0.005,
} as const;
