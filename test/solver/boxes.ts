import type { Setup, Side, Simulation } from '../../solver/index.ts';

/** The four sides of a box, as in a setup. */
export type Sides = Setup['sides'];

/** Random numbers in 0 to 1, the same for the same seed (mulberry32, public domain). */
function randomNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** The four fields a simulation shows. */
export const FIELDS = ['phi', 'ux', 'uy', 'pressure'] as const;

/** All entries of the four fields, field after field and row after row; solids left out. */
export function fieldValues(simulation: Simulation): number[] {
  const { nx, ny, solid } = simulation.setup;
  const values: number[] = [];
  for (const name of FIELDS) {
    const field = simulation[name];
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) if (!solid?.[y * nx + x]) values.push(field.get(x, y));
    }
  }
  return values;
}

/** A state with phi anywhere in 0 to 1, speeds up to 0.025 sqrt 2 and pressures up to 0.005, without any smoothness. */
export function randomState(nx: number, ny: number, seed: number): NonNullable<Setup['initial']> {
  const next = randomNumbers(seed);
  const r = Float64Array.from({ length: 4 * nx * ny }, next);
  const at = (x: number, y: number, n: number): number => r[4 * (y * nx + x) + n];
  return {
    phi: (x, y) => at(x, y, 0),
    velocity: (x, y) => ({ x: 0.05 * (at(x, y, 1) - 0.5), y: 0.05 * (at(x, y, 2) - 0.5) }),
    pressure: (x, y) => 0.01 * (at(x, y, 3) - 0.5),
  };
}

/** Solid cells that touch a wall, the periodic ends and each other by a corner; none in boxes too small for them. */
export function cornerSolids(nx: number, ny: number): Uint8Array {
  const solid = new Uint8Array(nx * ny);
  if (nx < 7 || ny < 3) return solid;
  for (const [x, y] of [
    [4, 0],
    [3, 1],
    [4, 1],
    [nx - 1, 2],
    [0, ny - 1],
    [1, ny - 1],
  ]) {
    solid[y * nx + x] = 1;
  }
  return solid;
}

/** A distance that is negative in solids and puts their faces at uneven places between cells; periodic in the box. */
export function unevenFaces(nx: number, ny: number, solid: Uint8Array, seed: number): NonNullable<Setup['solidDistance']> {
  const next = randomNumbers(seed);
  const corners = Float64Array.from({ length: nx * ny }, (_, i) => (solid[i] === 1 ? -1 : 1) * (0.05 + next()));
  const at = (x: number, y: number): number => corners[(((y % ny) + ny) % ny) * nx + (((x % nx) + nx) % nx)];
  return (x, y) => {
    const [x0, y0] = [Math.floor(x), Math.floor(y)];
    const [a, b] = [x - x0, y - y0];
    return (1 - b) * ((1 - a) * at(x0, y0) + a * at(x0 + 1, y0)) + b * ((1 - a) * at(x0, y0 + 1) + a * at(x0 + 1, y0 + 1));
  };
}

/** Two fluids at a density ratio of 10 and a viscosity ratio of 5: mild enough for states without any smoothness. */
export const MILD_PAIR = {
  liquid: { density: 1, viscosity: 0.05 },
  gas: { density: 0.1, viscosity: 0.01 },
  surfaceTension: 0.01,
} as const;

/** Density and shape of a round bubble of radius `radius` around (cx, cy) with the profile of width W. */
export const roundBubble =
  (cx: number, cy: number, radius: number, W = 5) =>
  (x: number, y: number): number =>
    0.5 + 0.5 * Math.tanh((2 * (Math.hypot(x - cx, y - cy) - radius)) / W);

/** Every kind of side in every place, with corners of two kinds. */
export const SIDE_KINDS: Record<string, Sides> = {
  'periodic all round': all('periodic', 'periodic'),
  'walls left and right, periodic ends': all('wall', 'periodic'),
  'slip left, wall right, periodic ends': { left: 'slip', right: 'wall', bottom: 'periodic', top: 'periodic' },
  'moving walls left and right, periodic ends': { left: { speed: 0.03 }, right: { speed: -0.05 }, bottom: 'periodic', top: 'periodic' },
  'periodic across, wall below and slip above': { left: 'periodic', right: 'periodic', bottom: 'wall', top: 'slip' },
  'periodic across, moving walls below and above': {
    left: 'periodic',
    right: 'periodic',
    bottom: { speed: 0.04 },
    top: { speed: -0.02 },
  },
  'walls all round': all('wall', 'wall'),
  'slip all round': all('slip', 'slip'),
  'wall, slip, moving and wall': { left: 'wall', right: 'slip', bottom: 'wall', top: { speed: 0.05 } },
  'moving, wall, slip and slip': { left: { speed: 0.03 }, right: 'wall', bottom: 'slip', top: 'slip' },
  'slip, moving, moving and wall': { left: 'slip', right: { speed: 0.02 }, bottom: { speed: -0.03 }, top: 'wall' },
};

function all(across: Side, along: Side): Sides {
  return { left: across, right: across, bottom: along, top: along };
}
