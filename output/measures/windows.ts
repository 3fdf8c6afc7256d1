import { byMean, type Estimate, SHARE } from './estimate.ts';
import { type Felt, overElements, samplesOf } from './felt.ts';
import { windowSamples } from './swept.ts';
import type { WallMeasure } from './wallmeasure.ts';

/**
 * Share of elements that are hit at least once in the asked time, averaged over all windows of that length that fit into the recording.
 * The series has one entry per window, named by its first sample; that windows overlap shows in the series' own correlation.
 * @param hit the element is hit in a sample
 */
function hitInWindows(
  walls: readonly Felt[],
  within_s: number,
  hit: (element: { magnitude_Pa: Float32Array; gas: Uint8Array }, i: number) => boolean,
): Estimate {
  const samples = samplesOf(walls);
  const window = windowSamples(within_s, walls[0].surface.every_s);
  return byMean(
    overElements(walls, samples - window + 1, (sums, element) => {
      // every window is hit that starts at most a window before a hit; `from` is the first not yet counted
      let from = 0;
      for (let i = 0; i < samples; i++) {
        if (!hit(element, i)) continue;
        const end = Math.min(i + 1, sums.length);
        for (let w = Math.max(from, i - window + 1); w < end; w++) sums[w]++;
        from = end;
      }
    }),
    SHARE,
  );
}

/** Fraction swept within the asked time; swept.ts says what that is, and holds its curves. */
export const sweptWithin: WallMeasure = {
  stem: 'swept',
  unit: '',
  range: SHARE,
  estimate: (walls, { above_Pa, within_s }) => hitInWindows(walls, within_s, ({ magnitude_Pa }, i) => magnitude_Pa[i] > above_Pa),
};

/** The same for being touched by gas. */
export const touchedWithin: WallMeasure = {
  stem: 'touched',
  unit: '',
  range: SHARE,
  estimate: (walls, { within_s }) => hitInWindows(walls, within_s, ({ gas }, i) => gas[i] > 0),
};
