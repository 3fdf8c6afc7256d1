import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createReference, createSimulation, type Setup, type Simulation } from '../../solver/index.ts';
import { fieldValues, MILD_PAIR, randomState, roundBubble, SIDE_KINDS } from './boxes.ts';

const PERIODIC = SIDE_KINDS['periodic all round'];
const CLOSED = SIDE_KINDS['walls all round'];
const { liquid, gas, surfaceTension } = MILD_PAIR;

/** Boxes of odd and even lengths, below and above whole groups of lanes, and a seed of their random state. */
const anyBox = fc.record({ nx: fc.integer({ min: 1, max: 21 }), ny: fc.integer({ min: 1, max: 9 }), seed: fc.nat(1e6) });

function sum(simulation: Simulation, term: (x: number, y: number) => number): number {
  const { nx, ny, solid } = simulation.setup;
  let total = 0;
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) if (!solid?.[y * nx + x]) total += term(x, y);
  }
  return total;
}

const density = ({ setup, phi }: Simulation, x: number, y: number): number => {
  const rhoGas = (setup.gas ?? setup.liquid).density;
  return rhoGas + phi.get(x, y) * (setup.liquid.density - rhoGas);
};
const mass = (s: Simulation): number => sum(s, (x, y) => density(s, x, y));
const momentum = (s: Simulation): { x: number; y: number } => ({
  x: sum(s, (x, y) => density(s, x, y) * s.ux.get(x, y)),
  y: sum(s, (x, y) => density(s, x, y) * s.uy.get(x, y)),
});
const gasArea = (s: Simulation): number => sum(s, (x, y) => 1 - s.phi.get(x, y));

describe('gas and liquid are neither made nor lost', () => {
  it.each(['periodic all round', 'walls all round', 'slip all round', 'wall, slip, moving and wall'])(
    'in a box with %s, to round-off in f64',
    async (sides) => {
      await fc.assert(
        fc.asyncProperty(anyBox, async ({ nx, ny, seed }) => {
          const setup: Setup = {
            nx,
            ny,
            sides: SIDE_KINDS[sides],
            liquid,
            gas,
            surfaceTension,
            initial: randomState(nx, ny, seed),
            precision: 'f64',
          };
          const s = await createSimulation({ ...setup, contactAngle: 1.2, gravity: { x: -1e-4, y: 2e-5 } });
          const before = { gas: gasArea(s), mass: mass(s) };
          expect(s.advance(50).kind).toBe('ok');
          // seen 1e-15 of the area of the box
          expect(Math.abs(gasArea(s) - before.gas) / (nx * ny)).toBeLessThan(1e-14);
          expect(Math.abs(mass(s) - before.mass) / (nx * ny)).toBeLessThan(1e-14);
          expect(Math.abs(s.totals().gasArea - gasArea(s)) / (nx * ny)).toBeLessThan(1e-14);
        }),
        { numRuns: 25, seed: 1 },
      );
    },
  );

  it('around solid cells that touch walls and ends, to round-off in f64', async () => {
    const [nx, ny] = [24, 16];
    const solid = new Uint8Array(nx * ny);
    for (const [x, y] of [
      [3, 0],
      [3, 1],
      [4, 2],
      [0, 8],
      [23, 8],
      [23, 9],
      [12, 15],
      [12, 14],
      [13, 13],
    ])
      solid[y * nx + x] = 1;
    const initial = randomState(nx, ny, 5);
    const s = await createSimulation({
      nx,
      ny,
      sides: { ...CLOSED, bottom: 'periodic', top: 'periodic' },
      liquid,
      gas,
      surfaceTension,
      solid,
      initial,
      precision: 'f64',
    });
    const before = gasArea(s);
    expect(s.advance(200).kind).toBe('ok');
    expect(Math.abs(gasArea(s) - before) / (nx * ny)).toBeLessThan(1e-14);
  });

  it('says the gas area before the first step, after gas is placed and after a step alike', async () => {
    const setup: Setup = {
      nx: 30,
      ny: 30,
      sides: PERIODIC,
      liquid,
      gas,
      surfaceTension,
      initial: { phi: roundBubble(14, 14, 6) },
      precision: 'f64',
    };
    for (const s of [createReference(setup), await createSimulation(setup)]) {
      const first = gasArea(s);
      expect(first).toBeGreaterThan(100);
      expect(s.totals().gasArea).toBeCloseTo(first, 9);
      const added = s.placeGas({ x: 2, y: 28, radius: 4 });
      expect(s.totals().gasArea).toBeCloseTo(first + added, 9);
      s.advance(1);
      expect(s.totals().gasArea).toBeCloseTo(first + added, 9);
    }
  });

  it('takes out what it says it skimmed', async () => {
    const skim = Float64Array.from({ length: 32 }, (_, x) => (x >= 24 ? 0.02 : 0));
    const s = await createSimulation({
      nx: 32,
      ny: 24,
      sides: PERIODIC,
      liquid,
      gas,
      surfaceTension,
      skim,
      initial: { phi: roundBubble(24, 12, 7) },
      precision: 'f64',
    });
    const before = gasArea(s);
    expect(s.advance(100).kind).toBe('ok');
    expect(s.totals().skimmed).toBeGreaterThan(0.2 * before);
    expect(s.totals().gasArea + s.totals().skimmed).toBeCloseTo(before, 10);
  });
});

