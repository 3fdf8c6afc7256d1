import { join } from 'node:path';
import { type Case, type Derived, layOut } from '../cases/index.ts';
import { type GridRun, gridFolder, openRefinement, type Refinement, readRefined, refinement, writeRefinement } from '../output/index.ts';
import { CaseError, UsageError } from '../solver/index.ts';
import { count, percent, plain } from './numbers.ts';
import { run } from './run.ts';
import { readSource } from './source.ts';
import { table } from './summary.ts';
import { CAUTION, warnings } from './warnings.ts';

/** Ratio of the cells of neighbouring grids where none are asked for: well above the 1.3 that is advised, and cheap. */
const RATIO = 1.5;

/** What the command line asks of a refinement. */
export interface RefineOptions {
  word: string;
  sets: string[];
  /** three numbers of cells across with commas between; undefined: the case's own and two coarser */
  grids: string | undefined;
  /** error of the grid that counts as converged, relative */
  within: number;
  out: string | undefined;
  /** starts the runs over */
  again: boolean;
  /** wall time between checkpoints */
  checkpoint_s: number;
  quiet: boolean;
  /** the words after `swathe`, to say how to go on */
  words: readonly string[];
}

/** The case on one grid. */
interface Grid {
  across: number;
  sets: string[];
  panel: Case;
  derived: Derived;
}

/**
 * Runs a case on three grids, the coarsest first, each into a run folder of its own, and says what they say together. Only the number of
 * cells across changes: `grid.speed` keeps the time step in proportion to the cell. Finished runs are taken as they are, unfinished ones
 * go on. Returns the exit code: that of a run that was stopped, else 0 whatever the verdicts.
 */
export async function refine(options: RefineOptions): Promise<number> {
  const { word, sets, quiet } = options;
  const { name, text, panel } = readSource(word, sets);
  const [coarse, middle, fine] = gridsAcross(options.grids, panel.grid.across).map((across) => gridOf(options, across));
  const path = options.out ?? join('runs', `${name}-refine`);
  await openRefinement(path, text, options.again);
  const work = [coarse, middle, fine].reduce((sum, { derived }) => sum + updates(derived), 0);
  const compute = async (grid: Grid, place: number): Promise<GridRun | number> => {
    const share = percent(updates(grid.derived) / work, 2);
    if (!quiet) process.stderr.write(`grid ${place} of 3: ${gridLine(grid)}, ${share} of the work\n`);
    return runGrid(grid, path, options);
  };
  const first = await compute(coarse, 1);
  if (typeof first === 'number') return first;
  const second = await compute(middle, 2);
  if (typeof second === 'number') return second;
  const third = await compute(fine, 3);
  if (typeof third === 'number') return third;
  const found = refinement([first, second, third], options.within);
  // what bites on every grid is no matter of the grids
  const everywhere = warnings(fine.panel, fine.derived);
  const onCoarse = warnings(coarse.panel, coarse.derived).filter((text) => !everywhere.includes(text));
  found.notes.push(...onCoarse.map((text) => `On the coarsest grid: ${text}.`));
  await writeRefinement(path, found);
  if (!quiet) process.stdout.write(`${page(found, path)}\n`);
  return 0;
}

/** The finished run on one grid, or the exit code of one that was stopped. */
async function runGrid({ across, sets, panel, derived }: Grid, path: string, options: RefineOptions): Promise<GridRun | number> {
  const folder = gridFolder(across);
  const out = join(path, folder);
  try {
    const exit = await run({ ...options, sets, out, frames: 0, partial: true });
    return exit === 0 ? { panel, derived, folder, answers: await readRefined(out) } : exit;
  } catch (error) {
    process.stderr.write(`the run with ${across} cells across failed; finished ones are kept:\n`);
    throw error;
  }
}

function gridLine({ across, derived: { nx, ny, steps } }: Grid): string {
  return `${across} across, ${count(nx * ny)} cells, ${count(steps)} steps`;
}

function updates({ nx, ny, steps }: Derived): number {
  return nx * ny * steps;
}

/** The cells across of the three grids, rising. */
function gridsAcross(text: string | undefined, own: number): number[] {
  if (text === undefined) return [Math.round(own / RATIO ** 2), Math.round(own / RATIO), own];
  const words = text.split(',').map((word) => word.trim());
  const grids = words.map(Number).sort((a, b) => a - b);
  if (words.length !== 3 || !words.every((word) => /^\d{1,4}$/.test(word))) {
    throw new UsageError('grids', `--grids ${text}: not three whole numbers of cells across with commas between, as in --grids 24,32,48`);
  }
  if (new Set(grids).size < 3) throw new UsageError('grids', `--grids ${text}: one grid stands there twice; give three different ones`);
  return grids;
}

/** @throws UsageError a sound case that this grid does not carry */
function gridOf({ word, sets, grids }: RefineOptions, across: number): Grid {
  const onGrid = [...sets, `grid.across=${across}`];
  try {
    const { panel } = readSource(word, onGrid);
    return { across, sets: onGrid, panel, derived: layOut(panel).derived };
  } catch (error) {
    if (!(error instanceof CaseError)) throw error;
    const faults = error.faults.map(({ path, problem, allowed }) => `${path} ${problem}${allowed === undefined ? '' : ` (${allowed})`}`);
    const remedy = grids === undefined ? 'Choose three grids with --grids, as in --grids 24,32,48' : 'Choose other grids';
    throw new UsageError('grids', `with ${across} cells across the case cannot be computed: ${faults.join('; ')}. ${remedy}`);
  }
}

function page({ title, within, swept, grids, measures, notes }: Refinement, path: string): string {
  const heads = ['measure', ...grids.map(({ across }) => `${across} across`), 'order', 'extrapolated', 'change', 'index'];
  const rows = measures.map(({ name, values, convergence: found }) => [
    name,
    ...values.map((value) => plain(value)),
    plain(found?.order, 2),
    plain(found?.extrapolated),
    percent(found?.change, 2),
    percent(found?.index, 2),
  ]);
  const says = ['verdict', ...measures.map(({ verdict }) => verdict.says)];
  const lines = table([heads, ...rows]).split('\n');
  return [
    `${title}: three grids, converged means within ${percent(within)}`,
    `swept: share of the wall above ${plain(swept.above_Pa)} Pa at least once within ${plain(swept.within_s)} s`,
    ...lines.map((line, i) => `${line}  ${says[i]}`),
    ...notes.map((note) => `note: ${note}`),
    `files: ${path}`,
    CAUTION,
  ].join('\n');
}
