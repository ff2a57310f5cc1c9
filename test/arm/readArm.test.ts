import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { issueText } from '../../src/arm/issue.ts';
import { readArm, readArmValue } from '../../src/arm/readArm.ts';
import { writeArm } from '../../src/arm/writeArm.ts';
import { CONTRACT_EXAMPLE } from './contractExample.ts';
import { wholeFile } from './wholeFile.ts';

function arm(text: string): Arm {
  const reading = readArm(text);
  if (!reading.ok) throw new Error(reading.issues.map(issueText).join('\n'));
  return reading.arm;
}

describe('the contract example', () => {
  it('reads, and warns of the bearing that its table lacks', () => {
    const reading = readArm(CONTRACT_EXAMPLE);
    expect(reading.ok).toBe(true);
    expect(reading.warnings).toMatchObject([
      {
        code: 'unknown-name',
        path: ['joints', 0, 'support', 'bearings', 'B'],
        found: '"6003-like"',
        at: { line: 27, column: 41 },
      },
    ]);
  });

  it('is this arm in SI, by hand', () => {
    const read = arm(CONTRACT_EXAMPLE);
    const degree = Math.PI / 180;
    expect(read).toEqual({
      name: 'Glasshouse picking arm',
      note: 'optional free text',
      gravity: [0, 0, -9.80665],
      joints: [
        {
          name: 'slew',
          kind: 'revolute',
          placement: { position: [0, 0, 0.14], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
          axis: [0, 0, 1],
          travel: { from: -170 * degree, to: 170 * degree, full: false },
          link: {
            name: 'turret',
            mass: 6.2,
            centre: [0, 0.04, 0.09],
            inertia: { xx: 0.05, yy: 0.04, zz: 0.03, xy: 0, xz: 0, yz: 0 },
          },
          support: {
            arrangement: 'cantilever',
            hub: 0,
            span: 0.07,
            offset: 0,
            overhang: 0.035,
            side: '-',
            // Hub at 0, bearings against the axis: near at -35 mm, far at -35 - 70 = -105 mm.
            stationA: -0.035,
            stationB: -0.105,
            thrust: 'A',
            adjusted: null,
            bearingA: '6004-like',
            bearingB: '6003-like',
            shaft: {
              diameter: 0.02,
              bore: 0.008,
              material: 'steel-c45',
              turnsWith: 'link',
              finish: 'machined',
              sections: [],
            },
          },
          drive: { kind: 'gear', station: -0.02, radius: 0.03, pressureAngle: 20 * degree, mesh: Math.PI / 2 },
        },
      ],
      tip: { position: [0, 0, 0.09], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
      cases: [
        {
          name: 'carry',
          payload: { mass: 5, centre: [0, 0, 0.06], inertia: null },
          tipForce: null,
          motion: null,
          factor: 1,
        },
        { name: 'press', payload: null, tipForce: { magnitude: 60, direction: 'any' }, motion: null, factor: 1 },
        {
          name: 'press down',
          payload: null,
          tipForce: { magnitude: 60, direction: 'base', unit: [0, 0, -1] },
          motion: null,
          factor: 1,
        },
        {
          name: 'stop',
          payload: null,
          tipForce: null,
          motion: { speed: [Math.PI / 2], accel: [400 * degree] },
          factor: 1,
        },
      ],
      bearings: {
        '6004-like': {
          kind: 'deep-groove',
          bore: 0.02,
          outer: 0.042,
          width: 0.012,
          C: 9400,
          C0: 5000,
          contactAngle: null,
          e: null,
          Y: null,
          Y0: null,
          f0: null,
          pitchDiameter: null,
          ballDiameter: null,
          balls: null,
          rows: 1,
          clearance: 'CN',
          shaftFit: null,
          housingFit: null,
          misalignment: null,
          stiffness: null,
          source: null,
        },
      },
      duty: null,
      targets: {
        staticSafety: 1.5,
        life: 72_000_000, // 20 000 h of 3600 s
        reliability: null,
        shaftYieldSafety: null,
        shaftFatigueSafety: null,
        slope: null,
        tipError: null,
        pressure: null,
        pv: null,
      },
    });
  });
});

describe('a file with everything', () => {
  const read = () => arm(writeArm(wholeFile()));

  it('reads without issues or warnings', () => {
    const reading = readArm(writeArm(wholeFile()));
    expect(reading.ok).toBe(true);
    expect(reading.warnings).toEqual([]);
  });

  it('places a clevis pair about the hub: 5 - 10 ± 40 mm', () => {
    expect(read().joints[0]!.support).toMatchObject({
      arrangement: 'clevis',
      hub: 0.005,
      offset: -0.01,
      stationA: -0.045,
      stationB: 0.035,
    });
  });

  it('places a cantilever pair on side +: near at 20, far at 60 mm', () => {
    expect(read().joints[1]!.support).toMatchObject({
      arrangement: 'cantilever',
      side: '+',
      stationA: 0.02,
      stationB: 0.06,
    });
  });

  it('places a ring, at its hub where no station is given', () => {
    expect(read().joints[2]!.support).toMatchObject({ arrangement: 'ring', hub: 0.01, station: 0, bearing: 'ring' });
    const file = wholeFile();
    const joint = file.joints[2]!;
    if (joint.kind === 'revolute' && joint.support?.arrangement === 'ring') delete joint.support.station_mm;
    expect(arm(writeArm(file)).joints[2]!.support).toMatchObject({ station: 0.01 });
  });

  it('turns frames by roll, pitch and yaw with quarter turns exact', () => {
    const [shoulder, , wrist] = read().joints;
    expect(shoulder!.placement.rotation).toEqual([1, 0, 0, 0, 0, -1, 0, 1, 0]);
    expect(wrist!.placement.rotation).toEqual([0, 0, 1, 0, 1, 0, -1, 0, 0]);
    expect(read().tip.rotation).toEqual([1, 0, 0, 0, -1, 0, 0, 0, -1]);
  });

  it('makes unit vectors of axis and directions', () => {
    expect(read().joints[0]!.axis).toEqual([0, 0, 1]);
    expect(read().joints[1]!.axis).toEqual([0, 0, -1]);
    expect(read().cases[2]!.tipForce).toEqual({ magnitude: 50, direction: 'tool', unit: [0, 0, -1] });
    expect(read().cases[3]!.tipForce).toEqual({ magnitude: 50, direction: 'base', unit: [0.6, 0, 0.8] });
  });

  it('takes a travel of 360° or more as one full turn', () => {
    expect(read().joints[2]!.travel).toEqual({ from: -Math.PI, to: Math.PI, full: true });
    const file = wholeFile();
    const joint = file.joints[2]!;
    if (joint.kind === 'revolute') joint.travel_deg = [-720, 720];
    expect(arm(writeArm(file)).joints[2]!.travel).toEqual({ from: -4 * Math.PI, to: -2 * Math.PI, full: true });
  });

  it('holds a fixed joint at 0 and names a nameless link after its joint', () => {
    expect(read().joints[3]).toMatchObject({
      kind: 'fixed',
      travel: { from: 0, to: 0, full: false },
      support: null,
      drive: null,
      link: { name: 'flange' },
    });
  });

  it('reads shaft sections, whose bore is that of the shaft where they give none', () => {
    expect(read().joints[1]!.support!.shaft).toEqual({
      diameter: 0.02,
      bore: 0.005,
      material: null,
      turnsWith: 'link',
      finish: 'machined',
      sections: [
        {
          from: -0.01,
          to: 0.04,
          diameter: 0.02,
          bore: 0.005,
          bendingFactor: 1.8,
          torsionFactor: 1.5,
          notchRadius: 0.0008,
        },
        { from: 0.04, to: 0.07, diameter: 0.015, bore: 0.004, bendingFactor: 1, torsionFactor: 1, notchRadius: null },
      ],
    });
  });

  it('reads every bearing field in SI', () => {
    const { groove, angular, bush } = read().bearings;
    expect(groove).toMatchObject({
      f0: 13.9,
      pitchDiameter: 0.031,
      ballDiameter: 0.00635,
      balls: 9,
      rows: 1,
      clearance: 'C3',
      shaftFit: 'k5',
      housingFit: 'H7',
      stiffness: 1.2e8,
      source: 'invented',
    });
    expect((groove as { misalignment: number }).misalignment).toBeCloseTo(0.1 * (Math.PI / 180), 15);
    expect((angular as { contactAngle: number }).contactAngle).toBeCloseTo(0.436332312998582, 15);
    const clearance = (angular as { clearance: { from: number; to: number } }).clearance;
    expect(clearance.from).toBeCloseTo(2e-6, 20);
    expect(clearance.to).toBeCloseTo(8e-6, 20);
    expect(bush).toEqual({
      kind: 'plain-bushing',
      bore: 0.015,
      outer: 0.021,
      width: 0.015,
      pressureLimit: 1e7,
      speedLimit: 2,
      pvLimit: 1.5e6,
      flangeOuter: 0.024,
      wearFactor: 2e-16,
      wearDepth: 2e-4,
      clearance: 30e-6,
      stiffness: 8e7,
      source: 'invented',
    });
  });

  it('reads belt, duty and targets in SI', () => {
    expect(read().joints[1]!.drive).toEqual({
      kind: 'belt',
      station: 0.08,
      radius: 0.025,
      pull: Math.PI,
      pretension: 100,
      tensionRatio: 1.3,
    });
    const duty = read().duty!;
    expect(duty[0]).toMatchObject({ case: 'carry', share: 0.75, motion: { kind: 'path', time: [0, 2.5] } });
    const first = duty[0]!.motion;
    expect(first.kind === 'path' ? first.pose[1]![0] : null).toBeCloseTo((2 * Math.PI) / 3, 15);
    expect(duty[1]!.motion).toEqual({ kind: 'anywhere', cyclesPerMinute: [2, 3, 4] });
    expect(read().targets).toEqual({
      staticSafety: 1.5,
      life: 7.2e7,
      reliability: 0.95,
      shaftYieldSafety: 2,
      shaftFatigueSafety: 1.5,
      slope: 0.001,
      tipError: 0.0005,
      pressure: 8e6,
      pv: 1.2e6,
    });
  });

  it('has the case of its own weight where the file gives none', () => {
    for (const cases of [undefined, []]) {
      const file = wholeFile();
      if (cases) file.cases = cases;
      else delete file.cases;
      delete file.duty;
      expect(arm(writeArm(file)).cases).toEqual([
        { name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 },
      ]);
    }
  });

  it('may lie weightless', () => {
    expect(arm(writeArm({ ...wholeFile(), gravity_m_s2: [0, 0, 0] })).gravity).toEqual([0, 0, 0]);
  });

  it('reads alike as text and as value, and with a byte order mark', () => {
    const text = writeArm(wholeFile());
    const value = readArmValue(wholeFile());
    expect(value.ok && value.arm).toEqual(arm(text));
    expect(arm(`\ufeff${text}`)).toEqual(arm(text));
  });
});

describe('warnings', () => {
  it('of a payload in motion without inertia, which counts as a point mass', () => {
    const file = wholeFile();
    delete file.cases![0]!.payload!.inertia_kg_m2;
    const reading = readArmValue(file);
    expect(reading.ok).toBe(true);
    expect(reading.warnings).toMatchObject([{ code: 'point-mass', path: ['cases', 0, 'payload', 'inertia_kg_m2'] }]);
  });

  it('of a bearing whose bore is not the diameter of its seat, and of rings that overlap', () => {
    const file = wholeFile();
    file.bearings!.groove!.bore_mm = 25;
    const elbow = file.joints[1]!;
    if (elbow.kind === 'revolute' && elbow.support?.arrangement === 'cantilever') elbow.support.span_mm = 13;
    const reading = readArmValue(file);
    expect(reading.ok).toBe(true);
    expect(reading.warnings.map((issue) => [issue.code, issue.path.join('.')])).toEqual([
      ['seat', 'joints.1.support.bearings.A'],
      ['seat', 'joints.1.support.bearings.B'],
      ['geometry', 'joints.1.support.span_mm'],
    ]);
  });
});
