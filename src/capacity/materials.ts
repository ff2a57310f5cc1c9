/**
 * Shaft materials at room temperature. Strengths with their source and trust; elastic constants of all: Shigley Table A-5, from memory.
 * A key names alloy and condition, never a maker. Where the exact condition of a bar is not known, the weakest row of the alloy is named
 * without a condition (`steel-c45`, `steel-42crmo4`).
 */
import type { Assessed, Trust } from './rule.ts';

/**
 * Fully reversed bending of a polished specimen. Steel: an endurance limit, worked out from Sut (`shaft/endurance.ts`). Else
 * a strength, Pa, at a number of cycles: no endurance limit exists, so a pass holds for that many cycles only.
 */
export type FatigueBasis = 'steel' | { readonly strength: number; readonly cycles: number };

export interface Material {
  readonly key: string;
  readonly name: string;
  readonly condition: string;
  /** Young's modulus and yield and tensile strength, Pa. */
  readonly E: number;
  readonly Sy: number;
  readonly Sut: number;
  readonly poisson: number;
  /** kg/m³. */
  readonly density: number;
  readonly fatigue: FatigueBasis;
  readonly source: string;
  readonly trust: Trust;
  /** What the figures mean: minimum, typical, size. */
  readonly note: string;
}

type Row = readonly [key: string, name: string, condition: string, SyMPa: number, SutMPa: number];

const CARBON_SOURCE = 'Shigley 9th ed., Table A-20';
const CARBON_NOTE = 'estimated minimum for 18 to 32 mm bar';
const CARBON: readonly Row[] = [
  ['steel-1018-hr', 'Carbon steel 1018', 'hot rolled', 220, 400],
  ['steel-1018-cd', 'Carbon steel 1018', 'cold drawn', 370, 440],
  ['steel-1020-cd', 'Carbon steel 1020', 'cold drawn', 390, 470],
  ['steel-1040-hr', 'Carbon steel 1040', 'hot rolled', 290, 520],
  ['steel-1040-cd', 'Carbon steel 1040', 'cold drawn', 490, 590],
  ['steel-1045-hr', 'Carbon steel 1045', 'hot rolled', 310, 570],
  ['steel-1045-cd', 'Carbon steel 1045', 'cold drawn', 530, 630],
  ['steel-c45', 'Carbon steel C45 (figures of 1045)', 'hot rolled', 310, 570],
  ['steel-1050-cd', 'Carbon steel 1050', 'cold drawn', 580, 690],
];

const CHROMOLY_SOURCE = 'public alloy steel property table; same set rounded in Shigley Table A-21';
const CHROMOLY_NOTE = 'one heat, 13 mm specimen: typical, not minimum; thick bar is lower';
const CHROMOLY: readonly Row[] = [
  ['steel-4140-qt-205', 'Chromium-molybdenum steel 4140', 'oil quenched, tempered 205 °C', 1641, 1772],
  ['steel-4140-qt-315', 'Chromium-molybdenum steel 4140', 'oil quenched, tempered 315 °C', 1434, 1551],
  ['steel-4140-qt-425', 'Chromium-molybdenum steel 4140', 'oil quenched, tempered 425 °C', 1138, 1248],
  ['steel-4140-qt-540', 'Chromium-molybdenum steel 4140', 'oil quenched, tempered 540 °C', 834, 951],
  ['steel-4140-qt-650', 'Chromium-molybdenum steel 4140', 'oil quenched, tempered 650 °C', 655, 758],
  ['steel-42crmo4', 'Chromium-molybdenum steel 42CrMo4 (figures of 4140)', 'annealed 815 °C', 417, 655],
  ['steel-4140-normalised', 'Chromium-molybdenum steel 4140', 'normalised 870 °C', 655, 1020],
  ['steel-4140-annealed', 'Chromium-molybdenum steel 4140', 'annealed 815 °C', 417, 655],
];

const STAINLESS_SOURCE = 'bar minimum of ASTM A564';
const STAINLESS_NOTE = 'bar minimum; not verified';
const STAINLESS: readonly Row[] = [
  ['steel-s17400-h900', 'Precipitation-hardening stainless steel S17400', 'H900', 1170, 1310],
  ['steel-s17400-h1025', 'Precipitation-hardening stainless steel S17400', 'H1025', 1000, 1070],
  ['steel-s17400-h1150', 'Precipitation-hardening stainless steel S17400', 'H1150', 725, 930],
];

const MPA = 1e6;

interface Family {
  readonly E: number;
  readonly poisson: number;
  readonly density: number;
  readonly source: string;
  readonly trust: Trust;
  readonly note: string;
}

const steel =
  (family: Family) =>
  (row: Row): Material => ({
    key: row[0],
    name: row[1],
    condition: row[2],
    Sy: row[3] * MPA,
    Sut: row[4] * MPA,
    fatigue: 'steel',
    ...family,
  });

const LOW_ALLOY = { E: 207e9, poisson: 0.292, density: 7850 };

export const MATERIALS: readonly Material[] = [
  ...CARBON.map(steel({ ...LOW_ALLOY, source: CARBON_SOURCE, trust: 'verified', note: CARBON_NOTE })),
  ...CHROMOLY.map(steel({ ...LOW_ALLOY, source: CHROMOLY_SOURCE, trust: 'verified', note: CHROMOLY_NOTE })),
  ...STAINLESS.map(
    steel({
      E: 197e9,
      poisson: 0.272,
      density: 7800,
      source: STAINLESS_SOURCE,
      trust: 'from memory',
      note: STAINLESS_NOTE,
    }),
  ),
  {
    key: 'aluminium-6061-t6',
    name: 'Aluminium 6061',
    condition: 'T6, T651',
    E: 69e9,
    poisson: 0.33,
    density: 2700,
    Sy: 276 * MPA,
    Sut: 310 * MPA,
    fatigue: { strength: 97 * MPA, cycles: 5e8 },
    source: 'public materials reference; a second one gives 270/310 MPa',
    trust: 'verified',
    note: 'typical; minimum of extrusions about 240/260 MPa (from memory)',
  },
  {
    key: 'aluminium-7075-t6',
    name: 'Aluminium 7075',
    condition: 'T6, T651',
    E: 71.7e9,
    poisson: 0.33,
    density: 2810,
    Sy: 480 * MPA,
    Sut: 560 * MPA,
    fatigue: { strength: 159 * MPA, cycles: 5e8 },
    source: 'public materials references: 503/572 MPa in one, 480/560 MPa in another; the lower is used',
    trust: 'verified',
    note: 'typical',
  },
];

const BY_KEY = new Map(MATERIALS.map((material) => [material.key, material]));

/** The material of a key of an arm file; null or an unknown key is unassessed, with what may be filled in. */
export function findMaterial(key: string | null): Assessed<Material> {
  if (key === null) return { unassessed: 'the shaft names no material: fill in `material`' };
  const value = BY_KEY.get(key);
  if (value) return { value };
  return { unassessed: `the material “${key}” is not in the table; known are ${[...BY_KEY.keys()].join(', ')}` };
}

/** Shear modulus E/(2(1 + ν)), Pa. */
export function shearModulus(material: Material): number {
  return material.E / (2 * (1 + material.poisson));
}
