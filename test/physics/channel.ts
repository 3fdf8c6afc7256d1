import type { Field, Rows, Samples, Setup, Simulation } from '../../solver/index.ts';

/** Straight walls left and right, periodic along. */
export const CHANNEL: Setup['sides'] = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' };
export const PERIODIC: Setup['sides'] = { left: 'periodic', right: 'periodic', bottom: 'periodic', top: 'periodic' };
export const CLOSED: Setup['sides'] = { left: 'wall', right: 'wall', bottom: 'wall', top: 'wall' };

/** Air beside water of density 1 and the given viscosity, 832:1 and 55:1 (20 C). */
export const airBeside = (viscosity: number): { density: number; viscosity: number } => ({ density: 1 / 832, viscosity: viscosity / 55 });

/** Equilibrium profile of the interface, `distance` into the liquid. */
export const profile = (distance: number, W: number): number => 0.5 + 0.5 * Math.tanh((2 * distance) / W);

/** Mean over all samples and wall elements of a record. */
export function meanOf(rows: Rows): number {
  const [samples, nx] = rows.shape;
  let sum = 0;
  for (let n = 0; n < samples; n++) for (let x = 0; x < nx; x++) sum += rows.get(n, x);
  return sum / (samples * nx);
}

/** Runs on; a failure names its step and cell. */
export function advance(simulation: Simulation, steps: number, every = 0): void {
  const status = simulation.advance(steps, every);
  if (status.kind !== 'ok') throw new Error(`${status.kind} in step ${status.step} at ${status.x}, ${status.y}: speed ${status.speed}`);
}

/** Runs on and hands back the samples of the last `last` steps. */
export function settle(simulation: Simulation, steps: number, last = 1): Samples {
  advance(simulation, steps - last);
  advance(simulation, last, 1);
  return simulation.takeSamples();
}

/** Order of convergence between two errors on grids whose spacings differ by two. */
export const order = (coarse: number, fine: number): number => Math.log2(coarse / fine);

/** Where `value` crosses 1/2 between 0 and n - 1, by straight lines. */
export function crossings(value: (i: number) => number, n: number): number[] {
  const found: number[] = [];
  for (let i = 0; i + 1 < n; i++) {
    const [a, b] = [value(i) - 0.5, value(i + 1) - 0.5];
    if (a * b <= 0 && a !== b) found.push(i + a / (a - b));
  }
  return found;
}

/** Greatest speed over all cells of the box. */
export function fastest({ ux, uy, setup }: Simulation): number {
  let most = 0;
  for (let y = 0; y < setup.ny; y++) for (let x = 0; x < setup.nx; x++) most = Math.max(most, Math.hypot(ux.get(x, y), uy.get(x, y)));
  return most;
}

/** Length of the line phi = 1/2, by straight pieces through squares of four cell centres. */
export function outline(phi: Field): number {
  const [nx, ny] = phi.shape;
  let length = 0;
  for (let y = 0; y + 1 < ny; y++) {
    for (let x = 0; x + 1 < nx; x++) {
      const corners = [phi.get(x, y), phi.get(x + 1, y), phi.get(x + 1, y + 1), phi.get(x, y + 1)].map((value) => value - 0.5);
      const points: [number, number][] = [];
      for (let k = 0; k < 4; k++) {
        const [a, b] = [corners[k], corners[(k + 1) % 4]];
        if (a > 0 === b > 0) continue;
        const t = a / (a - b);
        points.push(k === 0 ? [t, 0] : k === 1 ? [1, t] : k === 2 ? [1 - t, 1] : [0, 1 - t]);
      }
      for (let k = 0; k + 1 < points.length; k += 2) {
        length += Math.hypot(points[k + 1][0] - points[k][0], points[k + 1][1] - points[k][1]);
      }
    }
  }
  return length;
}
