// Scalar literals of the lattice, compiled by both compilers: no arrays, no enums, no imports.
// D2Q9, directions in the order rest, +x, +y, -x, -y, +x+y, -x+y, -x-y, +x-y.
// Write `4.0 / 9.0`: the kernel's compiler reads `4 / 9` as a division of integers.

export const Q = 9;
/** square of the lattice sound speed */
export const CS2 = 1.0 / 3.0;
/** weight of the rest direction */
export const W0 = 4.0 / 9.0;
/** weight along an axis */
export const W1 = 1.0 / 9.0;
/** weight along a diagonal */
export const W2 = 1.0 / 36.0;

/** cells of a tile of one row, see kernel/tiles.ts */
export const TILE = 8;
/** rows of a block, over which sums are made in one go */
export const BLOCK = 4;
/** bytes of a piece of a row that is collided in one go, and how many such rows that takes; see kernel/scratch.ts */
export const PIECE_BYTES = 2048;
export const PIECE_ROWS = 7;
/** where the words begin by which threads agree, which are no part of the state, and their bytes; see kernel/team.ts */
export const AT_TEAM = 1024;
export const TEAM_BYTES = 512;
/** words of the host: calls so far; 1 for the end */
export const AT_CALLS = 1024;
export const AT_QUIT = 1088;
