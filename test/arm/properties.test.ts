import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { issueText } from '../../src/arm/issue.ts';
import { type ArmReading, readArm, readArmValue } from '../../src/arm/readArm.ts';
import { writeArm } from '../../src/arm/writeArm.ts';
import { armFileArbitrary } from './armFileArbitrary.ts';
import { CONTRACT_EXAMPLE } from './contractExample.ts';
import { wholeFile } from './wholeFile.ts';

/** Every number of an arm is finite, and nothing is undefined. */
function allFinite(value: unknown): boolean {
  if (typeof value === 'number') return Number.isFinite(value);
  if (value === undefined) return false;
  return typeof value !== 'object' || value === null || Object.values(value).every(allFinite);
}

/** What holds of any reading at all. */
function sane(reading: ArmReading): void {
  if (reading.ok) expect(allFinite(reading.arm)).toBe(true);
  else {
    expect(reading.issues.length).toBeGreaterThan(0);
    for (const issue of reading.issues) {
      expect(issue.found.length * issue.expected.length).toBeGreaterThan(0);
      expect(issueText(issue)).not.toMatch(/undefined|\[object|Invalid input/);
    }
  }
}

/** All paths to parts of a plain value. */
function paths(value: unknown, at: (string | number)[] = []): (string | number)[][] {
  if (typeof value !== 'object' || value === null) return [at];
  return [
    at,
    ...Object.entries(value).flatMap(([key, part]) => paths(part, [...at, Array.isArray(value) ? Number(key) : key])),
  ];
}

function mutate(root: unknown, path: readonly (string | number)[], how: string, value: unknown): unknown {
  if (path.length === 0) return how === 'replace' ? value : root;
  const copy = structuredClone(root);
  let place = copy as Record<string | number, unknown>;
  for (const step of path.slice(0, -1)) place = place[step] as Record<string | number, unknown>;
  const last = path.at(-1)!;
  if (how === 'remove') {
    if (Array.isArray(place)) place.splice(Number(last), 1);
    else delete place[last];
  } else if (how === 'replace') place[last] = value;
  else {
    const part = place[last];
    if (Array.isArray(part)) part.push(value);
    else if (typeof part === 'object' && part !== null)
      Object.defineProperty(part, how, { value, enumerable: true, configurable: true });
  }
  return copy;
}

const odd = fc.oneof(
  fc.jsonValue({ maxDepth: 4 }),
  fc.constantFrom<unknown>(
    0,
    -1,
    1e308,
    -1e308,
    1e-320,
    Number.NaN,
    Number.POSITIVE_INFINITY,
    null,
    '',
    'A',
    [],
    {},
    [0, 0, 0],
    [[[[[[[[[[[[[1]]]]]]]]]]]]],
  ),
);

describe('readArm', () => {
  it('never throws on a random text (seed 21)', () => {
    const piece = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"',
      '\\',
      '1',
      '-',
      'e',
      '.',
      'true',
      'null',
      '"armload"',
      '"joints"',
      '\u0000',
      '\ud800',
      ' ',
      '\n',
    );
    const text = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 60 }),
      fc.array(piece, { maxLength: 40 }).map((p) => p.join('')),
    );
    fc.assert(
      fc.property(text, (t) => sane(readArm(t))),
      { seed: 21, numRuns: 3000 },
    );
  });

  it('never throws on random JSON (seed 22)', () => {
    fc.assert(
      fc.property(fc.json({ maxDepth: 8 }), (t) => sane(readArm(t))),
      { seed: 22, numRuns: 1500 },
    );
  });

  it('never throws on an object of the right keys and random values (seed 23)', () => {
    const keys = Object.keys(wholeFile());
    const shape = fc.record(Object.fromEntries(keys.map((key) => [key, odd])), { requiredKeys: [] });
    fc.assert(
      fc.property(shape, (value) => sane(readArmValue(value))),
      { seed: 23, numRuns: 1500 },
    );
  });

  it('never throws on sound files broken in one to three places (seed 24)', () => {
    const bases = [wholeFile(), JSON.parse(CONTRACT_EXAMPLE)];
    const change = fc.tuple(fc.nat(), fc.constantFrom('replace', 'remove', 'add', '__proto__', 'constructor'), odd);
    const property = fc.property(fc.nat(1), fc.array(change, { minLength: 1, maxLength: 3 }), (which, changes) => {
      let value: unknown = bases[which];
      for (const [seed, how, part] of changes) {
        const all = paths(value);
        value = mutate(value, all[seed % all.length]!, how, part);
      }
      sane(readArmValue(value));
      if (allFinite(value)) {
        // Text and value agree, but for what JSON itself changes (-0).
        const text = readArm(JSON.stringify(value));
        const direct = readArmValue(value);
        expect(text.ok).toBe(direct.ok);
      }
    });
    fc.assert(property, { seed: 24, numRuns: 3000 });
  });

  it('reports the loss of any one part it needs, and never calls the rest sound for it (seed 25)', () => {
    // Second route to the required fields: those whose loss makes the reader complain are exactly the ones listed here.
    const file = wholeFile();
    const needed = new Set<string>();
    for (const path of paths(file)) {
      if (path.length === 0 || typeof path.at(-1) === 'number') continue;
      const reading = readArmValue(mutate(file, path, 'remove', null));
      if (
        !reading.ok &&
        reading.issues.some((issue) => issue.code === 'missing' && issue.path.join() === path.join())
      ) {
        needed.add(String(path.at(-1)));
      }
    }
    expect([...needed].sort()).toEqual(
      [
        'accel_deg_s2', 'armload', 'arrangement', 'axis', 'bore_mm', 'case', 'centre_mm', 'cycles_per_min', 'diameter_mm', 'direction',
        'force_N', 'from_mm', 'gravity_m_s2', 'hub_mm', 'inertia_kg_m2', 'joints', 'kind', 'link', 'mass_kg', 'mesh_deg', 'name', 'origin_mm',
        'outer_mm', 'overhang_mm', 'pose_deg', 'pressure_angle_deg', 'pretension_N', 'pull_deg', 'radius_mm', 'share', 'side', 'span_mm',
        'speed_deg_s', 'station_mm', 'thrust', 'time_s', 'tip', 'to_mm', 'travel_deg', 'width_mm', 'xx', 'yy', 'zz',
      ], // biome-ignore format: a list
    );
  });
});

