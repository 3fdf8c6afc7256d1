import { describe, expect, it } from 'vitest';
import { createReference, createSimulation, type Setup, type Simulation, type Status } from '../../solver/index.ts';
import { MILD_PAIR, roundBubble, SIDE_KINDS } from './boxes.ts';

const { liquid, gas, surfaceTension } = MILD_PAIR;
const PERIODIC = SIDE_KINDS['periodic all round'];
const BOX: Setup = { nx: 12, ny: 9, sides: PERIODIC, liquid, gas, surfaceTension };

const makers: Record<string, (setup: Setup) => Promise<Simulation>> = {
  kernel: createSimulation,
  reference: async (setup) => createReference(setup),
};

/** The status both give when run for up to `steps` steps; in f64, so that rounding does not move the cell. */
async function statuses(setup: Setup, steps: number): Promise<{ kernel: Status; reference: Status }> {
  const f64: Setup = { ...setup, precision: 'f64' };
  return { kernel: (await createSimulation(f64)).advance(steps), reference: createReference(f64).advance(steps) };
}

describe('a run that leaves its range', () => {
  for (const phases of ['one phase', 'two phases']) {
    const box: Setup = phases === 'one phase' ? { nx: 12, ny: 9, sides: PERIODIC, liquid } : BOX;

    it(`stops at the first cell that is too fast, in the first step (${phases})`, async () => {
      const fast = (x: number, y: number) => ({ x: (x === 7 && y === 4) || (x === 3 && y === 5) ? 0.9 : 0, y: 0 });
      const { kernel, reference } = await statuses({ ...box, initial: { velocity: fast } }, 100);
      expect(kernel).toMatchObject({ kind: 'tooFast', step: 1 });
      expect(reference).toMatchObject({ ...kernel, speed: expect.closeTo(kernel.kind === 'ok' ? 0 : kernel.speed, 12) });
      expect(kernel.kind !== 'ok' && kernel.speed > 0.4).toBe(true);
    });

    it(`names the very step in which a pushed box passes the limit (${phases})`, async () => {
      // u = G (step - 1/2) / rho in one phase, G step / rho with gas: step 67 is the first above 0.099 in both
      const setup: Setup = { ...box, force: { x: 0, y: 0.0015 }, speedLimit: 0.099 + 1e-9 };
      const { kernel, reference } = await statuses(setup, 100);
      expect(kernel).toEqual({
        kind: 'tooFast',
        step: 67,
        x: 0,
        y: 0,
        speed: expect.closeTo(phases === 'one phase' ? 0.09975 : 0.1005, 8),
      });
      expect(reference).toMatchObject({ kind: 'tooFast', step: 67, x: 0, y: 0 });
    });

    it.each([
      ['pressure', { pressure: (x: number, y: number) => (x === 6 && y === 5 ? Number.NaN : 0) }],
      ['pressure without end', { pressure: (x: number, y: number) => (x === 6 && y === 5 ? Infinity : 0) }],
      ['velocity', { velocity: (x: number, y: number) => ({ x: x === 6 && y === 5 ? Number.NaN : 0, y: 0 }) }],
    ])(`names the first cell that a %s that is no number reaches (${phases})`, async (_, initial) => {
      const { kernel, reference } = await statuses({ ...box, initial }, 100);
      // One step carries it to the neighbours, with gas to those whose force reads them. The first in the order of the rows:
      const reach = phases === 'one phase' ? 1 : 2;
      expect(kernel).toMatchObject({ kind: 'nonFinite', step: 1, x: 6 - reach, y: 5 - reach });
      expect(reference).toMatchObject({ kind: 'nonFinite', step: 1, x: 6 - reach, y: 5 - reach });
    });

    it(`is caught when it blows up by itself, within 100 steps (${phases})`, async () => {
      // a shear layer at a speed and a viscosity no lattice carries; a surface tension no step can follow, without any aid
      const velocity = (x: number, y: number) => ({ x: y < 4 ? 0.35 : -0.35, y: 0.05 * Math.sin(x) });
      const phi = (x: number, y: number) => (x + y) % 2;
      const thin = { density: 1, viscosity: 1e-9 };
      const wild: Setup = { ...box, liquid: thin, surfaceTension: 1, initial: { velocity, phi } };
      for (const make of Object.values(makers)) {
        const s = await make({ ...wild, speedLimit: 0.5 });
        const status = s.advance(1000);
        expect(status.kind).toMatch(/^(tooFast|nonFinite)$/);
        expect(status.step).toBeLessThanOrEqual(100);
        expect(s.step).toBe(status.step);
      }
    });
  }

  it('names the first cell that a phi that is no number reaches', async () => {
    const { kernel, reference } = await statuses({ ...BOX, initial: { phi: (x, y) => (x === 6 && y === 5 ? Number.NaN : 1) } }, 100);
    expect(kernel.kind).toBe('nonFinite');
    expect(kernel.step).toBeLessThanOrEqual(2);
    expect(reference).toMatchObject({ ...kernel, speed: Number.NaN });
  });

  it('says so again when asked to go on, and never throws', async () => {
    const initial = { velocity: (x: number, y: number) => ({ x: x === 6 && y === 5 ? Number.NaN : 0, y: 0 }) };
    for (const make of Object.values(makers)) {
      const s = await make({ ...BOX, initial });
      expect(s.advance(10)).toMatchObject({ kind: 'nonFinite', step: 1 });
      expect(s.advance(10)).toMatchObject({ kind: 'nonFinite', step: 2 });
      expect(s.step).toBe(2);
    }
  });

  it('hands over the samples up to the failing step', async () => {
    const setup: Setup = { ...BOX, force: { x: 0, y: 0.0015 }, speedLimit: 0.099 + 1e-9 };
    for (const make of Object.values(makers)) {
      const s = await make(setup);
      s.advance(100, 10);
      expect(Array.from(s.takeSamples().steps)).toEqual([10, 20, 30, 40, 50, 60]);
    }
  });

  it('goes on from an image saved before the failure', async () => {
    for (const make of Object.values(makers)) {
      const s = await make({ ...BOX, force: { x: 0, y: 0.0015 }, speedLimit: 0.099 + 1e-9 });
      s.advance(50);
      const image = s.save();
      expect(s.advance(50).kind).toBe('tooFast');
      s.restore(image);
      expect(s.advance(10)).toEqual({ kind: 'ok', step: 60 });
    }
  });

  it('takes no notice of what stands in solid cells', async () => {
    const solid = new Uint8Array(BOX.nx * BOX.ny);
    for (const [x, y] of [
      [5, 4],
      [6, 4],
      [7, 4],
      [5, 5],
      [6, 5],
      [7, 5],
      [5, 6],
      [6, 6],
      [7, 6],
    ])
      solid[y * BOX.nx + x] = 1;
    const initial = { phi: roundBubble(1, 5, 3), pressure: (x: number, y: number) => (x === 6 && y === 5 ? Number.NaN : 0) };
    for (const make of Object.values(makers)) {
      expect((await make({ ...BOX, solid, contactAngle: 0.2, initial })).advance(100)).toEqual({ kind: 'ok', step: 100 });
    }
  });
});

