/**
 * Random numbers that are the same on every machine: a counter stepped by an odd constant, mixed by the 32-bit finaliser of
 * MurmurHash3 (Appleby, public domain). The construction is that of Steele, Lea & Flood 2014, OOPSLA, "Fast splittable pseudorandom
 * number generators", with 32-bit constants (from memory). Its period is 2^32, far beyond the bubbles of a run.
 */

const STEP = 0x9e3779b9;

/** The whole state is one unsigned 32-bit number. */
export interface Generator {
  state: number;
}

/** A generator whose neighbouring seeds give unrelated streams. */
export function seeded(seed: number): Generator {
  return { state: mix(seed >>> 0) };
}

/** The next number of an even distribution in [0, 1). */
export function next(generator: Generator): number {
  generator.state = (generator.state + STEP) >>> 0;
  return mix(generator.state) / 2 ** 32;
}

/** The next number of a normal distribution with mean 0 and deviation 1 (Box & Muller 1958, Ann. Math. Stat. 29, 610; from memory). */
export function nextNormal(generator: Generator): number {
  const radius = Math.sqrt(-2 * Math.log(1 - next(generator)));
  return radius * Math.cos(2 * Math.PI * next(generator));
}

function mix(word: number): number {
  let h = word;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}
