import { describe, expect, it } from 'vitest';
import { createSimulation, type Setup, type Side, type Simulation, type Vector } from '../../solver/index.ts';
import { cornerSolids, MILD_PAIR, randomState, SIDE_KINDS } from './boxes.ts';

// Nothing in the method knows left from right or along from across. Sums are added in another order in the image, so in f64 the
// two agree to round-off of random states after twenty steps: 1e-15 of phi was seen.
const TOLERANCE = 1e-14;
const STEPS = 20;
const [NX, NY] = [19, 11];

/** Moves a box: where a cell comes from, what becomes of a vector, and of the sides. */
interface Motion {
  nx: number;
  ny: number;
  from(x: number, y: number): [number, number];
  turn(v: Vector): Vector;
  sides(sides: Setup['sides']): Setup['sides'];
}

const reversed = (side: Side): Side => (typeof side === 'object' ? { speed: -side.speed } : side);

const MOTIONS: Record<string, Motion> = {
  'mirrored along': {
    nx: NX,
    ny: NY,
    from: (x, y) => [NX - 1 - x, y],
    turn: ({ x, y }) => ({ x: -x, y }),
    sides: ({ left, right, bottom, top }) => ({ left: reversed(left), right: reversed(right), bottom: top, top: bottom }),
  },
  'mirrored across': {
    nx: NX,
    ny: NY,
    from: (x, y) => [x, NY - 1 - y],
    turn: ({ x, y }) => ({ x, y: -y }),
    sides: ({ left, right, bottom, top }) => ({ left: right, right: left, bottom: reversed(bottom), top: reversed(top) }),
  },
  // (x, y) goes to (ny - 1 - y, x): e_x to e_y, e_y to -e_x
  'turned by a quarter': {
    nx: NY,
    ny: NX,
    from: (x, y) => [y, NY - 1 - x],
    turn: ({ x, y }) => ({ x: -y, y: x }),
    sides: ({ left, right, bottom, top }) => ({ top: left, bottom: right, left: reversed(bottom), right: reversed(top) }),
  },
};

function moved(setup: Setup, motion: Motion): Setup {
  const { nx, ny, from, turn, sides } = motion;
  const { initial, solid } = setup;
  const image = new Uint8Array(nx * ny);
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      const [fromX, fromY] = from(x, y);
      image[y * nx + x] = solid?.[fromY * NX + fromX] ?? 0;
    }
  }
  return {
    ...setup,
    nx,
    ny,
    sides: sides(setup.sides),
    solid: image,
    gravity: turn(setup.gravity ?? { x: 0, y: 0 }),
    force: turn(setup.force ?? { x: 0, y: 0 }),
    initial: {
      phi: (x, y) => initial?.phi?.(...from(x, y)) ?? 1,
      velocity: (x, y) => turn(initial?.velocity?.(...from(x, y)) ?? { x: 0, y: 0 }),
      pressure: (x, y) => initial?.pressure?.(...from(x, y)) ?? 0,
    },
  };
}

/** Largest difference between a simulation and the moved one, and where. */
function difference(plain: Simulation, image: Simulation, motion: Motion): { size: number; place: string } {
  let worst = { size: 0, place: 'nowhere' };
  const note = (name: string, a: number, b: number, x: number, y: number): void => {
    const size = Math.abs(a - b);
    if (!(size <= worst.size)) worst = { size, place: `${name} of ${x}, ${y}` };
  };
  for (let y = 0; y < motion.ny; y++) {
    for (let x = 0; x < motion.nx; x++) {
      if (image.setup.solid?.[y * motion.nx + x]) continue;
      const at = motion.from(x, y);
      const u = motion.turn({ x: plain.ux.get(...at), y: plain.uy.get(...at) });
      note('phi', image.phi.get(x, y), plain.phi.get(...at), x, y);
      note('pressure', image.pressure.get(x, y), plain.pressure.get(...at), x, y);
      note('ux', image.ux.get(x, y), u.x, x, y);
      note('uy', image.uy.get(x, y), u.y, x, y);
    }
  }
  return worst;
}

describe.each(Object.entries(MOTIONS))('a box %s', (_, motion) => {
  it.each(Object.entries(SIDE_KINDS))('flows as the box itself, moved: %s', async (_, sides) => {
    const { liquid, gas, surfaceTension } = MILD_PAIR;
    const setup: Setup = {
      nx: NX,
      ny: NY,
      sides,
      liquid,
      gas,
      surfaceTension,
      contactAngle: 1,
      solid: cornerSolids(NX, NY),
      gravity: { x: -1e-4, y: 3e-5 },
      force: { x: 1e-5, y: -2e-5 },
      initial: randomState(NX, NY, 11),
      precision: 'f64',
    };
    const [plain, image] = [await createSimulation(setup), await createSimulation(moved(setup, motion))];
    expect(plain.advance(STEPS).kind).toBe('ok');
    expect(image.advance(STEPS).kind).toBe('ok');
    const { size, place } = difference(plain, image, motion);
    expect(size, place).toBeLessThan(TOLERANCE);
  });
});
