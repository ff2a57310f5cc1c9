import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '../../src/arm/arm.ts';
import { cosSinDegrees, rotationFromTurn, unitVector } from '../../src/arm/rotation.ts';
import { writeArm } from '../../src/arm/writeArm.ts';
import { wholeFile } from './wholeFile.ts';

function times(a: Mat3, b: Mat3): number[] {
  return Array.from({ length: 9 }, (_, k) => {
    const [r, c] = [Math.floor(k / 3), k % 3];
    return a[3 * r]! * b[c]! + a[3 * r + 1]! * b[3 + c]! + a[3 * r + 2]! * b[6 + c]!;
  });
}

describe('rotations of the file', () => {
  it('have exact quarter turns, any number of them', () => {
    for (let k = -12; k <= 12; k++) {
      const [c, s] = cosSinDegrees(90 * k);
      const turn = ((k % 4) + 4) % 4;
      expect([c, s], `${90 * k}`).toEqual(
        [
          [1, 0],
          [0, 1],
          [-1, 0],
          [0, -1],
        ][turn],
      );
    }
    for (const entry of rotationFromTurn([90, -180, 270])) expect([0, 1, -1]).toContain(entry);
    for (const entry of rotationFromTurn([-90, 360, 0])) expect(Object.is(entry, -0)).toBe(false);
  });

  it('are Rz(yaw) Ry(pitch) Rx(roll), multiplied out (seed 51)', () => {
    const angle = fc.double({ min: -720, max: 720, noNaN: true });
    const property = fc.property(angle, angle, angle, (roll, pitch, yaw) => {
      const [x, y, z] = [roll, pitch, yaw].map((a) => (a * Math.PI) / 180) as [number, number, number];
      const rx: Mat3 = [1, 0, 0, 0, Math.cos(x), -Math.sin(x), 0, Math.sin(x), Math.cos(x)];
      const ry: Mat3 = [Math.cos(y), 0, Math.sin(y), 0, 1, 0, -Math.sin(y), 0, Math.cos(y)];
      const rz: Mat3 = [Math.cos(z), -Math.sin(z), 0, Math.sin(z), Math.cos(z), 0, 0, 0, 1];
      const product = times(rz, times(ry, rx) as unknown as Mat3);
      for (const [k, entry] of rotationFromTurn([roll, pitch, yaw]).entries())
        expect(entry).toBeCloseTo(product[k]!, 12);
    });
    fc.assert(property, { seed: 51, numRuns: 300 });
  });

  it('make unit vectors at every scale, and none of nothing', () => {
    for (const size of [1e-6, 1, 1e12])
      expect(Math.hypot(...unitVector([size, -2 * size, size] as Vec3)!)).toBeCloseTo(1, 15);
    expect(unitVector([0, 0, 0])).toBeNull();
  });
});

describe('writeArm', () => {
  it('keeps short things on one line and drops what is undefined', () => {
    const file = { ...wholeFile(), note: undefined };
    const text = writeArm(file as never);
    expect(text).toContain('\n  "gravity_m_s2": [0, 0, -9.80665],\n');
    expect(text).not.toContain('note');
    expect(text.endsWith('}\n')).toBe(true);
    expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(file)));
    for (const line of text.split('\n')) expect(line.length, line).toBeLessThanOrEqual(120);
  });
});
