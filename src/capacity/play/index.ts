/** Play and stiffness: clearance, fits, tilt, lost motion, tip error. */
export * from './axisShift.ts';
export * from './bearingStiffness.ts';
export * from './clearanceGroups.ts';
export * from './elasticTilt.ts';
export * from './fits.ts';
export * from './lostMotion.ts';
export * from './playTilt.ts';
export * from './ringPlay.ts';
export * from './ringTolerance.ts';
export * from './tipError.ts';
export * from './workingClearance.ts';
