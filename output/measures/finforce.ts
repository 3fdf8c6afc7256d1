import type { Recording } from '../../cases/index.ts';
import { meanOf } from './estimate.ts';

/** Mean force on a fin over the recording, per metre of width; null where nothing is recorded. */
export interface FinForce {
  /** 1 for the first of the case */
  fin: number;
  force_along_N_m: number | null;
  force_across_N_m: number | null;
}

/** Mean force of liquid and gas on each fin, upward and to the right positive, without its buoyancy in the liquid. */
export function finForces({ case: { fins }, fins: { along_N_m, across_N_m } }: Recording): FinForce[] {
  const mean = (rows: Float64Array, fin: number): number | null =>
    rows.length === 0 ? null : meanOf(rows.filter((_, i) => i % fins.length === fin));
  return fins.map((_, fin) => ({
    fin: fin + 1,
    force_along_N_m: mean(along_N_m, fin),
    force_across_N_m: mean(across_N_m, fin),
  }));
}
