/** Edits of the sheet on the arm file: what they change, what they leave, and that the reader takes them. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { bearingChoices } from '../../src/app/store/bearingChoices.ts';
import {
  freeCaseName,
  withCase,
  withCaseName,
  withNewCase,
  withoutCase,
  withTarget,
} from '../../src/app/store/caseEdits.ts';
import { withBearing } from '../../src/app/store/supportEdits.ts';
import type { ArmFile } from '../../src/arm/armFile.ts';
import { issueText } from '../../src/arm/issue.ts';
import { readArmValue } from '../../src/arm/readArm.ts';
import { namedBearings, withBearings } from '../../src/arm/withBearings.ts';
import { writeArm } from '../../src/arm/writeArm.ts';

const MODELS = readdirSync('models').filter((name) => name.endsWith('.arm.json'));
const model = (name: string) => JSON.parse(readFileSync(`models/${name}`, 'utf8')) as ArmFile;
const wall = model('wall-arm.arm.json');

function problems(file: ArmFile): readonly string[] {
  const reading = readArmValue(file);
  return reading.ok ? [] : reading.issues.map(issueText);
}

describe('cases', () => {
  it('a name goes with the duty that uses it', () => {
    const renamed = withCaseName(wall, 0, 'laden');
    expect(problems(renamed)).toEqual([]);
    expect(renamed.cases![0]!.name).toBe('laden');
    expect(renamed.duty!.map((segment) => segment.case)).toEqual([
      'laden',
      ...wall.duty!.slice(1).map((segment) => segment.case),
    ]);
    expect(writeArm(withCaseName(renamed, 0, 'full crate'))).toBe(writeArm(wall));
  });

  it('a change taken back leaves the text that was there, and the file given is never touched', () => {
    const before = writeArm(wall);
    const changed = withCase(wall, 1, { factor: 3, tip_force: { force_N: 5, direction: 'any' } });
    expect(changed.cases![1]).toMatchObject({ factor: 3, tip_force: { force_N: 5 } });
    expect(changed.cases![0]).toBe(wall.cases![0]);
    const back = withCase(changed, 1, { factor: wall.cases![1]!.factor, tip_force: undefined });
    expect(writeArm(back)).toBe(before);
    expect(writeArm(wall)).toBe(before);
  });

  it('a new one has a name of its own; one that the duty uses cannot go', () => {
    const name = freeCaseName(wall, 'full crate');
    expect(name).toBe('full crate 2');
    const more = withNewCase(wall, name, wall.cases![0]);
    expect(problems(more)).toEqual([]);
    expect(more.cases!.at(-1)).toEqual({ ...wall.cases![0], name });
    expect(writeArm(withoutCase(more, more.cases!.length - 1))).toBe(writeArm(wall));
    expect(problems(withoutCase(wall, 0)).join()).toContain('duty[0].case');
    const { cases: _, duty: __, ...bare } = wall;
    expect(problems(withNewCase(bare, 'first'))).toEqual([]);
  });
});

describe('targets', () => {
  it('are set, left out, and leave no empty object behind', () => {
    const set = withTarget(wall, 'tip_error_mm', 2);
    expect(set.targets).toEqual({ ...wall.targets, tip_error_mm: 2 });
    expect(writeArm(withTarget(set, 'tip_error_mm', undefined))).toBe(writeArm(wall));
    const { targets: _, ...bare } = wall;
    expect(withTarget(withTarget(bare, 'life_h', 5), 'life_h', undefined)).not.toHaveProperty('targets');
  });
});

describe('bearings', () => {
  it.each(MODELS)('%s: every choice of every place is an arm that the reader takes', (name) => {
    const file = model(name);
    let tried = 0;
    file.joints.forEach((joint, index) => {
      if (joint.kind !== 'revolute' || !joint.support) return;
      const places = joint.support.arrangement === 'ring' ? (['ring'] as const) : (['A', 'B'] as const);
      for (const place of places) {
        const seat = joint.support.shaft?.diameter_mm ?? null;
        const { own, table } = bearingChoices(file, index, seat);
        for (const { name: key, entry } of table) {
          expect(Object.hasOwn(file.bearings ?? {}, key)).toBe(false);
          expect(entry.source).toContain('estimated, replace');
          if (seat !== null) expect(Math.abs(entry.bore_mm - seat)).toBeLessThanOrEqual(0.5);
        }
        for (const { name: key, entry } of [...own, ...table]) {
          tried++;
          const edited = withBearing(file, index, place, key, entry);
          expect(problems(edited)).toEqual([]);
          expect(namedBearings(edited).has(key)).toBe(true);
          expect(edited.bearings![key]).toEqual(file.bearings?.[key] ?? entry);
        }
        expect(problems(withBearing(file, index, place, null))).toEqual([]);
      }
    });
    expect(tried).toBeGreaterThan(5);
  });

  it('a table replaces what has its name and adds the rest', () => {
    const own = { kind: 'plain-bushing', bore_mm: 20, outer_mm: 25, width_mm: 15 } as const;
    const merged = withBearings(wall, { 'bush-20': own, more: own });
    expect(merged.bearings!['bush-20']).toBe(own);
    expect(Object.keys(merged.bearings!)).toEqual([...Object.keys(wall.bearings!), 'more']);
    expect(withBearings(wall, {})).toBe(wall);
  });
});
