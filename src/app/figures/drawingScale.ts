/** Scales of a drawing (1:2.5 and the like) and round numbers for the scale of arrows. */

/** px a mm at full size on a 96 dpi screen, the CSS definition. */
export const PX_PER_MM = 96 / 25.4;

const RATIOS = [
  20,
  10,
  5,
  4,
  3,
  2.5,
  2,
  1.5,
  1.25,
  1,
  0.8,
  1 / 1.5,
  0.5,
  0.4,
  1 / 3,
  0.25,
  0.2,
  0.15,
  0.1,
  0.05,
  0.02,
  0.01,
];

/** The largest scale at which `across` by `up` mm fits in a box of px; `px` a mm and how it is written. */
export function drawingScale(across: number, up: number, width: number, height: number) {
  const room = Math.min(width / across, height / up) / PX_PER_MM;
  const ratio = RATIOS.find((each) => each <= room) ?? RATIOS.at(-1)!;
  return { px: ratio * PX_PER_MM, text: ratio >= 1 ? `${round(ratio)}:1` : `1:${round(1 / ratio)}` };
}

function round(value: number): string {
  return String(Number(value.toFixed(2)));
}

/** The largest of 1, 2, 5 times a power of ten that is not above `value`. */
export function roundDown(value: number): number {
  if (!(value > 0) || !Number.isFinite(value)) return 1;
  const power = 10 ** Math.floor(Math.log10(value));
  const lead = value / power;
  return (lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power;
}
