import { describe, expect, it } from 'vitest';
import { readPathCsv } from '../../../src/capacity/duty/index.ts';

const names = ['slew', 'wrist pitch'];
const header = 'time_s,slew_deg,wrist pitch_deg';

function issues(text: string) {
  const reading = readPathCsv(text, names);
  return reading.ok ? [] : reading.issues.map(({ code, line, column }) => `${code} ${line}:${column}`);
}

describe('a path as CSV', () => {
  it('reads time and joint angles, in the form of the arm file and as SI', () => {
    const reading = readPathCsv(`${header}\n0,-90,10.5\n1.5,90,-10.5\n`, names);
    if (!reading.ok) throw new Error('refused');
    expect(reading.rows).toEqual([
      { time_s: 0, pose_deg: [-90, 10.5] },
      { time_s: 1.5, pose_deg: [90, -10.5] },
    ]);
    expect(reading.motion.time).toEqual([0, 1.5]);
    expect(reading.motion.pose[0]![0]).toBeCloseTo(-Math.PI / 2, 15);
  });

  it('takes columns in any order, other separators, quotes, a byte order mark and blank lines', () => {
    const text = '\uFEFF"wrist pitch_deg";time_s;slew_deg\r\n\r\n1;0;2\r\n"3";1e0;-4.25\r\n';
    const reading = readPathCsv(text, names);
    expect(reading.ok && reading.rows).toEqual([
      { time_s: 0, pose_deg: [2, 1] },
      { time_s: 1, pose_deg: [-4.25, 3] },
    ]);
  });

  it('names what is wrong with the header, with its place', () => {
    expect(issues('')).toEqual(['csv-header 1:1']);
    expect(issues('time_s,slew_deg\n0,1\n1,2')).toEqual(['csv-header 1:1']);
    expect(issues(`${header},speed\n0,1,2,3\n1,2,3,4`)).toEqual(['unknown-key 1:33']);
    expect(issues('time_s,slew_deg,slew_deg,wrist pitch_deg\n0,1,1,2\n1,2,2,3')).toEqual(['duplicate-key 1:17']);
    expect(issues(`${header}\n`)).toEqual(['wrong-length 1:1']);
    expect(issues(`${header}\n0,1,2`)).toEqual(['wrong-length 2:1']);
  });

  it('names every bad field, with line and column', () => {
    expect(issues(`${header}\n0,1,2\n1,,3\n2,x,4\n3,"1,5",1e999\n2.5,0,0\n4,0\n5,1,2,3`)).toEqual([
      'missing 3:3',
      'wrong-type 4:3',
      'wrong-type 5:3',
      'not-finite 5:9',
      'wrong-order 6:1',
      'missing 7:3',
      'csv-fields 8:7',
    ]);
    expect(issues(`${header}\n0,1,2\n0,1,2`)).toEqual(['wrong-order 3:1']);
    expect(issues(`${header}\n0,1,"2`)).toContain('csv-quote 2:5');
  });

  it('bears a path as long as the arm file allows, and no longer', () => {
    const rows = (count: number) =>
      `time_s,a_deg\n${Array.from({ length: count }, (_, k) => `${k},${k % 90}`).join('\n')}`;
    const reading = readPathCsv(rows(200_000), ['a']);
    expect(reading.ok && reading.rows.length).toBe(200_000);
    const long = readPathCsv(rows(200_001), ['a']);
    expect(long.ok ? [] : long.issues.map((issue) => issue.code)).toEqual(['too-long']);
  });
});
