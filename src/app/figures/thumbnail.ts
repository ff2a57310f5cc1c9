/** Size of a joint's picture in the load path, px. */
export const THUMB = { width: 132, height: 74 } as const;
