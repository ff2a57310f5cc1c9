import type { Arm } from '../arm/arm.ts';
import { flattenArm } from '../mechanics/chain.ts';
import { UsageError } from './exit.ts';
import type { OpenedArm } from './openArm.ts';

/** The cases asked for, or null for all; a name that the arm does not have is refused with those it has. */
export function chooseCases(arm: Arm, asked: readonly string[] | undefined): readonly string[] | null {
  if (!asked || asked.length === 0) return null;
  const names = arm.cases.map((load) => load.name);
  const unknown = asked.find((name) => !names.includes(name));
  if (unknown !== undefined) {
    throw new UsageError(`there is no case "${unknown}"; the cases are ${names.map((name) => `"${name}"`).join(', ')}`);
  }
  return asked;
}

/** The arm with the chosen cases alone, in the order of the file; the arm itself for null. */
export function onlyCases(opened: OpenedArm, names: readonly string[] | null): OpenedArm {
  if (!names) return opened;
  const arm = { ...opened.arm, cases: opened.arm.cases.filter((load) => names.includes(load.name)) };
  return { arm, chain: flattenArm(arm) };
}
