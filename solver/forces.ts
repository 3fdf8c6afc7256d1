/**
 * What turns a lattice that streams velocity at the density of the liquid into two fluids of their own densities and viscosities,
 * in the layout of reference.ts. Everything here is local or reaches one cell (the coupling of pressure: two), and vanishes in
 * the bulk of the liquid but for its viscosity.
 *
 *   pressure   p += kappa (sum f - 3 p/rhoLiquid), kappa = (lowest density of the 3 x 3 cells around)/3: the divergence of the velocity makes
 *              pressure by the compressibility of a fluid with the lattice's sound speed
 *   P          p and a fifth of its change on top in gas, (1 - phi^4): damps sound where the lattice would feed it
 *   kick       u - m = -(1/rho - 1/rhoLiquid) grad P + (1/rho) [mu grad phi + (rho - rhoLiquid) g + drive + div(eta S)] - nu0 div S,
 *              S = grad m + (grad m)^T on the faces between cells, eta at a face harmonic at the mean phi
 *   coupling   a quarter of what the compact and the wide difference of P differ by, over the faces, weighted with the smaller
 *              1/rho - 1/rhoLiquid of both sides: keeps neighbours from parting into a checkerboard
 */
import type { Box } from './box.ts';
import { lookUp } from './rheology.ts';

/** share of the change of pressure that acts at once */
const SOUND_FRICTION = 0.2;
/** strength of the coupling of pressure */
const COUPLING = 0.25;

/** Fields of a box with gas; shape (ny + 2, nx + 2), `P` with two ghosts on each side: (ny + 4, nx + 4). */
export interface FlowFields {
  phi: Float64Array;
  /** velocity as it arrives */
  mx: Float64Array;
  my: Float64Array;
  /** sum of f as it arrives */
  sum: Float64Array;
  P: Float64Array;
  /** eta of a liquid that thins, on the face between a cell and the next along x, along y; unused otherwise */
  etaX: Float64Array;
  etaY: Float64Array;
}

/** phi this close to 0 or 1 counts as pure gas or liquid where densities and viscosities are made of it: liquid is left alone there */
const PURE = 0.002;

export const clip = (phi: number): number => Math.min(Math.max(phi, 0), 1);

/** Share of liquid, 0 to 1. */
export const share = (phi: number): number => clip((phi - PURE) / (1 - 2 * PURE));

export const density = (box: Box, phi: number): number => box.rhoGas + share(phi) * (box.rhoLiquid - box.rhoGas);

export const viscosity = (box: Box, phi: number, liquid = 1 / box.fluidityLiquid): number =>
  1 / (box.fluidityGas + share(phi) * (1 / liquid - box.fluidityGas));

/** eta of a liquid that thins on all faces, by the velocities that arrive. */
export function thinFaces(box: Box, table: Float64Array, { mx, my, etaX, etaY }: FlowFields): void {
  const S = box.nx + 2;
  const mean = (m: Float64Array, i: number, j: number, across: number): number =>
    0.25 * (m[i + across] - m[i - across] + m[j + across] - m[j - across]);
  const rate2 = (stretchX: number, stretchY: number, shear: number): number =>
    2 * (stretchX * stretchX + stretchY * stretchY) + shear * shear;
  // from the face before the first cell of the first row on; ghosts at the ends of rows get values that nothing reads
  for (let i = 1; i < S * (box.ny + 1) - 1; i++) {
    const [E, N] = [i + 1, i + S];
    if (i >= S) etaX[i] = lookUp(table, rate2(mx[E] - mx[i], mean(my, i, E, S), my[E] - my[i] + mean(mx, i, E, S)));
    etaY[i] = lookUp(table, rate2(mean(mx, i, N, 1), my[N] - my[i], mx[N] - mx[i] + mean(my, i, N, 1)));
  }
}

/** The very force along x that a wall took from cell i, j the ghost in it; 0 under a solid and on sides that are no wall. */
export function wallFriction(box: Box, { phi, mx, etaY }: FlowFields, i: number, j: number): number {
  const { open } = box.walls;
  const liquid = box.setup.liquid.rheology && etaY[Math.min(i, j)];
  return open[i] === 1 && open[j] === 0 ? viscosity(box, 0.5 * (phi[i] + phi[j]), liquid) * (mx[i] - mx[j]) : 0;
}

