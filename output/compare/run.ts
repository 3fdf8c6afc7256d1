import { basename, join } from 'node:path';
import { csvParse } from 'd3-dsv';
import { type Case, readCase } from '../../cases/index.ts';
import { OutputError } from '../../solver/index.ts';
import { readSummary } from '../folder/answers.ts';
import { readWhole } from '../folder/files.ts';
import { RunFolder } from '../folder/folder.ts';
import { sha256 } from '../folder/record.ts';
import type { Answer } from '../measures/answers.ts';

/** A finished run, as its folder tells it. */
export interface FinishedRun {
  folder: string;
  panel: Case;
  version: string;
  answers: ReadonlyMap<string, Answer>;
  /** time recorded after settling */
  recorded_s: number;
  /** wall-clock time it took to compute */
  taken_s: number;
  /** share of all membrane walls swept within the case's time, against the threshold */
  curve: readonly { threshold_Pa: number; swept: number }[];
}

/** The folder holds the finished run of this very text. */
export async function holdsFinished(folder: string, caseText: string): Promise<boolean> {
  if ((await readWhole(join(folder, 'run.json'))) === undefined) return false;
  const record = await RunFolder.look(folder);
  return record.status === 'done' && record.case_sha256 === sha256(caseText);
}

/**
 * The case text a run folder was begun with.
 * @throws OutputError no run in it
 */
export async function runCase(folder: string): Promise<string> {
  await RunFolder.look(folder);
  const path = join(folder, 'case.yaml');
  const bytes = await readWhole(path);
  if (bytes === undefined)
    throw new OutputError(path, `${path}: there is no such file, the run cannot be told from others; run its case anew.`);
  return bytes.toString('utf8');
}

/** @throws OutputError not a run, not finished, or its files are not as this version writes them */
export async function readRun(folder: string): Promise<FinishedRun> {
  const record = await RunFolder.look(folder);
  const text = await runCase(folder);
  if (record.status !== 'done') {
    const goOn = `swathe run ${join(folder, 'case.yaml')} --out ${folder}`;
    throw new OutputError(folder, `${folder}: the run in it is not done (${record.status}). To go on with it: ${goOn}`);
  }
  const panel = readCase(text, join(folder, 'case.yaml'));
  return {
    folder,
    panel,
    version: record.versions.swathe,
    ...(await readSummary(folder)),
    taken_s: record.timeTaken_s,
    curve: await readCurve(folder, panel.swept.within_s),
  };
}

async function readCurve(folder: string, within_s: number): Promise<FinishedRun['curve']> {
  const path = join(folder, 'swept.csv');
  const bytes = await readWhole(path);
  if (bytes === undefined) throw new OutputError(path, `${path}: there is no such file; run the case in this folder anew (--again).`);
  const rows = csvParse(bytes.toString('utf8')).filter(({ kind, wall }) => kind === 'threshold' && wall === 'together');
  // the same thresholds stand there a second time for the whole recording; where that is the asked time both are the same
  const seen = new Set<string>();
  return rows.flatMap(({ threshold_Pa, window_s, swept }) => {
    if (Math.abs(Number(window_s) - within_s) > 1e-3 * within_s || swept === '' || seen.has(threshold_Pa)) return [];
    seen.add(threshold_Pa);
    return [{ threshold_Pa: Number(threshold_Pa), swept: Number(swept) }];
  });
}

/** Runs of one geometry: their cases agree in all but the seed. */
export interface Group {
  name: string;
  runs: FinishedRun[];
}

/**
 * Runs put together by what was computed.
 * @param named a run and the name it would give its group; the first name of a group stands
 * @throws OutputError the same run twice
 */
export function grouped(named: readonly { name: string; run: FinishedRun }[]): Group[] {
  const groups = new Map<string, Group>();
  for (const { name, run } of named) {
    const key = geometryKey(run.panel);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { name: free(name, groups), runs: [run] });
    else {
      const twin = group.runs.find(({ panel }) => panel.gas.seed === run.panel.gas.seed);
      if (twin !== undefined) {
        const why = `hold the same run (${run.panel.title}, seed ${run.panel.gas.seed}), which counts once`;
        throw new OutputError(run.folder, `${twin.folder} and ${run.folder} ${why}. Leave one of them out.`);
      }
      group.runs.push(run);
    }
  }
  return [...groups.values()];
}

/**
 * Runs of one geometry, each for itself: what differs between them is chance, so a surely different pair tells of recordings too short.
 * @throws OutputError the same run twice
 */
export function each(named: readonly { name: string; run: FinishedRun }[]): Group[] {
  const [{ runs }] = grouped(named);
  return runs.map((run) => ({ name: `${named[0].name}, seed ${run.panel.gas.seed}`, runs: [run] }));
}

/** The case without its seed. */
export function geometryKey(panel: Case): string {
  return JSON.stringify({ ...panel, gas: { ...panel.gas, seed: 0 } });
}

function free(name: string, groups: ReadonlyMap<string, Group>): string {
  const taken = new Set([...groups.values()].map((group) => group.name));
  let found = name;
  for (let i = 2; taken.has(found); i++) found = `${name} (${i})`;
  return found;
}

/** The name of a run folder without its seed: runs/tilted-panel-seed-2 belongs to tilted-panel. */
export function groupName(folder: string): string {
  return basename(folder).replace(/[-_.]?s(eed)?[-_.]?\d+$/i, '') || basename(folder);
}
