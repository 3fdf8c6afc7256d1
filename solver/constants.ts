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
