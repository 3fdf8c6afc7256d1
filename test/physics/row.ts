/** One line of the validation table: a published or derived value, and what came out on each grid. */
export interface Row {
  check: string;
  quantity: string;
  /** where the reference comes from, with its mark: [L] read, [M] from memory, [V] derived or recomputed independently */
  source: string;
  /** of a finding its sign alone */
  reference: number | '> 0' | '< 0';
  /** coarse to fine; `grid` says what the cells count */
  ours: { grid: string; value: number; error: number }[];
  /** unit of the errors: '%' of the scale, or the quantity's own */
  unit: string;
  /** order of convergence between the two finest grids */
  order: number | undefined;
  /** what the error at the gated grid must stay below; a row without a gate records what was seen */
  gate: number | undefined;
  /** of a finding half the 95 % interval */
  error: number;
  /** of a finding: the interval lies on the published side of 0, on the other, or on both */
  verdict: 'pass' | 'FAIL' | 'seen' | "can't tell";
}

/** A check by name; `long` adds the grids and steps that take more than some minutes. */
export interface Check {
  name: string;
  run(long: boolean): Promise<Row[]>;
}

export interface RowParts {
  check: string;
  quantity: string;
  source: string;
  reference: number;
  /** coarse to fine, by cells; `error` where it is more than the distance of value and reference */
  ours: { cells: number; value: number; error?: number }[];
  /** what `cells` counts, such as 'cells' or 'R' */
  counts?: string;
  /** errors are shares of this, in %; the reference by default. 'absolute' leaves them in the quantity's unit */
  scale?: number | { absolute: string };
  gate?: number;
  /** cells of the gated grid; the finest by default */
  at?: number;
  /** false where an order would mean nothing */
  order?: boolean;
  /** errors must fall from grid to grid */
  falling?: boolean;
  /** order the two finest grids must show within 0.1 */
  orderGate?: number;
}

/** Errors below this, in %, are round-off or the last digit of a reference: they show no order. */
const NOISE = 1e-3;

/** Works out errors, order and verdict. */
export function row(parts: RowParts): Row {
  const { check, quantity, source, reference, gate } = parts;
  const scale = parts.scale ?? Math.abs(reference);
  const [factor, unit] = typeof scale === 'number' ? [100 / scale, '%'] : [1, scale.absolute];
  const errors = parts.ours.map(({ value, error }) => (error ?? Math.abs(value - reference)) * factor);
  const ours = parts.ours.map(({ cells, value }, n) => ({ grid: `${parts.counts ?? ''}${cells}`, value, error: errors[n] }));
  const [before, last] = [parts.ours.length - 2, parts.ours.length - 1];
  const ratio = before >= 0 ? parts.ours[last].cells / parts.ours[before].cells : 1;
  const order =
    parts.order === false || ratio === 1 || (unit === '%' && errors[last] < NOISE)
      ? undefined
      : Math.log(errors[before] / errors[last]) / Math.log(ratio);
  const gated = parts.at === undefined ? last : parts.ours.findIndex(({ cells }) => cells === parts.at);
  const error = errors[gated === -1 ? last : gated];
  const held =
    (gate === undefined || error <= gate) &&
    (parts.falling !== true || errors.every((e, n) => n === 0 || e < errors[n - 1])) &&
    (parts.orderGate === undefined || Math.abs((order ?? Number.NaN) - parts.orderGate) <= 0.1);
  const asked = gate !== undefined || parts.orderGate !== undefined;
  return { check, quantity, source, reference, ours, unit, order, gate, error, verdict: asked ? (held ? 'pass' : 'FAIL') : 'seen' };
}

export interface FindingParts {
  check: string;
  quantity: string;
  source: string;
  /** published sign of the quantity */
  sign: 1 | -1;
  /** ours with its 95 % interval, infinite where it cannot be told */
  seen: { value: number; low: number; high: number };
  unit: string;
  /** what it was seen on, such as '4 seeds' */
  grid: string;
}

/** A published sign, held against an interval: a finding can come out the other way, or not be told. */
export function finding({ sign, seen, grid, ...parts }: FindingParts): Row {
  const error = (seen.high - seen.low) / 2;
  const least = Math.min(sign * seen.low, sign * seen.high);
  const most = Math.max(sign * seen.low, sign * seen.high);
  const verdict = least > 0 ? 'pass' : most < 0 || Number.isNaN(seen.value) ? 'FAIL' : "can't tell";
  const ours = [{ grid, value: seen.value, error }];
  return { ...parts, reference: sign > 0 ? '> 0' : '< 0', ours, order: undefined, gate: undefined, error, verdict };
}

/** The row holds a published sign, which a plane section may not have; a finding that could not be computed is a plain failure. */
export const isFinding = ({ reference, error }: Row): boolean => typeof reference === 'string' && !Number.isNaN(error);
