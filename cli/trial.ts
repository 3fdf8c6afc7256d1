import { availableParallelism } from 'node:os';
import type { Case, Derived } from '../cases/index.ts';
import { createSimulation, type Setup } from '../solver/index.ts';

/** How fast this machine does this very set-up. */
export interface Trial {
  /** cell updates per second of wall time */
  updatesPerSecond: number;
  /** held by the solver, bytes */
  memory_bytes: number;
}

/** Rise speed from which the number of bubbles in the channel is guessed; it sets the scene of the trial only, m/s. */
const GUESSED_RISE_M_S = 0.25;

/** Runs the set-up on `threads`, with about as many bubbles in it as it will hold, for `wall_s` seconds. */
export async function trial(
  panel: Case,
  setup: Setup,
  derived: Derived,
  { threads = availableParallelism(), wall_s = 0.5 } = {},
): Promise<Trial> {
  const simulation = await createSimulation(setup, threads);
  if (setup.gas !== undefined && derived.bubblesPerSecond > 0) {
    const radius = derived.cellsPerBubble / 2;
    const expected = (derived.bubblesPerSecond * panel.channel.height_m) / GUESSED_RISE_M_S;
    const most = Math.floor(derived.nx / (2 * radius + 8));
    const bubbles = Math.min(Math.max(1, Math.round(expected)), most);
    for (let i = 0; i < bubbles; i++) simulation.placeGas({ x: ((i + 0.5) * derived.nx) / bubbles, y: (derived.ny - 1) / 2, radius });
  }
  let chunk = 1;
  simulation.advance(chunk, 0);
  const start = performance.now();
  let steps = 0;
  let passed_s = 0;
  while (passed_s < wall_s) {
    simulation.advance(chunk, 0);
    steps += chunk;
    passed_s = (performance.now() - start) / 1000;
    chunk = Math.max(1, Math.min(2 * chunk, Math.ceil((steps / passed_s) * 0.05)));
  }
  simulation.dispose();
  return {
    updatesPerSecond: (steps * derived.nx * derived.ny) / passed_s,
    // fields are views on the one memory of the kernel
    memory_bytes: simulation.phi.data.buffer.byteLength,
  };
}