describe('momentum is neither made nor lost in a periodic box', () => {
  it('of one phase, to round-off in f64', async () => {
    await fc.assert(
      fc.asyncProperty(anyBox, async ({ nx, ny, seed }) => {
        const s = await createSimulation({ nx, ny, sides: PERIODIC, liquid, initial: randomState(nx, ny, seed), precision: 'f64' });
        const before = momentum(s);
        expect(s.advance(50).kind).toBe('ok');
        const after = momentum(s);
        // seen 1e-17 a cell, of speeds up to 0.025
        expect(Math.abs(after.x - before.x) / (nx * ny)).toBeLessThan(1e-16);
        expect(Math.abs(after.y - before.y) / (nx * ny)).toBeLessThan(1e-16);
      }),
      { numRuns: 25, seed: 2 },
    );
  });

  it('of one phase pushed by a force: it grows by force times cells in every step', async () => {
    const force = { x: 2e-6, y: -3e-6 };
    const s = await createSimulation({ nx: 9, ny: 5, sides: PERIODIC, liquid, force, initial: randomState(9, 5, 3), precision: 'f64' });
    s.advance(1);
    const before = momentum(s);
    s.advance(100);
    const after = momentum(s);
    expect(after.x - before.x).toBeCloseTo(100 * 45 * force.x, 14);
    expect(after.y - before.y).toBeCloseTo(100 * 45 * force.y, 14);
  });

  it('of two phases of one density without surface tension, to round-off in f64, however the phases lie', async () => {
    await fc.assert(
      fc.asyncProperty(anyBox, async ({ nx, ny, seed }) => {
        const s = await createSimulation({
          nx,
          ny,
          sides: PERIODIC,
          liquid,
          gas: { ...gas, density: liquid.density },
          surfaceTension: 0,
          initial: randomState(nx, ny, seed),
          precision: 'f64',
        });
        const before = momentum(s);
        expect(s.advance(50).kind).toBe('ok');
        const after = momentum(s);
        expect(Math.abs(after.x - before.x) / (nx * ny)).toBeLessThan(1e-15);
        expect(Math.abs(after.y - before.y) / (nx * ny)).toBeLessThan(1e-15);
      }),
      { numRuns: 25, seed: 3 },
    );
  });

  it('of two phases with surface tension, but for what mu grad(phi) leaves on the grid', async () => {
    // mu grad(phi) is no difference of fluxes on a grid: it drags a bubble that moves across the cells. Seen: 1 % in 2000 steps
    // (40 cells of way), in proportion to sigma and to the speed
    const initial = { phi: roundBubble(23.3, 24.4, 12), velocity: () => ({ x: 0.02, y: 0.01 }) };
    const s = await createSimulation({ nx: 48, ny: 48, sides: PERIODIC, liquid, gas, surfaceTension, initial, precision: 'f64' });
    const before = momentum(s);
    expect(s.advance(2000).kind).toBe('ok');
    const after = momentum(s);
    expect(Math.abs(after.x / before.x - 1)).toBeLessThan(0.02);
    expect(Math.abs(after.y / before.y - 1)).toBeLessThan(0.02);
  });
});

describe('a periodic shift', () => {
  // f32: the sums of a cell must not depend on its place among the lanes or on the padding
  it.each([1, 2, 3, 4])('by %i cells along or across commutes with ten steps, bit for bit in f32', async (shift) => {
    for (const [nx, ny] of [
      [13, 6],
      [16, 5],
      [3, 7],
    ]) {
      for (const twoPhase of [false, true]) {
        const initial = randomState(nx, ny, 7);
        const setup: Setup = {
          nx,
          ny,
          sides: PERIODIC,
          liquid,
          initial,
          force: { x: 1e-5, y: 2e-5 },
          ...(twoPhase ? { gas, surfaceTension } : {}),
        };
        const plain = await createSimulation(setup);
        plain.advance(10);
        for (const [sx, sy] of [
          [shift, 0],
          [0, shift],
          [shift, shift],
        ]) {
          const from = (x: number, y: number): [number, number] => [(x + nx * shift - sx) % nx, (y + ny * shift - sy) % ny];
          const shifted = await createSimulation({
            ...setup,
            initial: {
              phi: (x, y) => initial.phi?.(...from(x, y)) ?? 1,
              velocity: (x, y) => initial.velocity?.(...from(x, y)) ?? { x: 0, y: 0 },
              pressure: (x, y) => initial.pressure?.(...from(x, y)) ?? 0,
            },
          });
          shifted.advance(10);
          for (const name of ['phi', 'ux', 'uy', 'pressure'] as const) {
            for (let y = 0; y < ny; y++) {
              for (let x = 0; x < nx; x++) {
                if (shifted[name].get(x, y) !== plain[name].get(...from(x, y)))
                  expect.fail(`${name} of ${x}, ${y} in ${nx} x ${ny} shifted by ${sx}, ${sy}`);
              }
            }
          }
        }
        expect(Math.abs(plain.ux.get(1, 1))).toBeGreaterThan(1e-8);
      }
    }
  });
});

