import type { Rows, Samples, Setup, Simulation } from '../../solver/index.ts';

/** Straight walls left and right, periodic along. */
export const CHANNEL: Setup['sides'] = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' };
export const PERIODIC: Setup['sides'] = { left: 'periodic', right: 'periodic', bottom: 'periodic', top: 'periodic' };

/** Mean over all samples and wall elements of a record. */
export function meanOf(rows: Rows): number {
  const [samples, nx] = rows.shape;
  let sum = 0;
  for (let n = 0; n < samples; n++) for (let x = 0; x < nx; x++) sum += rows.get(n, x);
  return sum / (samples * nx);
}

/** Runs on and hands back the samples of the last `last` steps. */
export function settle(simulation: Simulation, steps: number, last = 1): Samples {
  for (const [count, every] of [
    [steps - last, 0],
    [last, 1],
  ]) {
    const status = simulation.advance(count, every);
    if (status.kind !== 'ok') throw new Error(`${status.kind} in step ${status.step} at ${status.x}, ${status.y}`);
  }
  return simulation.takeSamples();
}

/** Order of convergence between two errors on grids whose spacings differ by two. */
export const order = (coarse: number, fine: number): number => Math.log2(coarse / fine);
