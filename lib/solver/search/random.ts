/** A seeded stream of pseudo-random numbers: same seed, same stream, on every machine. */
export interface Random {
  /** In [0, 1). */
  unit(): number;
  /** An integer in [0, below). */
  below(below: number): number;
}

/** SplitMix (Steele, Lea and Flood 2014) with the 32-bit finaliser of MurmurHash3 (public domain). */
export function seededRandom(seed: number): Random {
  let state = (seed ^ 0x2f6e2b1) >>> 0;
  const unit = (): number => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return ((z ^ (z >>> 16)) >>> 0) / 4294967296;
  };
  return { unit, below: (below) => Math.floor(unit() * below) };
}