describe('a run in parts', () => {
  const setup: Setup = {
    nx: 37,
    ny: 12,
    sides: SIDE_KINDS['walls left and right, periodic ends'],
    liquid,
    gas,
    surfaceTension,
    contactAngle: 1,
    gravity: { x: -1e-4, y: 2e-5 },
    drive: { kind: 'upflow', target: 0.01 },
    skim: Float64Array.from({ length: 37 }, (_, x) => (x > 30 ? 0.01 : 0)),
    initial: { phi: roundBubble(15, 6, 4) },
  };
  const makers = { kernel: createSimulation, reference: async (s: Setup) => createReference(s) };
  const samplesOf = (s: Simulation) => {
    const { steps, shear, phi, upflow, gasArea: area, skimmed } = s.takeSamples();
    return [steps, shear.left.data, shear.right.data, phi.left.data, upflow, area, skimmed].map((part) =>
      Array.from(part as ArrayLike<number>),
    );
  };

  for (const [name, make] of Object.entries(makers)) {
    it(`of 3 and 7 steps gives the same bits as 10 at once, samples included (${name})`, async () => {
      const [whole, parts] = [await make(setup), await make(setup)];
      whole.advance(10, 2);
      parts.advance(3, 2);
      parts.advance(7, 2);
      expect(fieldValues(parts)).toEqual(fieldValues(whole));
      expect(samplesOf(parts)).toEqual(samplesOf(whole));
      expect(parts.totals()).toEqual(whole.totals());
      expect(parts.step).toBe(10);
    });

    it(`gives the same sample whether or not the steps before it were sampled (${name})`, async () => {
      const [whole, parts] = [await make(setup), await make(setup)];
      whole.advance(10, 5);
      parts.advance(9);
      parts.advance(1, 10);
      const last = whole.takeSamples();
      const only = parts.takeSamples();
      expect(Array.from(only.steps)).toEqual([10]);
      for (const side of ['left', 'right'] as const) {
        for (let x = 0; x < setup.nx; x++) {
          expect(only.shear[side].get(0, x)).toBe(last.shear[side].get(1, x));
          expect(only.phi[side].get(0, x)).toBe(last.phi[side].get(1, x));
        }
      }
    });

    it(`goes on from a saved image bit for bit, in place and in a fresh simulation (${name})`, async () => {
      const first = await make(setup);
      first.advance(23);
      const image = first.save();
      const saved = fieldValues(first);
      first.advance(31, 5);
      const [end, samples, totals] = [fieldValues(first), samplesOf(first), first.totals()];
      const fresh = await make(setup);
      for (const s of [first, fresh]) {
        s.restore(image);
        expect(s.step).toBe(23);
        expect(fieldValues(s)).toEqual(saved);
        s.placeGas({ x: 3, y: 6, radius: 3 });
        s.advance(1);
        s.restore(image);
        s.advance(31, 5);
        expect(fieldValues(s)).toEqual(end);
        expect(samplesOf(s)).toEqual(samples);
        expect(s.totals()).toEqual(totals);
      }
      expect(end).not.toEqual(saved);
    });

    it(`refuses the image of another box and names both sizes (${name})`, async () => {
      const image = (await make({ ...setup, nx: 20, skim: new Float64Array(20), ny: 200 })).save();
      const s = await make({ ...setup, ny: 2000 });
      expect(() => s.restore(image)).toThrow(RangeError);
      expect(() => s.restore(image)).toThrow(/^restore: image holds \d+ (numbers|bytes); this box needs \d+$/);
    });

    it(`does nothing in zero steps (${name})`, async () => {
      const s = await make(setup);
      const before = fieldValues(s);
      expect(s.advance(0)).toEqual({ kind: 'ok', step: 0 });
      expect(fieldValues(s)).toEqual(before);
    });
  }

  it('keeps more samples than the kernel has room for at once', async () => {
    // 4 MiB of room hold 7048 samples of a box 37 cells long
    const s = await createSimulation({ ...setup, ny: 2, gravity: { x: 0, y: 0 }, drive: { kind: 'loss', coefficient: 1 }, initial: {} });
    s.advance(9000, 1);
    const { steps } = s.takeSamples();
    expect(steps.length).toBe(9000);
    expect(steps.every((step, n) => step === n + 1)).toBe(true);
  });
});
