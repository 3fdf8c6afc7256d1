// What passes from force.ts to flow.ts over a piece of a row: so short that it never leaves the nearest cache. Each block of rows has a
// room of its own, so that threads do not meet there and what is left in memory does not depend on their number.
import { BLOCK, PIECE_BYTES, PIECE_ROWS } from '../constants';
import * as H from '../header';
import { address } from './rows';

/** bytes of a piece of a row */
export const PIECE: usize = PIECE_BYTES;

// where the rows of the room begin; ux lies at its start
export const UY: usize = PIECE;
/** what the coupling of pressure adds to the f at rest */
export const COUPLING: usize = 2 * PIECE;
/** velocity in the middle of the kick */
export const MID_X: usize = 3 * PIECE;
export const MID_Y: usize = 4 * PIECE;
/** what sharpening adds to the first moment of g */
export const SHARPEN_X: usize = 5 * PIECE;
export const SHARPEN_Y: usize = 6 * PIECE;

/** The room that row y uses. */
@inline export function scratch(y: i32): usize { return address(H.AT_SCRATCH) + <usize>(y / BLOCK) * <usize>PIECE_ROWS * PIECE; }
