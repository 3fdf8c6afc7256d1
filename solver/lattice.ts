import { W0, W1, W2 } from './constants.ts';

/** D2Q9 as arrays, in the order of constants.ts; for host code that is not hot. */
export const ex = [0, 1, 0, -1, 0, 1, -1, -1, 1] as const;
export const ey = [0, 0, 1, 0, -1, 1, 1, -1, -1] as const;
export const w = [W0, W1, W1, W1, W1, W2, W2, W2, W2] as const;
export const opposite = [0, 3, 4, 1, 2, 7, 8, 5, 6] as const;
/** direction reached when the sign of ex, of ey is turned: what a slip wall across x, across y returns */
export const mirrorX = [0, 3, 2, 1, 4, 6, 5, 8, 7] as const;
export const mirrorY = [0, 1, 4, 3, 2, 8, 7, 6, 5] as const;
