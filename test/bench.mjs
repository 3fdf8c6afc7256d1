// How fast the step is on this machine: `npm run bench`, `npm run bench -- --json`.
// Million cell updates a second, median and spread of five after a warm-up, by the clock and by this process's own processor time
// (the second is the fairer one where the machine is shared), for the compiled kernel in f32 and for its plain f64 twin.
import { cpus } from 'node:os';
import { createReference, createSimulation } from '../.build/solver/index.js';

const SIZES = [
  [600, 48],
  [2000, 80],
  [8000, 256],
];
const REPEATS = 5;
/** cell updates in one timed run: about a quarter of a second each */
const UPDATES = { kernel: 20e6, reference: 0.8e6 };

/** A panel's numbers at 80 cells across 8 mm, the standard grid: four of its bubbles in every 320 cells, both walls, a loop. */
function scene(nx, ny, twoPhase) {
  const radius = 0.25 * ny;
  const bubble = (x, y) => {
    const pitch = 4 * ny;
    const along = (((x - pitch / 2) % pitch) + pitch) % pitch;
    return 0.5 + 0.5 * Math.tanh((2 * (Math.hypot(Math.min(along, pitch - along), y - ny / 2) - radius)) / 5);
  };
  return {
    nx,
    ny,
    sides: { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' },
    liquid: { density: 1, viscosity: 6.7e-4 },
    ...(twoPhase ? { gas: { density: 0.02, viscosity: 1.3e-4 }, surfaceTension: 0.0032, gravity: { x: -4.4e-6, y: 0 } } : {}),
    drive: { kind: 'loss', coefficient: 1e-4 },
    force: { x: 1e-8, y: 0 },
    initial: { phi: bubble, velocity: (_, y) => ({ x: (0.06 * (y + 0.5) * (ny - 0.5 - y)) / ny ** 2, y: 0 }) },
  };
}

const median = (values) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
const spread = (values) => (Math.max(...values) - Math.min(...values)) / median(values);

/** Seconds by the clock and by processor time that `work` takes. */
function timed(work) {
  const cpu = process.cpuUsage();
  const start = process.hrtime.bigint();
  work();
  const wall_s = Number(process.hrtime.bigint() - start) / 1e9;
  const { user, system } = process.cpuUsage(cpu);
  return { wall_s, cpu_s: (user + system) / 1e6 };
}

function measure(simulation, updates) {
  const { nx, ny } = simulation.setup;
  const steps = Math.max(2, Math.round(updates / (nx * ny)));
  const advance = () => {
    const status = simulation.advance(steps);
    if (status.kind !== 'ok') throw new Error(`the scene of ${nx} x ${ny} ends as ${status.kind} in step ${status.step}`);
  };
  advance();
  const runs = Array.from({ length: REPEATS }, () => timed(advance));
  const rate = (seconds) => (steps * nx * ny) / seconds / 1e6;
  const wall = runs.map(({ wall_s }) => rate(wall_s));
  const cpu = runs.map(({ cpu_s }) => rate(cpu_s));
  return { steps, wall_MUps: median(wall), wall_spread: spread(wall), cpu_MUps: median(cpu), cpu_spread: spread(cpu) };
}

/** Memory read and written together by copying 256 MiB, which no cache holds; GB/s, median of five. */
function copyBandwidth() {
  const bytes = 2 ** 28;
  const [from, to] = [new Uint8Array(bytes).fill(1), new Uint8Array(bytes)];
  to.set(from);
  const runs = Array.from({ length: REPEATS }, () => (2 * bytes) / timed(() => to.set(from)).wall_s / 1e9);
  return { GB_s: median(runs), spread: spread(runs) };
}

const rows = [];
for (const [nx, ny] of SIZES) {
  for (const twoPhase of [true, false]) {
    const setup = scene(nx, ny, twoPhase);
    const phases = twoPhase ? 'two' : 'one';
    rows.push({ nx, ny, phases, engine: 'kernel f32', ...measure(await createSimulation(setup), UPDATES.kernel) });
    rows.push({ nx, ny, phases, engine: 'reference f64', ...measure(createReference(setup), UPDATES.reference) });
  }
}
const result = { cpu: cpus()[0]?.model ?? 'unknown', cores: cpus().length, node: process.version, memoryCopy: copyBandwidth(), rows };

if (process.argv.includes('--json')) {
  console.log(JSON.stringify(result, undefined, 2));
} else {
  const percent = (share) => `${Math.round(100 * share)} %`;
  console.log(`${result.cpu}, ${result.cores} cores, Node ${result.node}, one thread`);
  console.log(`memory copy ${result.memoryCopy.GB_s.toFixed(1)} GB/s read and written (spread ${percent(result.memoryCopy.spread)})`);
  console.log('million cell updates a second, median of five (spread)\n');
  console.log(
    ['cells'.padEnd(12), 'phases', 'engine'.padEnd(14), 'steps'.padStart(6), 'by the clock'.padStart(16), 'by CPU time'.padStart(16)].join(
      '  ',
    ),
  );
  for (const { nx, ny, phases, engine, steps, ...seen } of rows) {
    const cell = (rate, share) => `${rate.toFixed(rate < 10 ? 2 : 1)} (${percent(share)})`.padStart(16);
    const figures = [cell(seen.wall_MUps, seen.wall_spread), cell(seen.cpu_MUps, seen.cpu_spread)];
    console.log([`${nx} x ${ny}`.padEnd(12), phases.padEnd(6), engine.padEnd(14), String(steps).padStart(6), ...figures].join('  '));
  }
}
