/** A channel with a fin that leans in the stream and one that stands on a wall: what drives it, and who takes it. */
import { createSimulation, type Setup, type Simulation } from '../../solver/index.ts';
import { CHANNEL } from './channel.ts';

/** Cells of the leaning fin are body 1, those of the one on the right wall body 2. */
export async function finnedChannel(extra: Partial<Setup>): Promise<{ simulation: Simulation; cells: number }> {
  const [nx, ny] = [64, 24];
  const [cosine, sine] = [Math.cos(0.5), Math.sin(0.5)];
  const leaning = (x: number, y: number): number => {
    const along = (x - 40) * cosine + (y - 10) * sine;
    const across = (y - 10) * cosine - (x - 40) * sine;
    return Math.max(Math.abs(along) - 8, Math.abs(across) - 2);
  };
  const standing = (x: number, y: number): number => Math.max(Math.abs(x - 12.5) - 3, ny - 5.2 - y);
  const bodies = Uint16Array.from({ length: nx * ny }, (_, i) => {
    const [x, y] = [i % nx, Math.floor(i / nx)];
    return leaning(x, y) <= 0 ? 1 : standing(x, y) <= 0 ? 2 : 0;
  });
  const setup: Setup = {
    ...{ nx, ny, sides: CHANNEL, liquid: { density: 1, viscosity: 0.1 }, precision: 'f64' },
    solid: Uint8Array.from(bodies, (body) => (body === 0 ? 0 : 1)),
    solidDistance: (x, y) => Math.min(leaning(x, y), standing(x, y)),
    bodies,
    ...extra,
  };
  return { simulation: await createSimulation(setup), cells: bodies.filter((body) => body === 0).length };
}

/** Means over the samples: force along x on both walls together, on each body along x and across. */
export function forcesOn(simulation: Simulation): { walls: number; along: number[]; across: number[] } {
  const { shear, force, steps } = simulation.takeSamples();
  const mean = (of: { get(n: number, m: number): number }, m: number): number =>
    steps.reduce((sum, _, n) => sum + of.get(n, m), 0) / steps.length;
  let walls = 0;
  for (let x = 0; x < simulation.setup.nx; x++) walls += mean(shear.left, x) + mean(shear.right, x);
  const each = (of: typeof force.x): number[] => Array.from({ length: of.shape[1] }, (_, body) => mean(of, body));
  return { walls, along: each(force.x), across: each(force.y) };
}
