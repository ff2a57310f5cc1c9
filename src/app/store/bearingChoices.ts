/** Bearings that a place of a joint can be given: those of the file, and those of the built table that fit its seat and kind of pair. */
import type { ArmFile, BearingFile } from '../../arm/armFile.ts';
import { bearingTable } from '../../capacity/rolling/index.ts';

export interface BearingChoice {
  readonly name: string;
  readonly entry: BearingFile;
  /** `name, bore×outside×width`. */
  readonly text: string;
}

export interface BearingChoices {
  readonly own: readonly BearingChoice[];
  /** Of the table, ratings estimated; of the seat's bore where the shaft is given. */
  readonly table: readonly BearingChoice[];
}

type Table = Readonly<Record<string, BearingFile>>;

let table: Table | null = null;

/** How far a bore may be from its seat, mm, as the arm file's own rule has it. */
const SEAT = 0.5;

function choice([name, entry]: [string, BearingFile]): BearingChoice {
  return { name, entry, text: `${name}, ${entry.bore_mm}×${entry.outer_mm}×${entry.width_mm}` };
}

/** `seat`: shaft diameter at the place, mm; null: not given. */
export function bearingChoices(file: ArmFile, index: number, seat: number | null): BearingChoices {
  const joint = file.joints[index];
  const support = joint?.kind === 'revolute' ? joint.support : undefined;
  if (!support) return { own: [], table: [] };
  const ring = support.arrangement === 'ring';
  const adjusted = !ring && support.adjusted !== undefined;
  const fits = ({ kind }: BearingFile) => {
    if (ring) return kind === 'crossed-roller' || kind === 'four-point';
    return adjusted ? kind === 'angular-contact' || kind === 'tapered-roller' : kind !== 'crossed-roller';
  };
  const own = Object.entries(file.bearings ?? {}).filter(([, entry]) => fits(entry));
  table ??= bearingTable();
  const more = Object.entries(table).filter(
    ([name, entry]) =>
      fits(entry) &&
      !Object.hasOwn(file.bearings ?? {}, name) &&
      (seat === null || Math.abs(entry.bore_mm - seat) <= SEAT),
  );
  return { own: own.map(choice), table: more.map(choice) };
}
