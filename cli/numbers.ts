import prettyMilliseconds from 'pretty-ms';

/** A number with `digits` significant digits and no exponent where it can be read without one; a dash for none. */
export function plain(value: number | null | undefined, digits = 3): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '-';
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size < 1e-4 || size >= 1e7) return value.toExponential(digits - 1);
  const decimals = Math.max(0, digits - 1 - Math.floor(Math.log10(size)));
  return String(Number(value.toFixed(decimals)));
}

/** A share as percent. */
export function percent(share: number | null | undefined, digits = 3): string {
  return share === null || share === undefined || !Number.isFinite(share) ? '-' : `${plain(100 * share, digits)} %`;
}

/** A count with thin groups: 1 250 000. */
export function count(value: number): string {
  return Math.round(value)
    .toString()
    .replace(/\B(?=(\d{3})+$)/g, ' ');
}

/** Seconds of wall time as people say them: 0.4s, 45s, 1m 20s, 2h 5m. */
export function duration(seconds: number): string {
  if (seconds < 1) return `${Math.max(0, seconds).toFixed(1)}s`;
  return prettyMilliseconds(1000 * seconds, { unitCount: 2, secondsDecimalDigits: seconds < 10 ? 1 : 0 });
}

/** Bytes as kB, MB or GB. */
export function size(bytes: number): string {
  const power = Math.min(3, Math.max(0, Math.floor(Math.log10(Math.max(1, bytes)) / 3)));
  return `${plain(bytes / 1000 ** power)} ${['B', 'kB', 'MB', 'GB'][power]}`;
}
