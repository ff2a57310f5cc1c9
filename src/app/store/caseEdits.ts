/** Edits of the load cases and the targets in the arm file, in its own units. A key set to undefined is left out of the file. */
import type { ArmFile, CaseFile } from '../../arm/armFile.ts';

export type TargetsFile = NonNullable<ArmFile['targets']>;

/** The same object without the keys that are undefined, so that an edit taken back gives the text that was there. */
function defined<T extends object>(value: { readonly [K in keyof T]: T[K] | undefined }): T {
  return Object.fromEntries(Object.entries(value).filter(([, entry]) => entry !== undefined)) as T;
}

export type CaseChange = { readonly [K in keyof CaseFile]?: CaseFile[K] | undefined };

export function withCase(file: ArmFile, index: number, change: CaseChange): ArmFile {
  const cases = (file.cases ?? []).map((one, k) => (k === index ? defined<CaseFile>({ ...one, ...change }) : one));
  return { ...file, cases };
}

/** Another name, in the duty too, which goes by it. */
export function withCaseName(file: ArmFile, index: number, name: string): ArmFile {
  const before = file.cases?.[index]?.name;
  const duty = file.duty?.map((segment) => (segment.case === before ? { ...segment, case: name } : segment));
  return { ...withCase(file, index, { name }), ...(duty ? { duty } : {}) };
}

/** A case at the end, a copy of another where one is given. */
export function withNewCase(file: ArmFile, name: string, like?: CaseFile): ArmFile {
  return { ...file, cases: [...(file.cases ?? []), { ...like, name }] };
}

export function withoutCase(file: ArmFile, index: number): ArmFile {
  return { ...file, cases: (file.cases ?? []).filter((_, k) => k !== index) };
}

/** A name that no case has yet. */
export function freeCaseName(file: ArmFile, wish: string): string {
  const taken = new Set((file.cases ?? []).map((one) => one.name));
  let name = wish;
  for (let k = 2; taken.has(name); k++) name = `${wish} ${k}`;
  return name;
}

export function withTarget(file: ArmFile, key: keyof TargetsFile, value: number | undefined): ArmFile {
  const targets = defined<TargetsFile>({ ...file.targets, [key]: value });
  const { targets: _, ...rest } = file;
  return Object.keys(targets).length === 0 ? rest : { ...file, targets };
}