describe('sound files at random', () => {
  it('read without issues, all numbers finite (seed 31)', () => {
    const property = fc.property(armFileArbitrary, (file) => {
      const reading = readArmValue(file);
      expect(reading.ok ? [] : reading.issues.map(issueText)).toEqual([]);
      sane(reading);
    });
    fc.assert(property, { seed: 31, numRuns: 300 });
  });

  it('come back from their text as they went, and the text again (seed 32)', () => {
    const property = fc.property(armFileArbitrary, (file) => {
      const text = writeArm(file);
      const reading = readArm(text);
      if (!reading.ok) throw new Error(reading.issues.map(issueText).join('\n'));
      // JSON has no -0.
      expect(reading.file).toEqual(JSON.parse(JSON.stringify(file)));
      expect(writeArm(reading.file)).toBe(text);
    });
    fc.assert(property, { seed: 32, numRuns: 200 });
  });

  it('have unit axes, orthonormal frames and bearings where the contract puts them (seed 33)', () => {
    const property = fc.property(armFileArbitrary, (file) => {
      const reading = readArmValue(file);
      if (!reading.ok) throw new Error('not sound');
      for (const [i, joint] of reading.arm.joints.entries()) {
        expect(Math.hypot(...joint.axis)).toBeCloseTo(1, 14);
        const m = joint.placement.rotation;
        for (let a = 0; a < 3; a++) {
          for (let b = 0; b < 3; b++) {
            const dot = m[3 * a]! * m[3 * b]! + m[3 * a + 1]! * m[3 * b + 1]! + m[3 * a + 2]! * m[3 * b + 2]!;
            expect(dot).toBeCloseTo(a === b ? 1 : 0, 14);
          }
        }
        const { support } = joint;
        if (!support || support.arrangement === 'ring') continue;
        const source = file.joints[i]!;
        if (source.kind !== 'revolute' || !source.support || source.support.arrangement === 'ring')
          throw new Error('another joint');
        expect(Math.abs(support.stationB - support.stationA)).toBeCloseTo(support.span, 14);
        const [low, high] = [
          Math.min(support.stationA, support.stationB),
          Math.max(support.stationA, support.stationB),
        ];
        if (support.arrangement === 'clevis') {
          expect(support.stationA < support.hub && support.hub < support.stationB).toBe(true);
          expect((low + high) / 2).toBeCloseTo(support.hub + support.offset, 14);
        } else {
          expect(support.side === '+' ? low : -high).toBeGreaterThanOrEqual(
            (support.side === '+' ? support.hub : -support.hub) - 1e-15,
          );
          expect(Math.abs(support.stationA - support.hub)).toBeCloseTo(support.overhang, 14);
          expect(Math.abs(support.stationB - support.hub)).toBeCloseTo(support.overhang + support.span, 14);
        }
      }
    });
    fc.assert(property, { seed: 33, numRuns: 200 });
  });
});
