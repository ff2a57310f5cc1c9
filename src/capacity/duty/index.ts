/** The duty: motion along a path, swings, what wears a bearing, and its life over the segments. */
export * from './dutyLife.ts';
export * from './dutyPart.ts';
export * from './pathCsv.ts';
export * from './pathMotion.ts';
export * from './swings.ts';
