/** Plain bushings: pressure, sliding speed, PV, tilt. */
export * from './pressure.ts';
export * from './pv.ts';
export * from './singleBushing.ts';
export * from './sliding.ts';
export * from './tilt.ts';
