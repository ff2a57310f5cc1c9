/** Plain bushings: pressure in the bore and on a flange, sliding speed, PV, wear, tilt. */
export * from './flange.ts';
export * from './pressure.ts';
export * from './pv.ts';
export * from './singleBushing.ts';
export * from './sliding.ts';
export * from './tilt.ts';
export * from './wear.ts';
