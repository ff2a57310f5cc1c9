import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { ArmFile } from '../../src/arm/armFile.ts';
import { issueText } from '../../src/arm/issue.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { writeArm } from '../../src/arm/writeArm.ts';

const folder = new URL('../../models/', import.meta.url);
const names = readdirSync(folder).filter((name) => name.endsWith('.arm.json'));
const texts = new Map(names.map((name) => [name, readFileSync(new URL(name, folder), 'utf8')]));

function fileOf(name: string): ArmFile {
  return JSON.parse(texts.get(name)!) as ArmFile;
}

describe('the models', () => {
  it('are the eight arms of the scenario', () => {
    expect(names.map((name) => name.replace('.arm.json', '')).sort()).toEqual([
      'ceiling-arm',
      'four-joint-vertical',
      'picking-arm',
      'seven-joint',
      'six-joint',
      'swing-joint',
      'two-link',
      'wall-arm',
    ]);
  });

  it.each(names)('%s reads without an issue or a warning', (name) => {
    const reading = readArm(texts.get(name)!);
    expect(reading.ok ? [] : reading.issues.map(issueText)).toEqual([]);
    expect(reading.warnings.map(issueText)).toEqual([]);
  });

  it.each(names)('%s is written the way writeArm writes', (name) => {
    expect(writeArm(fileOf(name))).toBe(texts.get(name));
  });

  it.each(names)(
    '%s has supports with rated bearings, two or three cases, targets, and says that it is invented',
    (name) => {
      const file = fileOf(name);
      expect(file.note).toMatch(/[Ii]nvented for a commercial glasshouse and its workshop/);
      expect([2, 3]).toContain(file.cases?.length);
      expect(file.targets?.static_safety).toBeGreaterThan(0);
      for (const joint of file.joints) {
        if (joint.kind !== 'revolute') continue;
        const support = joint.support;
        if (!support) throw new Error(`${joint.name} has no support`);
        expect(support.shaft?.material, joint.name).toBeDefined();
        const used = support.arrangement === 'ring' ? [support.bearing] : [support.bearings?.A, support.bearings?.B];
        for (const key of used) {
          const bearing = file.bearings?.[key ?? ''];
          if (!bearing) throw new Error(`${joint.name} lacks a bearing`);
          expect(bearing.source).toContain('invented');
          if (bearing.kind === 'plain-bushing') expect(bearing.pressure_limit_MPa).toBeGreaterThan(0);
          else expect((bearing.C_N ?? 0) > 0 && (bearing.C0_N ?? 0) > 0, `${joint.name} ${key}`).toBe(true);
        }
      }
    },
  );

  it('have the joints their names say', () => {
    const turning = (name: string) =>
      fileOf(`${name}.arm.json`).joints.filter((joint) => joint.kind === 'revolute').length;
    expect(
      ['swing-joint', 'two-link', 'four-joint-vertical', 'picking-arm', 'six-joint', 'seven-joint'].map(turning),
    ).toEqual([1, 2, 4, 5, 6, 7]);
    const picking = fileOf('picking-arm.arm.json').joints.map((j) =>
      j.kind === 'revolute' ? j.support?.arrangement : '',
    );
    expect(new Set(picking)).toEqual(new Set(['clevis', 'cantilever']));
  });

  it('cover every kind of load, support and drive between them', () => {
    const files = names.map(fileOf);
    const cases = files.flatMap((file) => file.cases ?? []);
    const joints = files.flatMap((file) => file.joints);
    const has = (part: string, list: readonly unknown[]) => expect(JSON.stringify(list), part).toContain(part);
    for (const part of [
      '"payload"',
      '"direction":"any"',
      '"direction":{"base"',
      '"direction":{"tool"',
      '"factor"',
      '"motion"',
    ])
      has(part, cases);
    for (const part of [
      '"clevis"',
      '"cantilever"',
      '"ring"',
      '"gear"',
      '"belt"',
      '"fixed"',
      '"sections"',
      '"adjusted"',
    ])
      has(part, joints);
    expect(files.filter((file) => file.cases?.some((entry) => entry.motion)).length).toBeGreaterThanOrEqual(2);
    const six = fileOf('six-joint.arm.json');
    expect(six.cases?.length).toBe(3);
    expect(six.cases?.filter((entry) => entry.tip_force?.direction === 'any').length).toBe(1);
    expect(six.cases?.some((entry) => entry.motion)).toBe(false);
  });
});
