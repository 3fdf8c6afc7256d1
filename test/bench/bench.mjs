// How fast the step is on this machine: `npm run bench`, `npm run bench -- --json`.
// Million cell updates a second, median and spread of five after a warm-up, by the clock and by the processor time of a thread (the
// second is the fairer one where the machine is shared, but tells nothing of threads that sleep until others are done); beside it the plain f64 twin, a straightforward ndarray program, and what the
// machine can do at most. A panel's minute: seconds of a panel of 8 mm with 80 cells across, 0.3 m/s at 0.02, in a minute of the clock.
import { availableParallelism, cpus } from 'node:os';
import { createReference, createSimulation } from '../../.build/solver/index.js';
import { arrays } from './arrays.mjs';
import { arithmetic, copyBandwidth } from './limits.mjs';
import { KINDS, scene } from './scenes.mjs';
import { median, spread, timed } from './timing.mjs';

const SIZES = [
  [600, 48],
  [2000, 80],
  [8000, 256],
];
const REPEATS = 5;
/** cell updates in one timed run: about a quarter of a second each */
const UPDATES = { kernel: 20e6, plain: 0.8e6 };
/** of the standard panel: time step, s, and cells */
const PANEL = { dt_s: (0.02 * (8e-3 / 80)) / 0.3, cells: 2000 * 80 };
/** bytes that a cell of liquid has to be read and written at least, one of two fluids, and operations of both */
const LEAST = { pure: { bytes: 72, operations: 85 }, everything: { bytes: 144, operations: 260 } };

function measure(simulation, updates, threads = 1) {
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
  const cpu = runs.map(({ cpu_s }) => rate(cpu_s / threads));
  return { threads, steps, wall_MUps: median(wall), wall_spread: spread(wall), cpu_MUps: median(cpu), cpu_spread: spread(cpu) };
}

async function kernel(kind, nx, ny, threads) {
  const simulation = await createSimulation(scene(kind, nx, ny), threads);
  const seen = measure(simulation, UPDATES.kernel, threads);
  simulation.dispose();
  return { nx, ny, kind, engine: 'kernel f32', ...seen };
}

/** Seconds of a step against cells: cost per cell of a line through four sizes, and the largest distance from it. */
async function linearity() {
  const seen = [];
  for (const nx of [500, 1000, 2000, 4000]) {
    const { cpu_MUps } = await kernel('panel', nx, 80, 1);
    seen.push({ cells: nx * 80, step_s: (nx * 80) / cpu_MUps / 1e6 });
  }
  const mean = (of) => seen.reduce((sum, one) => sum + of(one), 0) / seen.length;
  const [cells, time] = [mean((one) => one.cells), mean((one) => one.step_s)];
  const perCell_s = mean((one) => (one.cells - cells) * (one.step_s - time)) / mean((one) => (one.cells - cells) ** 2);
  const worst = Math.max(...seen.map((one) => Math.abs(one.step_s / (time + perCell_s * (one.cells - cells)) - 1)));
  return { perCell_ns: 1e9 * perCell_s, perStep_us: 1e6 * (time - perCell_s * cells), worst };
}

const cores = availableParallelism();
const rows = [];
for (const [nx, ny] of SIZES) {
  for (const kind of KINDS) {
    rows.push(await kernel(kind, nx, ny, 1));
    if (cores > 1 && kind !== 'pure') rows.push(await kernel(kind, nx, ny, 2));
  }
}
const [nx, ny] = SIZES[0];
rows.push({
  nx,
  ny,
  kind: 'everything',
  engine: 'plain twin f64',
  ...measure(createReference(scene('everything', nx, ny)), UPDATES.plain),
});
rows.push({ nx, ny, kind: 'pure', engine: 'ndarray f64', ...measure(arrays(scene('pure', nx, ny)), UPDATES.plain) });
const limits = { memoryCopy: copyBandwidth(), multiplyAdd: await arithmetic() };
for (const row of rows) {
  const least = LEAST[row.kind];
  if (row.engine !== 'kernel f32' || least === undefined || row.threads > 1) continue;
  row.shareOfMemory = (row.cpu_MUps * least.bytes) / 1e3 / limits.memoryCopy.GB_s;
  row.shareOfArithmetic = (row.cpu_MUps * least.operations) / 1e3 / limits.multiplyAdd.Gop_s;
}
for (const row of rows) row.panelSecondsAMinute = ((60 * row.wall_MUps * 1e6) / PANEL.cells) * PANEL.dt_s;
const result = { cpu: cpus()[0]?.model ?? 'unknown', cores, node: process.version, limits, linear: await linearity(), rows };

const percent = (share) => `${Math.round(100 * share)} %`;
function print({ limits: { memoryCopy, multiplyAdd }, linear }) {
  console.log(`${result.cpu}, ${cores} cores, Node ${result.node}`);
  console.log(`memory copy ${memoryCopy.GB_s.toFixed(1)} GB/s read and written (spread ${percent(memoryCopy.spread)})`);
  console.log(`multiply-add ${multiplyAdd.Gop_s.toFixed(1)} 1e9/s in lanes of four (spread ${percent(multiplyAdd.spread)})`);
  console.log(
    `a step of the panel takes ${linear.perCell_ns.toFixed(2)} ns a cell and ${linear.perStep_us.toFixed(0)} us; four sizes lie within ${percent(linear.worst)} of that`,
  );
  console.log('million cell updates a second, median of five (spread)\n');
  const heads = [
    'cells'.padEnd(10),
    'scene'.padEnd(10),
    'engine'.padEnd(14),
    'threads',
    'by the clock'.padStart(15),
    'by CPU time'.padStart(15),
  ];
  console.log([...heads, 'panel s/min', 'memory', 'arithmetic'].join('  '));
  for (const row of rows) {
    const cell = (rate, share) => `${rate.toFixed(rate < 10 ? 2 : 1)} (${percent(share)})`.padStart(15);
    const share = (value) => (value === undefined ? '' : percent(value)).padStart(6);
    console.log(
      [
        ...[`${row.nx} x ${row.ny}`.padEnd(10), row.kind.padEnd(10), row.engine.padEnd(14), String(row.threads).padStart(7)],
        ...[cell(row.wall_MUps, row.wall_spread), cell(row.cpu_MUps, row.cpu_spread), row.panelSecondsAMinute.toFixed(2).padStart(11)],
        ...[share(row.shareOfMemory), share(row.shareOfArithmetic)],
      ].join('  '),
    );
  }
}
if (process.argv.includes('--json')) console.log(JSON.stringify(result, undefined, 2));
else print(result);
