/**
 * Windows in time over many series at once. A window holds `length` neighbouring samples; all windows that fit count, overlapping.
 * A window is hit in a series when at least one of its samples is.
 */

/** Collects the rests (runs of samples without a hit) of series of equal length. */
export class Rests {
  readonly samples: number;
  private seriesCount = 0;
  /** number of rests by length */
  private readonly byLength: Float64Array;

  constructor(samples: number) {
    this.samples = samples;
    this.byLength = new Float64Array(samples + 1);
  }

  /** Adds one series; a sample is a hit where its value is above `threshold`. */
  add(values: Float32Array | Uint8Array, threshold: number): void {
    this.seriesCount++;
    let rest = 0;
    for (let i = 0; i < values.length; i++) {
      if (values[i] > threshold) {
        this.byLength[rest]++;
        rest = 0;
      } else {
        rest++;
      }
    }
    this.byLength[rest]++;
  }

  /**
   * Share of (series, window) pairs that are hit, for windows of every length; entry w: w samples, shape (samples + 1), entry 0 is 0.
   * A rest of n samples holds n - w + 1 windows without a hit, so the share is 1 - sum over rests max(0, n - w + 1) / (series (samples - w + 1)).
   * Without a series every entry is NaN.
   */
  hitShare(): Float64Array {
    const share = new Float64Array(this.samples + 1);
    let restsAsLong = 0; // rests of at least w samples
    let missed = 0; // windows of w samples that lie in a rest
    for (let w = this.samples; w > 0; w--) {
      restsAsLong += this.byLength[w];
      missed += restsAsLong;
      share[w] = this.seriesCount === 0 ? Number.NaN : 1 - missed / (this.seriesCount * (this.samples - w + 1));
    }
    return share;
  }
}

/**
 * Calls `visit` with the largest value of every window of `length` samples, in order.
 * `queue` holds the positions of a falling chain of values, the window's largest at its head; each sample enters and leaves once.
 * @param queue work array of at least values.length entries
 */
export function windowMaxima(values: Float32Array, length: number, queue: Int32Array, visit: (largest: number) => void): void {
  let head = 0;
  let tail = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    while (tail > head && values[queue[tail - 1]] <= value) tail--;
    queue[tail++] = i;
    if (queue[head] <= i - length) head++;
    if (i >= length - 1) visit(values[queue[head]]);
  }
}
