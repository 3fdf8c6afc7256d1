/**
 * `npm run soak -- [cases] [first seed]`: seeded random cases from the range of the schema, each run for a short time, as many at
 * once as there are cores. Prints one line per case that could not be followed to its end and the command that repeats it, how far
 * it is and, in one line, how many held. The 200 cases from seed 1 on are the ones to quote: their line goes to test/physics/soak.txt. The
 * exit code is 1 where a case was not followed to its end.
 */
import { availableParallelism } from 'node:os';
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import writeFileAtomic from 'write-file-atomic';
import { readCase, simulate } from '../../cases/index.ts';
import { SwatheError } from '../../solver/index.ts';

/** Uniform numbers from a seed: mulberry32, a 32-bit mixing generator (from memory). */
function uniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** A case as a person might try it: gaps, tilts, fins, bubbles and rates over their usual ranges and somewhat beyond. */
function caseOf(seed: number): string {
  const random = uniform(seed);
  const between = (low: number, high: number): number => Number((low + (high - low) * random()).toPrecision(3));
  const gap = between(5, 16);
  const across = Math.round(Math.max(24, gap * between(3, 5)));
  const bubble = Math.min(between(2.5, 7), gap * 0.7);
  const fins =
    random() < 0.5
      ? ''
      : `fins:\n  - {from: ${between(22, 26)} mm, pitch: 22 mm, count: 2, across: ${Number((gap * between(0.3, 0.7)).toPrecision(3))} mm, ` +
        `length: ${Number((gap * between(0.3, 0.45)).toPrecision(3))} mm, thickness: 1 mm, angle: ${between(-60, 60)} deg, alternate: ${random() < 0.5}}\n`;
  return `title: Soak ${seed}
channel: {gap: ${gap} mm, height: 80 mm, tilt: ${between(-45, 45)} deg, wetting: ${between(30, 150)} deg, membranes: [left, right], return: ${
    random() < 0.8 ? `{loss: ${between(1, 50)}}` : `{upflow: ${between(0, 0.3)} m/s}`
  }}
${fins}liquid: {kind: water, temperature: ${between(8, 35)} degC}
gas: {supply: ${between(0.1, 1)} m3/(m2 h), serves: 1 m, bubble: {diameter: ${Number(bubble.toPrecision(3))} mm, spread: ${between(0, 25)} %}, across: ${
    random() < 0.5 ? 'middle' : 'even'
  }, seed: ${seed}}
grid: {across: ${across}, speed: 0.3 m/s}
record: {settle: 0 s, span: 0.5 s, every: 5 ms}
swept: {above: 0.5 Pa, within: 0.1 s}
`;
}

interface Outcome {
  seed: number;
  /** undefined where the case was followed to its end */
  failure: string | undefined;
  /** the schema refused the case: no statement about the method */
  refused: boolean;
}

async function soak(seed: number): Promise<Outcome> {
  try {
    const recording = await simulate(readCase(caseOf(seed), `soak-${seed}`, []));
    const finite = recording.walls.right.shear_Pa.every((tau) => Number.isFinite(tau) || Number.isNaN(tau));
    return { seed, failure: finite ? undefined : 'the wall shear is not finite', refused: false };
  } catch (error) {
    if (!(error instanceof SwatheError)) throw error;
    return { seed, failure: error.message, refused: error.exit === 2 };
  }
}

/** Cases from the first seed on that the summary is kept of, and cases between two lines of progress. */
const QUOTED = { count: 200, first: 1 };
const LINE_EVERY = 10;
const SUMMARY = 'test/physics/soak.txt';

/** What came out, in one line. */
function summaryOf(outcomes: readonly Outcome[], first: number): string {
  const failed = outcomes.filter(({ failure, refused }) => failure !== undefined && !refused).map(({ seed }) => seed);
  const refused = outcomes.filter((outcome) => outcome.refused).length;
  const names = failed.length === 0 ? '' : ` (seeds ${failed.sort((a, b) => a - b).join(', ')})`;
  const held = outcomes.length - failed.length - refused;
  const last = first + outcomes.length - 1;
  return `${outcomes.length} random cases of 0.5 s, seeds ${first} to ${last}: ${held} held, ${failed.length} failed${names}, ${refused} refused by the schema`;
}

async function main(): Promise<void> {
  const [count, first] = [Number(process.argv[2] ?? QUOTED.count), Number(process.argv[3] ?? QUOTED.first)];
  const start_ms = performance.now();
  const seeds = Array.from({ length: count }, (_, n) => first + n).reverse();
  const outcomes: Outcome[] = [];
  const lane = async (): Promise<void> => {
    for (let seed = seeds.pop(); seed !== undefined; seed = seeds.pop()) {
      const outcome = await new Promise<Outcome>((resolve, reject) => {
        const worker = new Worker(new URL(import.meta.url), { workerData: { seed } });
        worker.once('message', resolve);
        worker.once('error', reject);
      });
      outcomes.push(outcome);
      if (outcome.failure !== undefined) {
        const again = `npm run soak -- 1 ${seed}`;
        console.log(`${outcome.refused ? 'refused' : 'FAILED'} seed ${seed} (${again}): ${outcome.failure}`);
      }
      if (outcomes.length % LINE_EVERY === 0 && outcomes.length < count) {
        const passed_min = (performance.now() - start_ms) / 60_000;
        const left_min = (passed_min / outcomes.length) * (count - outcomes.length);
        process.stderr.write(`${outcomes.length} of ${count}, ${passed_min.toFixed(1)} min, about ${left_min.toFixed(1)} min left\n`);
      }
    }
  };
  await Promise.all(Array.from({ length: availableParallelism() }, lane));
  const summary = summaryOf(outcomes, first);
  console.log(summary);
  if (count === QUOTED.count && first === QUOTED.first) {
    await writeFileAtomic(SUMMARY, `${new Date().toISOString().slice(0, 10)}: ${summary}\n`);
  }
  if (outcomes.some(({ failure, refused }) => failure !== undefined && !refused)) process.exitCode = 1;
}

if (isMainThread) await main();
else {
  const { seed } = workerData as { seed: number };
  parentPort?.postMessage(await soak(seed));
}
