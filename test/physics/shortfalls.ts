import type { Row } from './row.ts';

/** Gates not held yet: check, words the quantity begins with, why, and the figure that was seen. */
export const KNOWN: readonly { check: string; quantity: string; reason: string }[] = [];

/** Why a row may fail without the run failing. */
export function shortfallOf(row: Row): string | undefined {
  return KNOWN.find(({ check, quantity }) => check === row.check && row.quantity.startsWith(quantity))?.reason;
}