/** Index into P of the cell with index i of the other fields. */
export const wideIndex = (box: Box, i: number): number => i + box.nx + 5 + 2 * Math.floor(i / (box.nx + 2));

/** Change of p in cell i by what has flowed in: [p now, P]. */
export function pressureUpdate(box: Box, fields: FlowFields, i: number, p: number): [number, number] {
  const S = box.nx + 2;
  const { phi } = fields;
  let least = 1;
  for (const row of [i - S, i, i + S]) for (let j = row - 1; j <= row + 1; j++) if (phi[j] < least) least = phi[j];
  const change = (density(box, least) / 3) * (fields.sum[i] - (3 * p) / box.rhoLiquid);
  const liquid = share(phi[i]) ** 4;
  return [p + change, p + (1 + SOUND_FRICTION * (1 - liquid)) * change];
}

/** What the velocity of cell i gains in a step, less the sources that depend on phi's gradient; [x, y]. */
export function kick(box: Box, fields: FlowFields, i: number, forceX: number, forceY: number): [number, number] {
  const { phi, mx, my, P } = fields;
  const { open } = box.walls;
  const S = box.nx + 2;
  const a = phi[i];
  const light = 1 / density(box, a);
  const j = wideIndex(box, i);
  const T = box.nx + 4;
  const Px = (P[j + 1] - P[j - 1]) / 3 + (P[j + T + 1] - P[j + T - 1] + P[j - T + 1] - P[j - T - 1]) / 12;
  const Py = (P[j + T] - P[j - T]) / 3 + (P[j + T + 1] - P[j - T + 1] + P[j + T - 1] - P[j - T - 1]) / 12;
  const lighter = light - 1 / box.rhoLiquid;
  // viscous force per velocity of each face; nu0 is the populations' own, and stops at walls
  const thins = box.setup.liquid.rheology !== undefined;
  const face = (n: number, liquid: number): number =>
    viscosity(box, 0.5 * (a + phi[n]), thins ? liquid : undefined) * light - box.nu0 * open[n];
  const { etaX, etaY } = fields;
  const [E, W, N, So] = [i + 1, i - 1, i + S, i - S];
  const [cE, cW, cN, cS] = [face(E, etaX[i]), face(W, etaX[W]), face(N, etaY[i]), face(So, etaY[So])];
  const x =
    2 * (cE * (mx[E] - mx[i]) - cW * (mx[i] - mx[W])) +
    cN * (mx[N] - mx[i] + 0.25 * (my[E] - my[W] + my[N + 1] - my[N - 1])) -
    cS * (mx[i] - mx[So] + 0.25 * (my[E] - my[W] + my[So + 1] - my[So - 1]));
  const y =
    2 * (cN * (my[N] - my[i]) - cS * (my[i] - my[So])) +
    cE * (my[E] - my[i] + 0.25 * (mx[N] - mx[So] + mx[N + 1] - mx[So + 1])) -
    cW * (my[i] - my[W] + 0.25 * (mx[N] - mx[So] + mx[N - 1] - mx[So - 1]));
  return [light * forceX - lighter * Px + x, light * forceY - lighter * Py + y];
}

/** What the coupling of pressure adds to the rest population of cell i. */
export function coupling(box: Box, fields: FlowFields, i: number): number {
  const { phi, P } = fields;
  const j = wideIndex(box, i);
  const lighter = (n: number): number => 1 / density(box, phi[n]) - 1 / box.rhoLiquid;
  const own = lighter(i);
  let sum = 0;
  for (const [step, wide] of [
    [1, 1],
    [-1, -1],
    [box.nx + 2, box.nx + 4],
    [-box.nx - 2, -box.nx - 4],
  ]) {
    const weight = box.walls.open[i + step] * Math.min(own, lighter(i + step));
    sum += weight * (0.75 * (P[j + wide] - P[j]) - 0.25 * (P[j + 2 * wide] - P[j - wide]));
  }
  return COUPLING * sum;
}
