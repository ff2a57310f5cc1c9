import { afterAll, describe, expect, it } from 'vitest';
import { readArmValue } from '../../src/arm/readArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { poseArm } from '../../src/studies/poseArm.ts';
import { armload, complaints, model, modelFile, scratchFolder } from './armload.ts';

const scratch = scratchFolder();
afterAll(() => scratch.remove());

describe('armload pose', () => {
  it('prints the contract shape with --json, equal to the engine, and nothing else on standard output', async () => {
    const at = [10, 30, -60, 20, 45];
    const ran = await armload(['pose', model('picking-arm'), `--at=${at.join(',')}`, '--json']);
    expect(ran.stdout.endsWith('\n') && ran.stdout.indexOf('\n') === ran.stdout.length - 1).toBe(true);
    const document = JSON.parse(ran.stdout);
    expect(document.armload).toBe(1);
    const reading = readArmValue(modelFile('picking-arm'));
    if (!reading.ok) throw new Error('the model is not sound');
    const { arm } = reading;
    expect(document.arm).toBe(arm.name);
    const expected = poseArm(
      arm,
      flattenArm(arm),
      at.map((angle) => (angle * Math.PI) / 180),
    );
    expect(document.results.map((r: { case: string }) => r.case)).toEqual(arm.cases.map((c) => c.name));
    document.results.forEach((result: Record<string, unknown>, k: number) => {
      expect(result.pose_deg).toEqual(at);
      const joints = result.joints as Record<string, never>[];
      expect(joints.map((j) => j.joint)).toEqual(['slew', 'shoulder', 'elbow', 'wrist pitch', 'wrist roll']);
      joints.forEach((joint, i) => {
        const mine = expected[k]!.joints[i]!;
        expect(joint.force_N).toEqual(mine.force.map((v) => v + 0));
        expect(joint.moment_Nm).toEqual(mine.moment.map((v) => v + 0));
        expect(joint.torque_Nm).toBe(mine.torque + 0);
        for (const name of ['A', 'B'] as const) {
          const load = (joint.bearings as unknown as Record<string, Record<string, unknown>>)[name]!;
          expect(load.radial_N).toBe(mine.bearings[name]!.radial);
          expect(load.radial_vector_N).toEqual(mine.bearings[name]!.radialVector.map((v) => v + 0));
          expect(load.axial_N).toBe(mine.bearings[name]!.axial + 0);
        }
      });
    });
  });

  it('takes one case, or several, in the order of the file', async () => {
    const names = (text: string) => JSON.parse(text).results.map((r: { case: string }) => r.case);
    const all = names((await armload(['pose', model('two-link'), '--at', '0,0', '--json'])).stdout);
    expect(all).toHaveLength(3);
    const one = await armload(['pose', model('two-link'), '--at', '0,0', '--json', '--case', all[1]]);
    expect(names(one.stdout)).toEqual([all[1]]);
    const two = await armload(['pose', model('two-link'), '--at', '0,0', '--json', '--case', all[2], '--case', all[0]]);
    expect(names(two.stdout)).toEqual([all[0], all[2]]);
  });

  it('gives the tip error with its target, and from which joint it comes; 1 where it is over', async () => {
    const file = modelFile('two-link');
    const path = (mm: number) =>
      scratch.write('tip.arm.json', { ...file, targets: { ...file.targets, tip_error_mm: mm } });
    const at = ['--at=0,0', '--case', 'hold the grinder'];
    const ran = await armload(['pose', path(5), ...at, '--json']);
    expect(ran.code).toBe(0);
    const { whole_arm, tip_error } = JSON.parse(ran.stdout).results[0];
    const [row] = whole_arm;
    expect(row).toMatchObject({ check: 'tip error', unit: 'm', allowable: 0.005, verdict: 'pass' });
    expect(row.utilisation).toBeCloseTo(row.value / 0.005, 12);
    expect(tip_error.shares.map(({ joint }: { joint: string }) => joint)).toEqual(['shoulder', 'elbow']);
    const sum = tip_error.shares.reduce((total: number, share: { share_m: number }) => total + share.share_m, 0);
    expect(sum).toBeCloseTo(row.value, 12);
    const tight = await armload(['pose', path(row.value * 999), ...at]);
    expect(tight.code).toBe(1);
    expect(tight.stdout).toMatch(/tip error .* over/);
    expect(tight.stdout).toMatch(/Tip error in mm, by joint: shoulder [\d.-]+, elbow [\d.-]+; of play/);
  });

  it('prints tables for people, with the caution on standard error', async () => {
    const ran = await armload(['pose', model('two-link'), '--at=-10,20']);
    expect(ran.code).toBe(0);
    expect(ran.stdout).toMatch(/Joint loads\njoint +Fx N +Fy N/);
    expect(ran.stdout).toMatch(/Bearing loads\njoint +bearing +radial N/);
    expect(ran.stderr).toContain('competent engineer');
    expect(ran.stdout).not.toContain('competent engineer');
    // Nothing ragged: every line of a table is cut at its last word.
    for (const line of ran.stdout.split('\n')) expect(line).toBe(line.trimEnd());
  });

  it('warns of an angle outside its travel and computes all the same', async () => {
    const file = modelFile('swing-joint');
    file.joints[0].travel_deg = [-20, 30];
    const path = scratch.write('narrow.arm.json', file);
    const ran = await armload(['pose', path, '--at=45', '--json']);
    expect(ran.code).toBe(0);
    const name = file.joints[0].name;
    const warning = `joint "${name}" at 45° is outside its travel of -20° to 30°`;
    expect(complaints(ran)).toEqual([`armload: warning: ${warning}`]);
    const document = JSON.parse(ran.stdout);
    expect(document.warnings).toEqual([warning]);
    expect(document.results[0].joints[0].bearings.A.radial_N).toBeGreaterThan(0);
    for (const edge of ['-20', '30', '30.0']) {
      expect(complaints(await armload(['pose', path, `--at=${edge}`, '--json']))).toEqual([]);
    }
  });

  it('says what a case leaves free', async () => {
    const file = modelFile('swing-joint');
    file.cases = [{ name: 'press', tip_force: { force_N: 50, direction: 'any' } }];
    const ran = await armload(['pose', scratch.write('press.arm.json', file), '--at=0']);
    expect(ran.stdout).toContain('Free: the direction of the tip force.');
    const fixed = await armload(['pose', scratch.write('press.arm.json', file), '--at=0', '--json']);
    expect(JSON.parse(fixed.stdout).results[0].free).toBe('the direction of the tip force');
  });

  it('reads standard input', async () => {
    const text = JSON.stringify(modelFile('swing-joint'));
    const piped = await armload(['pose', '-', '--at=0', '--json'], { stdin: text });
    const named = await armload(['pose', model('swing-joint'), '--at=0', '--json']);
    expect(piped.code).toBe(0);
    expect(piped.stdout).toBe(named.stdout);
  });
});
