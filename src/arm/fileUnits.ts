/** The unit a key of the arm file carries at its end. Longer endings come first: `C0_N` is newtons, `stiffness_N_um` is not micrometres. */
const ENDINGS: readonly (readonly [string, string])[] = [
  ['_mm3_N_m', 'mm³/N/m'],
  ['_MPa_m_s', 'MPa·m/s'],
  ['_kg_m2', 'kg·m²'],
  ['_deg_s2', '°/s²'],
  ['_per_min', '1/min'],
  ['_N_um', 'N/µm'],
  ['_m_s2', 'm/s²'],
  ['_deg_s', '°/s'],
  ['_mrad', 'mrad'],
  ['_m_s', 'm/s'],
  ['_MPa', 'MPa'],
  ['_deg', '°'],
  ['_mm', 'mm'],
  ['_um', 'µm'],
  ['_kg', 'kg'],
  ['_N', 'N'],
  ['_h', 'h'],
  ['_s', 's'],
];

/** `span_mm` → `mm`; null for a key without a unit. Every answer is a spelling that `parseEntry` takes. */
export function unitOfKey(key: string): string | null {
  for (const [ending, unit] of ENDINGS) if (key.endsWith(ending)) return unit;
  return null;
}
