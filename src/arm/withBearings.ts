/** A table of bearings put into an arm file, which is left as it is. */
import type { ArmFile, BearingFile } from './armFile.ts';

/** The table `bearings` with `more` in it; what has a name already is replaced in its place. Judge the result with `readArmValue`. */
export function withBearings(file: ArmFile, more: Readonly<Record<string, BearingFile>>): ArmFile {
  if (Object.keys(more).length === 0) return file;
  return { ...file, bearings: { ...file.bearings, ...more } };
}

/** Names of the bearings that the joints of a file ask for. */
export function namedBearings(file: ArmFile): ReadonlySet<string> {
  const names = file.joints.flatMap((joint) => {
    if (joint.kind !== 'revolute' || !joint.support) return [];
    const { support } = joint;
    return support.arrangement === 'ring' ? [support.bearing] : [support.bearings?.A, support.bearings?.B];
  });
  return new Set(names.filter((name) => name !== undefined));
}
