/** Series in time with a known mean, from a seed. */

/** Uniform numbers in [0, 1): a multiplicative generator of 31 bits, good enough for coverage. */
function uniform(seed: number): () => number {
  let state = (seed % 2147483646) + 1;
  const next = (): number => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
  for (let i = 0; i < 10; i++) next();
  return next;
}

/** Standard normal numbers, by two uniform ones each. */
export function normal(seed: number): () => number {
  const next = uniform(seed);
  return () => Math.sqrt(-2 * Math.log(next())) * Math.cos(2 * Math.PI * next());
}

/** x(i) = phi x(i - 1) + noise, mean 0, from its steady state; integrated correlation time (1 + phi) / (1 - phi). */
export function autoregression(n: number, phi: number, seed: number): Float64Array {
  const noise = normal(seed);
  const series = new Float64Array(n);
  series[0] = noise() / Math.sqrt(1 - phi * phi);
  for (let i = 1; i < n; i++) series[i] = phi * series[i - 1] + noise();
  return series;
}

/**
 * Passages at random times (probability `rate` per entry), each a bell of `width` entries and a random height of mean 1, over nothing.
 * The mean is rate times the sum of the bell.
 */
export function passages(n: number, rate: number, width: number, seed: number): { series: Float64Array; mean: number } {
  const next = uniform(seed);
  const noise = normal(seed + 1_000_000);
  const bell = Float64Array.from({ length: 4 * width + 1 }, (_, i) => Math.exp(-(((i - 2 * width) / (width / 2)) ** 2)));
  const series = new Float64Array(n);
  for (let at = -4 * width; at < n; at++) {
    if (next() >= rate) continue;
    const height = Math.exp(0.5 * noise() - 0.125);
    for (let i = Math.max(0, -at); i < bell.length && at + i < n; i++) series[at + i] += height * bell[i];
  }
  return { series, mean: rate * bell.reduce((sum, value) => sum + value, 0) };
}

const REPETITIONS = 500;

/** How often intervals hold the truth, where they are told, and how often they are told. */
export function coverage(
  truth: number,
  intervalOf: (seed: number) => readonly [number, number] | undefined,
): { held: number; told: number } {
  let held = 0;
  let told = 0;
  for (let seed = 1; seed <= REPETITIONS; seed++) {
    const ends = intervalOf(seed);
    if (ends === undefined) continue;
    told++;
    if (ends[0] <= truth && truth <= ends[1]) held++;
  }
  return { held: held / told, told: told / REPETITIONS };
}
