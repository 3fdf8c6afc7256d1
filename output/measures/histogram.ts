import { countUpTo } from './quantile.ts';

/** Bins of |tau| whose edges are the same for every run, so that histograms compare; the first reaches down to 0, the last up without end. */
export interface Histogram {
  bins: Bin[];
  /** (element, sample) pairs counted */
  pairs: number;
}

export interface Bin {
  from_Pa: number;
  /** Infinity in the last bin */
  to_Pa: number;
  /** share of the pairs with from < |tau| <= to (the first bin holds 0 too); null without pairs */
  share: number | null;
  /** share / (to - from); null in the last bin */
  density_1_Pa: number | null;
}

/** Edges: ten to the decade, from what no instrument on a membrane resolves to what no bubble reaches. */
const LOWEST_DECADE = -3;
const HIGHEST_DECADE = 2;
const PER_DECADE = 10;

/**
 * Histogram of |tau| over all open membrane elements and samples.
 * @param sorted_Pa ascending
 */
export function shearHistogram(sorted_Pa: Float32Array): Histogram {
  const pairs = sorted_Pa.length;
  const edges_Pa: number[] = [];
  for (let i = LOWEST_DECADE * PER_DECADE; i <= HIGHEST_DECADE * PER_DECADE; i++) {
    edges_Pa.push(Number((10 ** (i / PER_DECADE)).toPrecision(6)));
  }
  const bins: Bin[] = [];
  let counted = 0;
  for (let i = 0; i <= edges_Pa.length; i++) {
    const from_Pa = i === 0 ? 0 : edges_Pa[i - 1];
    const to_Pa = i === edges_Pa.length ? Number.POSITIVE_INFINITY : edges_Pa[i];
    const upTo = countUpTo(sorted_Pa, to_Pa);
    const share = pairs === 0 ? null : (upTo - counted) / pairs;
    bins.push({
      from_Pa,
      to_Pa,
      share,
      density_1_Pa: share === null || to_Pa === Number.POSITIVE_INFINITY ? null : share / (to_Pa - from_Pa),
    });
    counted = upTo;
  }
  return { bins, pairs };
}
