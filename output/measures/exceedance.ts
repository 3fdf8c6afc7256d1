/** How often a series lies above a threshold (strictly), and how often it rises above it. */
export interface Exceedance {
  /** samples above */
  above: number;
  /** samples above whose predecessor was not: an excursion already under way at the first sample had its rise before */
  rises: number;
}

export function exceedance(values: Float32Array, threshold: number): Exceedance {
  let above = 0;
  let rises = 0;
  let wasAbove = true;
  for (let i = 0; i < values.length; i++) {
    const isAbove = values[i] > threshold;
    if (isAbove) {
      above++;
      if (!wasAbove) rises++;
    }
    wasAbove = isAbove;
  }
  return { above, rises };
}
