/** The shaft: sections, stress and yield, fatigue, slope at the bearings. */
export * from './criteria.ts';
export * from './endurance.ts';
export * from './fatigue.ts';
export * from './jointShaft.ts';
export * from './layout.ts';
export * from './loadCycle.ts';
export * from './notch.ts';
export * from './section.ts';
export * from './slope.ts';
export * from './stress.ts';
