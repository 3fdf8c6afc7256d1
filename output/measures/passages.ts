import type { Recording } from '../../cases/index.ts';
import type { Place, Places } from './felt.ts';
import { correlatedTime } from './interval.ts';
import { meanShear } from './mean.ts';

type ByPlace = Record<Place, number>;

/** What a recording's numbers rest on. */
export interface Basis {
  /** bubbles that rose through the middle of the membrane's height while it was recorded: in the wall's half of the gap; together: in either */
  passages: ByPlace;
  /** independent moments the recording is worth: samples over the corrected correlation time of the mean shear; null: never changed */
  independent: Record<Place, number | null>;
}

/**
 * Counts passages and independent moments. A bubble that comes back and passes again counts once while it can be followed; one that
 * merges or breaks at the very height may be missed.
 */
export function basisOf(recording: Recording, places: Places): Basis {
  const independent = (place: Place): number | null => {
    const { series } = meanShear.estimate(places[place], recording.case.swept);
    const time = correlatedTime(series);
    return time === undefined ? null : series.length / time;
  };
  return {
    passages: passages(recording),
    independent: { left: independent('left'), right: independent('right'), together: independent('together') },
  };
}

function passages({ bubbles, x_m, membrane, times_s, case: { channel } }: Recording): ByPlace {
  const counted: ByPlace = { left: 0, right: 0, together: 0 };
  if (times_s.length === 0) return counted;
  const middle_m = (x_m[membrane.first] + x_m[membrane.end - 1]) / 2;
  const below = new Set<number>();
  const passed = new Set<number>();
  for (const { time_s, bubble, x_m: at_m, y_m } of bubbles) {
    if (time_s < times_s[0] || time_s > times_s[times_s.length - 1]) continue;
    if (at_m < middle_m) below.add(bubble);
    else if (below.has(bubble) && !passed.has(bubble)) {
      passed.add(bubble);
      counted[y_m < channel.gap_m / 2 ? 'left' : 'right']++;
      counted.together++;
    }
  }
  return counted;
}
