import { execFileSync } from 'node:child_process';
import { afterAll, describe, expect, it } from 'vitest';
import { createSimulation, type Setup, type Simulation } from '../../solver/index.ts';
import { cornerSolids, fieldValues, MILD_PAIR, randomState, roundBubble } from './boxes.ts';

const THREADS = [2, 3, 5];
/** A program that says what memory it has and what state a bubble of gas comes to. */
const ALONE = `
  const { createHash } = await import('node:crypto');
  const { createSimulation } = await import('${new URL('../../.build/solver/index.js', import.meta.url)}');
  const sides = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' };
  const fluids = { liquid: { density: 1, viscosity: 0.05 }, gas: { density: 0.1, viscosity: 0.01 }, surfaceTension: 0.01 };
  const simulation = await createSimulation({ nx: 100, ny: 30, sides, ...fluids }, 3);
  simulation.placeGas({ x: 30, y: 12, radius: 8 });
  simulation.advance(20);
  const hash = createHash('sha256').update(simulation.save()).digest('hex');
  process.stdout.write(simulation.phi.data.buffer.constructor.name + ' ' + hash);
`;
/** A program that takes over a state again and again just when new threads fall asleep: a few hundredths of a millisecond after their start. */
const FALLING_ASLEEP = `
  const { createSimulation } = await import('${new URL('../../.build/solver/index.js', import.meta.url)}');
  const sides = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' };
  const fluids = { liquid: { density: 1, viscosity: 0.05 }, gas: { density: 0.1, viscosity: 0.01 }, surfaceTension: 0.01 };
  const setup = { nx: 100, ny: 30, sides, ...fluids };
  const image = (await createSimulation(setup, 1)).save();
  for (let n = 0; n < 100; n++) {
    const simulation = await createSimulation(setup, 2);
    const start = performance.now() + (n % 20) * 0.01;
    while (performance.now() < start);
    simulation.restore(image);
    simulation.advance(50);
    simulation.dispose();
  }
  process.stdout.write('through');
`;
const made: Simulation[] = [];

async function create(setup: Setup, threads: number): Promise<Simulation> {
  const simulation = await createSimulation(setup, threads);
  made.push(simulation);
  return simulation;
}

afterAll(() => {
  for (const simulation of made) simulation.dispose();
});

const walls = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' } as const;
const everything: Pick<Setup, 'gravity' | 'drive' | 'soundDamping' | 'contactAngle'> = {
  gravity: { x: -1e-5, y: 3e-6 },
  drive: { kind: 'loss', coefficient: 1e-4 },
  soundDamping: 0.01,
  contactAngle: 1,
};

/** Bubbles in a channel long enough for tiles of every kind, with solids, skim, drive and walls that wet. */
const channel: Setup = {
  ...{ nx: 250, ny: 45, sides: walls, ...MILD_PAIR, ...everything },
  solid: cornerSolids(250, 45),
  skim: Float64Array.from({ length: 250 }, (_, x) => (x > 220 ? 0.01 : 0)),
  initial: { phi: roundBubble(60, 20, 9), velocity: (_, y) => ({ x: (0.2 * (y + 0.5) * (44.5 - y)) / 45 ** 2, y: 0 }) },
};
const boxes: Record<string, Setup> = {
  'a channel with bubbles, solids and skimming': channel,
  'a box periodic all round': { ...channel, sides: { left: 'periodic', right: 'periodic', bottom: 'periodic', top: 'periodic' } },
  'a liquid that thins under shear': {
    ...channel,
    liquid: { ...MILD_PAIR.liquid, rheology: { consistency: 0.002, index: 0.5, yieldStress: 1e-4, least: 1e-3 } },
  },
  'a random state between walls all round, in f64': {
    ...{ nx: 33, ny: 26, sides: { left: 'wall', right: 'slip', bottom: { speed: 0.02 }, top: 'wall' }, ...MILD_PAIR, ...everything },
    initial: randomState(33, 26, 7),
    precision: 'f64',
  },
  'liquid alone': { nx: 40, ny: 20, sides: walls, liquid: MILD_PAIR.liquid, force: { x: 1e-6, y: 0 }, initial: randomState(40, 20, 3) },
};

/** A run in pieces, with samples, gas placed on the way and a state that is taken and put back. */
function story(simulation: Simulation): unknown {
  const seen: unknown[] = [simulation.advance(23, 5)];
  if (simulation.setup.gas !== undefined) seen.push(simulation.placeGas({ x: 16, y: 12, radius: 6 }));
  seen.push(simulation.advance(1, 5), simulation.advance(40, 5));
  const { steps, shear, phi, force, upflow, gasArea, skimmed } = simulation.takeSamples();
  return [
    seen,
    steps,
    shear.left.data,
    phi.right.data,
    force.x.data,
    upflow,
    gasArea,
    skimmed,
    simulation.totals(),
    fieldValues(simulation),
  ];
}

describe('any number of threads gives the same bits', () => {
  it.each(Object.entries(boxes))('%s', async (_, setup) => {
    const alone = await create(setup, 1);
    const told = story(alone);
    for (const threads of THREADS) {
      const team = await create(setup, threads);
      expect(story(team)).toEqual(told);
      expect(Buffer.compare(team.save(), alone.save())).toBe(0);
    }
  });

  it('goes on alike from the state of a run with another number', async () => {
    const [one, three] = [await create(channel, 1), await create(channel, 3)];
    three.advance(37, 4);
    one.restore(three.save());
    three.restore(three.save());
    three.takeSamples();
    expect(one.advance(30, 4)).toEqual(three.advance(30, 4));
    expect(one.takeSamples().gasArea).toEqual(three.takeSamples().gasArea);
    expect(Buffer.compare(one.save(), three.save())).toBe(0);
  });

  it('goes on from a state taken over while its threads fall asleep', () => {
    // a program of its own, for a thread that waits in vain can only be killed; about one in sixty hung while a state brought the words of the threads along
    const node = ['--input-type=module', '--eval', FALLING_ASLEEP];
    expect(execFileSync(process.execPath, node, { encoding: 'utf8', timeout: 60_000, killSignal: 'SIGKILL' })).toBe('through');
  });

  it('names the same bad cell in the same step', async () => {
    const fast: Setup = { ...channel, speedLimit: 0.0505 };
    const alone = (await create(fast, 1)).advance(200);
    expect(alone.kind).toBe('tooFast');
    for (const threads of THREADS) expect((await create(fast, threads)).advance(200)).toEqual(alone);
  });

  it('goes on alone after its threads have ended', async () => {
    const [one, two] = [await create(channel, 1), await create(channel, 2)];
    for (const simulation of [one, two]) simulation.advance(10);
    two.dispose();
    two.dispose();
    for (const simulation of [one, two]) simulation.advance(10);
    expect(Buffer.compare(two.save(), one.save())).toBe(0);
  });

  it('takes one thread, and gives the same bits, where threads share no memory', () => {
    const hash = (first: string): string =>
      execFileSync(process.execPath, ['--input-type=module', '-e', first + ALONE], { encoding: 'utf8' });
    const without = hash('delete globalThis.SharedArrayBuffer;');
    expect(without).toMatch(/^ArrayBuffer [0-9a-f]{64}$/);
    expect(hash('')).toBe(`Shared${without}`);
  });
});
