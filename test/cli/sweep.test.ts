import { afterAll, describe, expect, it } from 'vitest';
import { readArmValue } from '../../src/arm/readArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { gridOf, poseAt } from '../../src/mechanics/gridSweepGrid.ts';
import { isLasting } from '../../src/studies/lastingRows.ts';
import { poseArm } from '../../src/studies/poseArm.ts';
import { toSI } from '../../src/units/unit.ts';
import { armload, complaints, model, modelFile, scratchFolder } from './armload.ts';

const scratch = scratchFolder();
afterAll(() => scratch.remove());

interface Row {
  bearing: string | null;
  check: string;
  value: number;
  unit: string;
  pose_deg: number[];
  case: string;
  [key: string]: unknown;
}

async function sweep(...args: string[]) {
  const ran = await armload(['sweep', ...args, '--json']);
  return {
    ...ran,
    document: JSON.parse(ran.stdout) as {
      poses: number;
      joints: { joint: string; checks: Row[] }[];
      [key: string]: unknown;
    },
  };
}

describe('armload sweep', () => {
  it('gives the contract rows, equal to every pose of the grid looked at one by one', async () => {
    const reading = readArmValue(modelFile('picking-arm'));
    if (!reading.ok) throw new Error('the model is not sound');
    const chain = flattenArm(reading.arm);
    const outcome = gridOf(chain, { samples: 4 });
    if (!outcome.ok) throw new Error('refused');
    const pose = new Float64Array(chain.n);
    const names = [reading.arm.cases.find((load) => !load.motion && load.tipForce?.direction !== 'any')!.name];
    const only = await sweep(model('picking-arm'), '--samples', '4', '--case', names[0]!);
    expect(only.document).toMatchObject({
      armload: 1,
      arm: reading.arm.name,
      poses: outcome.grid.poses,
      partial: false,
    });
    expect(only.document.seconds).toBeGreaterThanOrEqual(0);
    const worst = chain.names.map(() => ({ A: 0, B: 0, axialA: 0, axialB: 0, torque: 0 }));
    for (let index = 0; index < outcome.grid.poses; index++) {
      poseAt(outcome.grid, index, pose);
      poseArm(reading.arm, chain, [...pose], names)[0]!.joints.forEach((joint, i) => {
        const entry = worst[i]!;
        entry.A = Math.max(entry.A, joint.bearings.A!.radial);
        entry.B = Math.max(entry.B, joint.bearings.B!.radial);
        entry.axialA = Math.max(entry.axialA, Math.abs(joint.bearings.A!.axial));
        entry.axialB = Math.max(entry.axialB, Math.abs(joint.bearings.B!.axial));
        entry.torque = Math.max(entry.torque, Math.abs(joint.torque));
      });
    }
    only.document.joints.forEach((joint, i) => {
      const value = (bearing: string | null, check: string) =>
        joint.checks.find((row) => row.bearing === bearing && row.check === check)!.value;
      const expected = worst[i]!;
      expect(joint.joint).toBe(chain.names[i]);
      expect(value('A', 'radial')).toBeCloseTo(expected.A, 8);
      expect(value('B', 'radial')).toBeCloseTo(expected.B, 8);
      expect(value('A', 'axial')).toBeCloseTo(expected.axialA, 8);
      expect(value('B', 'axial')).toBeCloseTo(expected.axialB, 8);
      expect(value(null, 'torque')).toBeCloseTo(expected.torque, 8);
      expect(value(null, 'moment')).toBeGreaterThanOrEqual(0);
    });
  });

  it('prints rows whose pose gives their value again with `pose`', async () => {
    const { document } = await sweep(model('two-link'), '--step', '10');
    for (const joint of document.joints) {
      for (const row of joint.checks.filter((r) => r.check === 'radial')) {
        const at = row.pose_deg.join(',');
        const ran = await armload(['pose', model('two-link'), `--at=${at}`, '--case', row.case, '--json']);
        const loads = JSON.parse(ran.stdout).results[0].joints.find((j: { joint: string }) => j.joint === joint.joint);
        expect(loads.bearings[row.bearing!].radial_N / row.value).toBeCloseTo(1, 10);
      }
    }
  });

  it('shortens the step to fit and counts both ends', async () => {
    const file = modelFile('swing-joint');
    file.joints[0].travel_deg = [-50, 50];
    const path = scratch.write('swing.arm.json', file);
    expect((await sweep(path, '--step', '15')).document.poses).toBe(8);
    expect((await sweep(path, '--step', '25')).document.poses).toBe(5);
    expect((await sweep(path)).document.poses).toBe(9);
  });

  it('gives the same answer for any number of workers', async () => {
    const texts = [];
    for (const workers of ['1', '2', '3']) {
      const { stdout } = await armload(['sweep', model('six-joint'), '--samples', '5', '--json', '--workers', workers]);
      texts.push(stdout.replace(/"seconds":[^,]+,/, ''));
    }
    expect(new Set(texts).size).toBe(1);
  });

  it('goes case by case where asked, never above the worst over all', async () => {
    const all = (await sweep(model('two-link'), '--samples', '9')).document;
    const each = (await sweep(model('two-link'), '--samples', '9', '--each-case')).document;
    const cases = modelFile('two-link').cases.map((c: { name: string }) => c.name);
    all.joints.forEach((joint, i) => {
      for (const row of joint.checks.filter((r) => !isLasting(r))) {
        const mine = each.joints[i]!.checks.filter((r) => r.bearing === row.bearing && r.check === row.check);
        expect(mine.map((r) => r.case)).toEqual(cases);
        expect(Math.max(...mine.map((r) => r.value))).toBeCloseTo(row.value, 8);
      }
    });
  });

  it('adds what no single pose tells, the same as `worst`; left out, and said so, where single cases are asked for', async () => {
    const at = async (verb: string, ...args: string[]) => {
      const ran = await armload([verb, model('wall-arm'), ...args, '--json']);
      const document = JSON.parse(ran.stdout) as { joints: { checks: Row[] }[]; whole_arm: Row[] };
      return {
        ran,
        rows: [...document.joints.flatMap(({ checks }) => checks), ...document.whole_arm].filter(isLasting),
      };
    };
    const swept = await at('sweep', '--samples', '2');
    const names = new Set(swept.rows.map((row) => row.check));
    expect([...names].sort()).toEqual([
      'fatigue',
      ...['flange pv', 'flange speed', 'flange wear life'],
      ...['life', 'lost motion', 'play tilt', 'pv', 'speed', 'system life', 'tip error', 'wear life'],
    ]);
    expect((await at('worst', '--seconds', '2', '--gap', '0.5')).rows).toEqual(swept.rows);
    const one = await at('sweep', '--samples', '2', '--case', 'full crate');
    expect(one.rows).toEqual([]);
    expect(complaints(one.ran).join()).toContain('belong to no single case');
  });

  it('says what a row leaves out where it has no verdict too', async () => {
    const { document } = await sweep(model('two-link'), '--samples', '2');
    const lost = document.joints.flatMap(({ checks }) => checks).filter((row) => row.check === 'lost motion');
    expect(lost.length).toBe(4);
    for (const row of lost) {
      expect(row).not.toHaveProperty('verdict');
      expect(row.reason).toContain('what a case leaves free is left out');
    }
    const system = (document.whole_arm as Row[]).find((row) => row.check === 'system life')!;
    expect(system).not.toHaveProperty('verdict');
    expect(system.reason).toContain('point masses');
  });

  it('is 1 where a life is too short and nothing else is over', async () => {
    const file = modelFile('two-link');
    const short = { ...file, targets: { ...file.targets, life_h: 1e9 } };
    expect((await armload(['sweep', scratch.write('sound.arm.json', file), '--samples', '3'])).code).toBe(0);
    const ran = await armload(['sweep', scratch.write('short.arm.json', short), '--samples', '3']);
    expect(ran.code).toBe(1);
    expect(ran.stdout).toMatch(/life .* over /);
  });

  it('prints a table for people, its own doubts, and the caution on standard error', async () => {
    const ran = await armload(['sweep', model('two-link'), '--step', '20']);
    expect(ran.code).toBe(0);
    expect(ran.stdout).toMatch(/worst loads over \d+ poses in each of 3 cases, a step of at most 20°/);
    expect(ran.stdout).toMatch(/joint +bearing +check +worst +unit/);
    expect(ran.stdout).toContain('does not show that there is none worse');
    expect(ran.stderr).toContain('competent engineer');
  });

  it('stops at Ctrl-C with what it has, marked partial, and 130', async () => {
    const args = ['sweep', model('seven-joint'), '--step', '15', '--workers', '2'];
    const json = await armload([...args, '--json'], { interruptAfter: 2500 });
    expect(json.code).toBe(130);
    const document = JSON.parse(json.stdout);
    expect(document.partial).toBe(true);
    expect(document.poses_done).toBeLessThan(document.poses);
    expect(document.joints).toHaveLength(7);
    const text = await armload(args, { interruptAfter: 2500 });
    expect(text.code).toBe(130);
    expect(text.stdout).toMatch(/PART of [\d ]+ poses/);
  });

  it('refuses a grid that is too fine, and says how coarse it must be', async () => {
    const ran = await armload(['sweep', model('seven-joint'), '--step', '0.5']);
    expect(ran.code).toBe(3);
    expect(complaints(ran)).toHaveLength(1);
    const fits = /take a step of ([\d.]+)° or more/.exec(ran.stderr)![1]!;
    const reading = readArmValue(modelFile('seven-joint'));
    if (!reading.ok) throw new Error('the model is not sound');
    expect(gridOf(flattenArm(reading.arm), { step: toSI(Number(fits), '°') }).ok).toBe(true);
  });

  it('refuses wrong numbers', async () => {
    for (const [args, message] of [
      [['--step', '0'], /'--step <degrees>' argument '0' is invalid. It takes a number above 0/],
      [['--step', 'five'], /It takes a number above 0/],
      [['--samples', '1'], /It takes a whole number from 2/],
      [['--samples', '2.5'], /It takes a whole number from 2/],
      [['--workers', '0'], /It takes a whole number from 1 to 64/],
      [['--step', '5', '--samples', '5'], /give one of them/],
      [['--case', 'nil'], /there is no case "nil"/],
    ] as const) {
      const ran = await armload(['sweep', model('two-link'), ...args]);
      expect([args, ran.code, ran.stdout]).toEqual([args, 3, '']);
      expect(ran.stderr).toMatch(message);
      expect(ran.stderr.trimEnd().split('\n')).toHaveLength(1);
    }
  });
});
