/** `armload check`: reads the file and lists its problems, or says it is sound. */
import { EXIT, type ExitCode } from './exit.ts';
import { inputName, readArmFile } from './openArm.ts';
import { print, warnIssues } from './output.ts';
import { issueObjects, problemLines } from './problems.ts';

export interface CheckOptions {
  readonly json?: boolean;
}

export async function check(file: string, options: CheckOptions): Promise<ExitCode> {
  const reading = await readArmFile(file);
  const warnings = issueObjects(reading.warnings);
  if (!reading.ok) {
    if (options.json)
      print(JSON.stringify({ armload: 1, sound: false, issues: issueObjects(reading.issues), warnings }));
    else print(problemLines(inputName(file), reading.issues).join('\n'));
    return EXIT.invalidFile;
  }
  const { arm } = reading;
  if (options.json) print(JSON.stringify({ armload: 1, arm: arm.name, sound: true, issues: [], warnings }));
  else {
    const turning = arm.joints.filter((joint) => joint.kind === 'revolute');
    const without = turning.filter((joint) => !joint.support).map((joint) => joint.name);
    print(
      `${inputName(file)} is sound: "${arm.name}", ${counted(turning.length, 'revolute joint')}, ${counted(arm.cases.length, 'case')}.`,
    );
    if (without.length > 0) print(`Without a support, so only the joint load is known: ${without.join(', ')}.`);
    warnIssues(reading.warnings);
  }
  return EXIT.pass;
}

function counted(count: number, what: string): string {
  return `${count} ${what}${count === 1 ? '' : 's'}`;
}
