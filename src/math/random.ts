/** A small seeded generator for tests, benchmarks and start points: the same seed gives the same numbers everywhere. */
export interface Random {
  /** Uniform in [0, 1). */
  next(): number;
  between(low: number, high: number): number;
  /** Whole number in [0, n). */
  below(n: number): number;
  /** Uniform on the unit sphere. */
  direction(): [number, number, number];
}

/** mulberry32 (public domain, Tommy Ettinger), 32 bits of state. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  const between = (low: number, high: number) => low + (high - low) * next();
  return {
    next,
    between,
    below: (n) => Math.floor(n * next()),
    direction: () => {
      const z = between(-1, 1);
      const angle = between(0, 2 * Math.PI);
      const r = Math.sqrt(1 - z * z);
      return [r * Math.cos(angle), r * Math.sin(angle), z];
    },
  };
}