/** What is changed in a sound setup, and the words its refusal must hold: the entry, the value, the limit. */
const thin = (change: object): Setup['liquid'] => ({
  ...{ density: 1, viscosity: 0.01 },
  rheology: { consistency: 0.01, index: 0.5, yieldStress: 0, least: 0.001, ...change },
});

const BAD: [string, Partial<Setup>, RegExp][] = [
  ['a length of no cells', { nx: 0 }, /nx is 0; it must be a whole number of at least 1/],
  ['a broken length', { nx: 12.5 }, /nx is 12\.5; it must be a whole number/],
  ['a width below one', { ny: -3 }, /ny is -3; it must be a whole number of at least 1/],
  ['a width that is no number', { ny: Number.NaN }, /ny is NaN; it must be a whole number/],
  ['one periodic side across', { sides: { ...PERIODIC, left: 'wall' } }, /left and right must both be periodic or neither/],
  ['one periodic side along', { sides: { ...PERIODIC, top: 'slip' } }, /bottom and top must both be periodic or neither/],
  ['a wall of no speed', { sides: { ...PERIODIC, left: 'wall', right: { speed: Number.NaN } } }, /speed .*is NaN; it must be finite/],
  ['a massless liquid', { liquid: { density: 0, viscosity: 0.1 } }, /liquid\.density is 0; it must be positive/],
  ['a liquid that runs by itself', { liquid: { density: 1, viscosity: -0.1 } }, /liquid\.viscosity is -0\.1; it must be positive/],
  ['a gas of endless weight', { gas: { density: Infinity, viscosity: 0.1 } }, /gas\.density is Infinity; it must be positive and finite/],
  ['a gas without viscosity', { gas: { density: 0.1, viscosity: 0 } }, /gas\.viscosity is 0; it must be positive/],
  ['a negative surface tension', { surfaceTension: -0.01 }, /surfaceTension is -0\.01; it must not be negative/],
  ['a surface tension that is no number', { surfaceTension: Number.NaN }, /surfaceTension is NaN; it must be finite/],
  ['an interface without width', { interfaceWidth: 0 }, /interfaceWidth is 0; it must be positive/],
  ['an interface thinner than its wetting can be solved for', { interfaceWidth: 2 }, /interfaceWidth is 2; it must be more than 2 cells/],
  ['no mobility', { mobility: 0 }, /mobility is 0; it must be positive/],
  ['an angle that is no number', { contactAngle: Number.NaN }, /contactAngle is NaN; it must lie in 0 to pi/],
  ['an angle beyond a half turn', { contactAngle: 4 }, /contactAngle is 4; it must lie in 0 to pi/],
  ['solids of another box', { solid: new Uint8Array(100) }, /solid has 100 entries; nx \* ny = 108 are needed/],
  ['gravity that is no number', { gravity: { x: Number.NaN, y: 0 } }, /gravity\.x is NaN; it must be finite/],
  ['endless gravity across', { gravity: { x: 0, y: -Infinity } }, /gravity\.y is -Infinity; it must be finite/],
  ['buoyancy that is no number', { buoyancy: Number.NaN }, /buoyancy is NaN; it must be finite/],
  ['a force that is no number', { force: { x: Number.NaN, y: 0 } }, /force\.x is NaN; it must be finite/],
  ['an endless force across', { force: { x: 0, y: Infinity } }, /force\.y is Infinity; it must be finite/],
  ['a loss that is no number', { drive: { kind: 'loss', coefficient: Number.NaN } }, /drive\.coefficient is NaN; it must be/],
  ['a loss that drives', { drive: { kind: 'loss', coefficient: -1 } }, /drive\.coefficient is -1; it must not be negative/],
  ['an endless upflow', { drive: { kind: 'upflow', target: Infinity } }, /drive\.target is Infinity; it must be finite/],
  ['skimming of another box', { skim: new Float64Array(3) }, /skim has 3 entries; nx = 12 are needed/],
  ['skimming of all and more', { skim: new Float64Array(12).fill(1) }, /skim holds 1; a share lies in 0 to 1/],
  ['skimming that is no number', { skim: new Float64Array(12).fill(Number.NaN) }, /skim holds NaN; a share lies in 0 to 1/],
  ['a speed limit of nothing', { speedLimit: 0 }, /speedLimit is 0; it must be positive/],
  ['an endless speed limit', { speedLimit: Infinity }, /speedLimit is Infinity; it must be positive and finite/],
  ['a gas that thins', { gas: thin({}) }, /gas\.rheology is given; only a liquid has one/],
  ['a consistency of nothing', { liquid: thin({ consistency: 0 }) }, /liquid\.rheology\.consistency is 0; it must be positive/],
  ['a liquid that thickens', { liquid: thin({ index: 1.2 }) }, /liquid\.rheology\.index is 1\.2; it must lie in 0\.1 to 1/],
  ['a negative yield stress', { liquid: thin({ yieldStress: -1 }) }, /liquid\.rheology\.yieldStress is -1; it must not be negative/],
  ['a least viscosity above all', { liquid: thin({ least: 0.2 }) }, /liquid\.rheology\.least is 0\.2; it must lie in 0 to 0\.16/],
  ['too thick a liquid', { liquid: thin({ most: 0.2 }) }, /liquid\.rheology\.most is 0\.2; it must lie in 0 to 0\.16/],
  ['sound that grows', { soundDamping: -0.1 }, /soundDamping is -0\.1; it must lie in 0 to 0\.1/],
];

