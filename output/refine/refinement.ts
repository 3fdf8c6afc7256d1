import type { Case, Derived } from '../../cases/index.ts';
import { rangeOf } from '../measures/answers.ts';
import { REFINED } from './answers.ts';
import { type Convergence, gridConvergence, type Triple } from './convergence.ts';
import { BELIEVED_ORDER, type Verdict, verdictOn } from './verdict.ts';

/** Smallest ratio of cell sizes that is advised: below it differences drown in everything else (Celik et al. 2008, from experience). */
const LEAST_RATIO = 1.3;

/** One case on one grid, run to its end. */
export interface GridRun {
  panel: Case;
  derived: Derived;
  /** name of its run folder, within that of the refinement */
  folder: string;
  /** values of {@link REFINED} */
  answers: readonly (number | null)[];
}

/** One measure on three grids. */
interface RefinedMeasure {
  /** of the answer */
  name: string;
  /** one per grid, the coarsest first */
  values: (number | null)[];
  /** undefined where some grid has no value */
  convergence: Convergence | undefined;
  verdict: Verdict;
}

/** What three grids say about a case. */
export interface Refinement {
  title: string;
  /** relative error of the grid that counts as converged */
  within: number;
  swept: Case['swept'];
  /** the coarsest first */
  grids: { folder: string; across: number; nx: number; dx_m: number; dt_s: number; steps: number; cellsPerBubble: number }[];
  measures: RefinedMeasure[];
  /** what a reader must know about these numbers */
  notes: string[];
}

/**
 * Order, extrapolated value, index and verdict of every measure.
 * @param runs the same case on three grids, the coarsest first
 * @param within relative error of the grid that counts as converged
 */
export function refinement(runs: readonly [GridRun, GridRun, GridRun], within: number): Refinement {
  const [coarse, middle, fine] = runs;
  const cells: Triple = [fine.derived.dx_m, middle.derived.dx_m, coarse.derived.dx_m];
  const measures = REFINED.map((name, i): RefinedMeasure => {
    const values = runs.map(({ answers }) => answers[i]);
    const [c, m, f] = values;
    const convergence = c === null || m === null || f === null ? undefined : gridConvergence([f, m, c], cells);
    return { name, values, convergence, verdict: verdictOn(convergence, { within, ratio21: cells[1] / cells[0], range: rangeOf(name) }) };
  });
  return {
    title: fine.panel.title,
    within,
    swept: fine.panel.swept,
    grids: runs.map(({ folder, derived: { ny, nx, dx_m, dt_s, steps, cellsPerBubble } }) => ({
      folder,
      across: ny,
      nx,
      dx_m,
      dt_s,
      steps,
      cellsPerBubble,
    })),
    measures,
    notes: [scatterNote(fine), orderNote(measures), ratioNote(cells), bandNote(coarse, fine)].filter((note) => note !== undefined),
  };
}

/** The index takes every difference between grids for an error of the grid. */
function scatterNote({ panel, derived }: GridRun): string {
  const { supply_m_s, start } = panel.gas;
  const bubbles = supply_m_s === 0 ? start.length : Math.round(derived.bubblesPerSecond * panel.record.span_s);
  return (
    'The index knows only the error of the grid. A bubble flow is chaotic: each grid sees another course of the same panel ' +
    `(about ${bubbles} ${bubbles === 1 ? 'bubble' : 'bubbles'} here), so the values also differ by chance, and that can pass for convergence ` +
    'or hide it. Compare with several values of gas.seed on one grid, or with a longer record.span, before trusting a verdict.'
  );
}

function orderNote(measures: readonly RefinedMeasure[]): string | undefined {
  if (!measures.some(({ convergence }) => (convergence?.order ?? 0) > BELIEVED_ORDER)) return undefined;
  return `An order above ${BELIEVED_ORDER} is more than the method has and comes from chance: verdicts take order ${BELIEVED_ORDER} there.`;
}

function ratioNote([fine, middle, coarse]: Triple): string | undefined {
  const ratio = Math.min(middle / fine, coarse / middle);
  if (ratio > LEAST_RATIO) return undefined;
  return `Two of the grids differ by a factor of ${Number(ratio.toPrecision(3))} only; above ${LEAST_RATIO} is advised (Celik et al. 2008).`;
}

/** The bands at the ends may need more room on coarse cells, and then the measures look at less of the wall. */
function bandNote(coarse: GridRun, fine: GridRun): string | undefined {
  const cell_m = coarse.derived.dx_m;
  const from_m = coarse.derived.release.to_m - fine.derived.release.to_m;
  const to_m = coarse.derived.skim.from_m - fine.derived.skim.from_m;
  if (Math.max(Math.abs(from_m), Math.abs(to_m)) <= cell_m) return undefined;
  const mm = ({ derived: { release, skim } }: GridRun): string =>
    `${Number((1000 * release.to_m).toPrecision(3))} to ${Number((1000 * skim.from_m).toPrecision(3))} mm`;
  return (
    `The height that counts differs between the grids: ${mm(coarse)} on the coarsest, ${mm(fine)} on the finest. A part of the differences ` +
    'comes from that; finer grids, or a higher channel, have less of it.'
  );
}
