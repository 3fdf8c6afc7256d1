// The header of the kernel's memory: one f64 per entry, at byte 8 * entry. Literals only, compiled by both compilers.

/** checked by the host against the kernel's own copy when it is loaded */
export const VERSION = 10;
/** bytes kept for the header */
export const HEADER_BYTES = 1024;

// ---- sizes
export const NX = 0;
export const NY = 1;
/** bytes of one row of one field, ghosts and padding included */
export const STRIDE = 2;
/** rows of populations in the ring: ny + 3 */
export const RING = 3;
export const TWO_PHASE = 4;

// ---- addresses of cell (0, 0); of the first entry of a list
export const AT_POPULATIONS = 5;
/** z = phi - 1, with ghosts */
export const AT_Z = 6;
export const AT_UX = 7;
export const AT_UY = 8;
export const AT_P = 9;
/** viscous shear stress, written in the rows next to the walls of a box without gas */
export const AT_TAU = 10;
/** 1 fluid, 0 solid or padding */
export const AT_MASK = 11;
/** skimmed share per x */
export const AT_SKIM = 12;
/** four rows: first and second cell of the left wall, first and second of the right */
export const AT_WEIGHTS = 13;
/** eight i32 each: solid x, y, direction, fluid x, y, second x, y, direction; then two f64: their weights */
export const AT_LINKS = 14;
export const LINKS = 15;
/** three i32 each: y, first x, end x */
export const AT_RUNS = 16;
export const RUNS = 17;
/** f64: x, y, n, exp of what wetting adds to ln(phi/(1 - phi)), then n times x, y, weight */
export const AT_GHOSTS = 18;
/** per sample: four f64 (step, upflow, gas area, skimmed), two f64 per body (force along x, y), then four rows of nx f32 (shear left, right, phi left, right) */
export const AT_SAMPLES = 20;
/** samples in the buffer */
export const SAMPLES = 21;
/** phi, written in the last step of a call; so is p in a box without gas */
export const AT_PHI = 22;

// ---- sides: 0 periodic, 1 wall, 2 slip; speed of a moving wall
export const SIDE_LEFT = 24;
export const SIDE_RIGHT = 25;
export const SIDE_BOTTOM = 26;
export const SIDE_TOP = 27;
export const SPEED_LEFT = 28;
export const SPEED_RIGHT = 29;
export const SPEED_BOTTOM = 30;
export const SPEED_TOP = 31;

// ---- the box's numbers, see box.ts
export const RHO_LIQUID = 32;
export const RHO_GAS = 33;
export const FLUIDITY_LIQUID = 34;
export const FLUIDITY_GAS = 35;
export const BEND = 36;
export const KAPPA = 37;
export const WIDTH = 38;
export const OMEGA_PHI = 39;
export const WETTING = 40;
export const FORCE_X = 41;
export const FORCE_Y = 42;
export const GRAVITY_X = 43;
export const GRAVITY_Y = 44;
export const SPEED_LIMIT = 45;
/** 0 none, 1 loss, 2 upflow; the coefficient or the target */
export const DRIVE_KIND = 46;
export const DRIVE_VALUE = 47;
export const SOUND_DAMPING = 49;
/** viscosity that the populations carry in a box with gas */
export const NU0 = 50;
/** 1 / (gas speed limit)^2 */
export const GAS_LIMIT = 51;
/** three rows: the sums of velocity and of gas over each section; what sound damping takes from ux */
export const AT_SECTIONS = 54;

// ---- boxes with gas: what arrives at each cell
/** velocity, with ghosts */
export const AT_MX = 55;
export const AT_MY = 56;
/** P, with two ghosts on each side */
export const AT_PRESSURE = 57;
/** 1 / rho, with ghosts */
export const AT_LIGHT = 58;
/** 1 where momentum passes, with ghosts */
export const AT_OPEN = 59;
/** sum of f; difference and mixed second moment of f less m m; first moment of g */
export const AT_SUM = 60;
export const AT_N20 = 61;
export const AT_N11 = 62;
export const AT_J10 = 63;
export const AT_J01 = 75;
/** runs of what walls return, four i32 each: address it goes to, of the stand-in of f, of that of g, bytes; g goes to the same population of g */
export const AT_RETURNS = 76;
/** f64: place, n, then n times cell, cell behind, their weights, what the wall adds to ux, to uy; places in bytes from cell (0, 0) */
export const AT_WALL_GHOSTS = 78;
/** ny + 1 i32 each: the address in AT_RETURNS, AT_GHOSTS, AT_WALL_GHOSTS where the entries that row y sees to begin */
export const AT_RETURN_ROWS = 77;
export const AT_GHOST_ROWS = 79;
export const AT_WALL_GHOST_ROWS = 80;

// ---- boxes with gas: tiles of one row and TILE cells, a byte each
/** bytes of a row of tiles; the last four tell the work in the row, the four before them its tiles of liquid */
export const TILE_STRIDE = 81;
/** what is done in a tile from the next collision on, and what was done as populations arrived; see kernel/tiles.ts */
export const AT_TILES = 82;
export const AT_WAS = 83;
/** 1 where a tile holds gas or interface */
export const AT_NEAR = 84;
/** 1 where a tile holds fluid */
export const AT_FLUID = 85;
/** 1: tiles are to be told apart in the next step, whatever its number */
export const STALE = 86;
/** 1: every tile is active */
export const ALL_ACTIVE = 87;

// ---- sums, made in an order that does not depend on threads
/** four f64 per row: sum of ux, of z, of what is skimmed of z, largest u^2 */
export const AT_ROWS = 88;
/** per block of BLOCK rows two rows: sums of m and of gas over each section of it */
export const AT_BLOCKS = 89;

/** per block of BLOCK rows what a piece of a row passes on in its collision, see kernel/scratch.ts */
export const AT_SCRATCH = 100;

/** gas there should be by what was placed and skimmed; what tiles of liquid add to z in each cell so that there is as much */
export const GAS_DUE = 93;
export const AMENDS = 94;

// ---- bodies
/** eight i32 each, see bodies.ts: place x, y, direction, fluid x, y, direction it left in, bodies that take x, y */
export const AT_TOUCHES = 110;
export const TOUCHES = 111;
export const BODIES = 112;
/** two f64 per body, those of no body first */
export const AT_FORCES = 113;

// ---- what the threads of a call are to do
export const THREADS = 90;
export const ASKED_STEPS = 91;
export const ASKED_SAMPLES = 92;

// ---- boxes whose liquid thins under shear
/** 1 where it does; eta of the face to the next cell along x, along y, with ghosts; eta over rate^2 in f64 */
export const THINS = 95;
export const AT_ETA_X = 96;
export const AT_ETA_Y = 97;
export const AT_TABLE = 98;
/** omega of each cell, in a box without gas; AT_TABLE then holds omega over rate^2 */
export const AT_OMEGA = 99;

// ---- state
export const STEP = 64;
/** slot of the ring that holds row -1 */
export const BASE = 65;
export const DRIVE_FORCE = 66;
export const UPFLOW = 67;
export const UPFLOW_BEFORE = 68;
export const GAS_AREA = 69;
export const SKIMMED = 70;
/** 0 well, 1 not finite, 2 too fast; the cell and its speed */
export const STATUS = 71;
export const BAD_X = 72;
export const BAD_Y = 73;
export const BAD_SPEED = 74;
