/** Directions all round, for what may point anywhere. */
import type { Vec3 } from '../arm/arm.ts';

/** The 26 directions to faces, edges and corners of a cube. */
export const CUBE: readonly Vec3[] = [-1, 0, 1].flatMap((x) =>
  [-1, 0, 1].flatMap((y) =>
    [-1, 0, 1].flatMap((z): Vec3[] => {
      const size = Math.hypot(x, y, z);
      return size > 0 ? [[x / size, y / size, z / size]] : [];
    }),
  ),
);