describe('a setup that cannot be computed is refused with the entry, its value and its limit', () => {
  it.each(BAD)('%s', async (_, change, words) => {
    const setup = { ...BOX, ...change };
    expect(() => createReference(setup)).toThrow(RangeError);
    expect(() => createReference(setup)).toThrow(words);
    await expect(createSimulation(setup)).rejects.toThrow(RangeError);
    await expect(createSimulation(setup)).rejects.toThrow(words);
  });

  it('a gas without its surface tension', async () => {
    const { surfaceTension: _, ...without } = BOX;
    await expect(createSimulation(without)).rejects.toThrow(/surfaceTension is missing; a box with gas needs it/);
    expect(() => createReference(without)).toThrow(RangeError);
  });

  it.each([
    [20_000, 4000],
    [1_000_000, 1_000_000],
  ])('a box of %i by %i cells, with the memory it needs and the limit', async (nx, ny) => {
    const words = new RegExp(`${nx} x ${ny} cells need \\d+ MiB; the limit is 2048 MiB`);
    await expect(createSimulation({ ...BOX, nx, ny })).rejects.toThrow(RangeError);
    await expect(createSimulation({ ...BOX, nx, ny })).rejects.toThrow(words);
  });

  it.each([0, -2, Number.NaN])('gas of radius %d', async (radius) => {
    for (const make of Object.values(makers)) {
      const s = await make(BOX);
      expect(() => s.placeGas({ x: 5, y: 5, radius })).toThrow(new RangeError(`placeGas: radius is ${radius}; it must be positive`));
    }
  });

  it('takes the edges of what is allowed', async () => {
    const edge: Setup = {
      ...BOX,
      surfaceTension: 0,
      contactAngle: Math.PI,
      skim: new Float64Array(12).fill(0.999),
    };
    for (const make of Object.values(makers)) expect((await make(edge)).advance(5)).toEqual({ kind: 'ok', step: 5 });
  });
});
