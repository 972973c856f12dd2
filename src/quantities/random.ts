/** A source of uniform numbers in [0, 1). Always seeded, always passed in. */
export type Random = () => number;

/**
 * Seeded uniform generator: xoshiro128** 1.1 (Blackman and Vigna 2018, "Scrambled linear pseudorandom number
 * generators"), state filled from the seed by SplitMix32. The same seed gives the same numbers on every machine.
 */
export function seededRandom(seed: number): Random {
  let mix = seed >>> 0;
  const next = () => {
    mix = (mix + 0x9e3779b9) >>> 0;
    let z = mix;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return (z ^ (z >>> 16)) >>> 0;
  };
  let a = next();
  let b = next();
  let c = next();
  let d = next();
  return () => {
    const r = Math.imul(rotl(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotl(d, 11);
    return r / 4294967296;
  };
}

function rotl(x: number, k: number): number {
  return (x << k) | (x >>> (32 - k));
}
