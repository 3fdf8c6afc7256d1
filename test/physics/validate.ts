/**
 * `npm run validate -- [name ...] [--long] [--readme]`: runs the checks of checks/, as many at once as there are cores, prints one
 * table and writes it to test/physics/validation.csv, with --readme between README.md's validation markers as well. A run of some
 * checks by name leaves both files alone. The exit code is 1 where a gate is missed that shortfalls.ts does not list; a
 * published sign that comes out the other way is reported alone.
 */
import { existsSync, readFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import writeFileAtomic from 'write-file-atomic';
import { CHECKS } from './checks/index.ts';
import { isFinding, type Row } from './row.ts';
import { shortfallOf } from './shortfalls.ts';
import { csvTable, markdownTable, plainTable } from './table.ts';

interface Task {
  name: string;
  long: boolean;
}

const FLAGS = ['--long', '--readme'];
const CSV = 'test/physics/validation.csv';
const MARKS = ['<!-- validation -->', '<!-- /validation -->'];

/** A check in a thread of its own. */
function inThread(task: Task): Promise<Row[]> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(new URL(import.meta.url), { workerData: task });
    worker.once('message', resolve);
    worker.once('error', reject);
    worker.once('exit', (code) => reject(new Error(`the thread of ${task.name} ended with code ${code}`)));
  });
}

/** What stands in the table where a check could not be carried to its end. */
const broken = (check: string, error: unknown): Row => ({
  ...{ check, quantity: `ended early: ${error instanceof Error ? error.message : String(error)}`, source: '', reference: Number.NaN },
  ...{ ours: [{ grid: '', value: Number.NaN, error: Number.NaN }], unit: '', order: undefined, gate: undefined },
  ...{ error: Number.NaN, verdict: 'FAIL' },
});

async function runAll(names: string[], long: boolean): Promise<Row[]> {
  const results = new Map<string, Row[]>();
  // the longest stand last in the table
  const waiting = [...names].reverse();
  const lane = async (): Promise<void> => {
    for (let name = waiting.shift(); name !== undefined; name = waiting.shift()) {
      const check = name;
      const start = performance.now();
      const rows = await inThread({ name, long }).catch((error: unknown) => [broken(check, error)]);
      results.set(check, rows);
      const verdicts = rows.map(({ verdict }) => verdict).join(', ');
      process.stderr.write(`${check}, ${((performance.now() - start) / 1000).toFixed(0)} s: ${verdicts}\n`);
    }
  };
  await Promise.all(Array.from({ length: Math.min(availableParallelism(), names.length) }, lane));
  return names.flatMap((name) => results.get(name) ?? []);
}

async function intoReadme(rows: Row[]): Promise<void> {
  const text = existsSync('README.md') ? readFileSync('README.md', 'utf8') : '';
  const [from, to] = MARKS.map((mark) => text.indexOf(mark));
  if (from === -1 || to < from) {
    process.stderr.write(`README.md left as it is: it has no ${MARKS.join(' ... ')}; set the two markers on lines of their own\n`);
    return;
  }
  await writeFileAtomic('README.md', `${text.slice(0, from + MARKS[0].length)}\n${markdownTable(rows)}\n${text.slice(to)}`);
}

async function main(): Promise<void> {
  const asked = process.argv.slice(2);
  const all = CHECKS.map(({ name }) => name);
  const unknown = asked.find((word) => !FLAGS.includes(word) && !all.includes(word));
  if (unknown !== undefined) {
    process.stderr.write(`validate: no check or option ${unknown}; checks: ${all.join(', ')}; options: ${FLAGS.join(', ')}\n`);
    process.exitCode = 2;
    return;
  }
  const some = asked.filter((word) => !FLAGS.includes(word));
  const names = some.length > 0 ? all.filter((name) => some.includes(name)) : all;
  const rows = await runAll(names, asked.includes('--long'));
  process.stdout.write(`${plainTable(rows)}\n`);
  const failed = rows.filter(({ verdict }) => verdict === 'FAIL');
  const reasonOf = (row: Row): string | undefined => (isFinding(row) ? 'the plane section shows the other sign' : shortfallOf(row));
  for (const row of failed) process.stdout.write(`\nFAIL ${row.check}, ${row.quantity}: ${reasonOf(row) ?? 'not known before'}`);
  const fresh = failed.filter((row) => reasonOf(row) === undefined);
  const held = rows.filter(({ verdict }) => verdict === 'pass').length;
  const untold = rows.filter(({ verdict }) => verdict === "can't tell").length;
  const more = untold === 0 ? '' : `, ${untold} findings that these runs can't tell`;
  process.stdout.write(`\n${held} of ${held + failed.length} gates held, ${fresh.length} missed that were not known to be${more}\n`);
  if (fresh.length > 0) process.exitCode = 1;
  if (some.length > 0) return;
  await writeFileAtomic(CSV, csvTable(rows));
  if (asked.includes('--readme')) await intoReadme(rows);
}

if (isMainThread) {
  await main();
} else {
  const task = workerData as Task;
  const check = CHECKS.find(({ name }) => name === task.name);
  parentPort?.postMessage(await check?.run(task.long));
}
