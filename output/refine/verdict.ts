import type { Range } from '../measures/estimate.ts';
import { type Convergence, gridIndex } from './convergence.ts';

/** Highest order that is believed: the method is of second order, more is chance and would make the index too small. */
export const BELIEVED_ORDER = 2;

/** What the three grids say about one measure. */
export interface Verdict {
  /** `converged` and `same` are the good ones; `unclear`: the differences give no order; `missing`: no value on some grid */
  state: 'converged' | 'same' | 'not yet' | 'oscillating' | 'unclear' | 'missing';
  /** the same in plain words */
  says: string;
  /** the share of the value within which it is converged, relative: the index, at order 2 where the observed one is higher; null for none */
  error: number | null;
}

/** What a verdict is passed on. */
export interface Question {
  /** relative error of the grid that counts as converged */
  within: number;
  /** h2 / h1 of the two finer grids */
  ratio21: number;
  /** values that the measure can have */
  range: Range;
}

/** A plain verdict on the convergence of one measure; undefined: some grid has no value. */
export function verdictOn(convergence: Convergence | undefined, asked: Question): Verdict {
  if (convergence === undefined) return { state: 'missing', says: 'not to be had on every grid', error: null };
  const { course, order, change, extrapolated } = convergence;
  switch (course) {
    case 'same':
      return { state: 'same', says: 'the same on all three grids', error: 0 };
    case 'chance':
      return { state: 'unclear', says: 'the two finer grids agree, the coarsest does not: by chance, or converged', error: null };
    case 'growing':
      return { state: 'not yet', says: `not yet: differences do not shrink${lastChange(change)}`, error: null };
    case 'wild':
      return { state: 'oscillating', says: `oscillating, differences do not shrink${lastChange(change)}`, error: null };
    case 'shrinking':
    case 'swinging': {
      if (change === null || order === null) return { state: 'unclear', says: 'no index: the finest grid has zero', error: null };
      const error = gridIndex(change, Math.min(order, BELIEVED_ORDER), asked.ratio21);
      const capped = order > BELIEVED_ORDER ? ` at order ${BELIEVED_ORDER}` : '';
      if (course === 'swinging') return { state: 'oscillating', says: `oscillating, index ${percent(error)}${capped}`, error };
      if (extrapolated !== null && (extrapolated < asked.range.least || extrapolated > asked.range.most)) {
        return { state: 'not yet', says: `not yet: leads to ${inDigits(extrapolated, 3)}, which cannot be`, error };
      }
      return error <= asked.within
        ? { state: 'converged', says: `converged within ${percent(error)}${capped}`, error }
        : { state: 'not yet', says: `not yet: index ${percent(error)}${capped}`, error };
    }
  }
}

function lastChange(change: number | null): string {
  return change === null ? '' : `, the last one is ${percent(change)}`;
}

function percent(share: number): string {
  const value = 100 * share;
  return value > 100 ? 'over 100 %' : value < 0.1 ? 'below 0.1 %' : `${inDigits(value)} %`;
}

function inDigits(value: number, digits = 2): string {
  return String(Number(value.toPrecision(digits)));
}
