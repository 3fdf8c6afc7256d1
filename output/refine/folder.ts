import { join, resolve } from 'node:path';
import { OutputError } from '../../solver/index.ts';
import { list, makeFolder, readWhole, remove, writeWhole } from '../folder/files.ts';
import { RunFolder } from '../folder/folder.ts';
import { type Cell, csv } from '../tables/table.ts';
import type { Refinement } from './refinement.ts';

const CASE_FILE = 'case.yaml';
const TABLE_FILE = 'refine.csv';
const REPORT_FILE = 'refine.json';
const RUN_FOLDER = /^across-\d+$/;
/** An own file, or what a write of it that was cut off leaves. */
const OWN_FILE = /^(case\.yaml|refine\.csv|refine\.json)(\.\d+)?$/;

/** Name of the run folder of one grid. */
export function gridFolder(across: number): string {
  return `across-${across}`;
}

/**
 * Makes ready the folder of a refinement: a new one, an empty one, or one of a refinement of the same case, whose runs stay and whose
 * results go, for they are written anew.
 * @param caseText the case as asked, whatever its grid
 * @param again takes the folder of another case too
 * @throws OutputError other files in it, a refinement of another case, not writable
 */
export async function openRefinement(path: string, caseText: string, again: boolean): Promise<void> {
  const full = resolve(path);
  const names = (await list(full)) ?? [];
  const foreign = names.find((name) => !RUN_FOLDER.test(name) && !OWN_FILE.test(name));
  if (foreign !== undefined) {
    throw new OutputError(
      full,
      `${full}: the folder holds other files (such as ${foreign}) and no refinement; choose a new or an empty folder.`,
    );
  }
  const held = (await readWhole(join(full, CASE_FILE)))?.toString('utf8');
  if (held !== undefined && held !== caseText && !again) {
    throw new OutputError(
      full,
      `${full}: the folder holds a refinement of another case; it was kept. Give another folder with --out, or --again to replace it.`,
    );
  }
  await makeFolder(full);
  if (held !== undefined && held !== caseText) await removeRuns(full, names);
  await remove(
    full,
    names.filter((name) => OWN_FILE.test(name) && name !== CASE_FILE),
  );
  if (held !== caseText) await writeWhole(join(full, CASE_FILE), caseText);
}

/** @throws OutputError another process writes into one of them */
async function removeRuns(path: string, names: readonly string[]): Promise<void> {
  const runs = names.filter((name) => RUN_FOLDER.test(name));
  for (const name of runs) await (await RunFolder.claim(join(path, name))).release();
  await remove(path, runs);
}

/** Writes refine.csv and refine.json. Both are whole or absent. */
export async function writeRefinement(path: string, refinement: Refinement): Promise<void> {
  await writeWhole(join(path, TABLE_FILE), table(refinement));
  await writeWhole(join(path, REPORT_FILE), `${JSON.stringify(report(refinement), null, 2)}\n`);
}

/**
 * One row per measure. `coarse`, `middle`, `fine`, `extrapolated` carry the unit at the end of the measure's name; `change`, `index` and
 * `error` are shares of the finest value. Empty cells: not to be had.
 */
function table({ grids, measures }: Refinement): string {
  const across = ['coarse', 'middle', 'fine'].map((grid) => `${grid}_across`);
  const header = ['measure', ...across, 'coarse', 'middle', 'fine', 'order', 'extrapolated', 'change', 'index', 'error'];
  const rows = measures.map(({ name, values, convergence, verdict }): Cell[] => {
    const { order = null, extrapolated = null, change = null, index = null } = convergence ?? {};
    return [
      name,
      ...grids.map((grid) => grid.across),
      ...values,
      order,
      extrapolated,
      change,
      index,
      verdict.error,
      verdict.state,
      verdict.says,
    ];
  });
  return csv([...header, 'verdict', 'says'], rows);
}

function report({ title, within, swept, grids, measures, notes }: Refinement): object {
  return {
    title,
    method: 'Celik, Ghia, Roache, Freitas, Coleman & Raad 2008, J. Fluids Eng. 130, 078001',
    within,
    swept,
    grids,
    measures: measures.map(({ name, values, convergence, verdict }) => ({
      measure: name,
      coarse: values[0],
      middle: values[1],
      fine: values[2],
      order: convergence?.order ?? null,
      extrapolated: convergence?.extrapolated ?? null,
      change: convergence?.change ?? null,
      index: convergence?.index ?? null,
      error: verdict.error,
      verdict: verdict.state,
      says: verdict.says,
    })),
    notes,
  };
}
