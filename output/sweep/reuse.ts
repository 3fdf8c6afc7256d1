import { dirname, join, resolve } from 'node:path';
import { csvParse } from 'd3-dsv';
import { list, readWhole } from '../folder/files.ts';
import { readRecord } from '../folder/record.ts';
import { nameOf } from './folder.ts';

/** Finished runs by the SHA-256 of their case. */
export type Finished = ReadonlyMap<string, string>;

/**
 * Finished runs of this version in the folders beside a sweep: those of other sweeps, by their tables, and single runs. What cannot be read
 * is passed over: it only costs a run.
 */
export async function finishedBeside(path: string, version: string): Promise<Finished> {
  const own = resolve(path);
  const found = new Map<string, string>();
  for (const name of (await list(dirname(own))) ?? []) {
    const folder = join(dirname(own), name);
    if (folder === own) continue;
    for (const [hash, run] of [...(await tabled(folder, version)), ...(await single(folder, version))]) found.set(hash, run);
  }
  return found;
}

async function tabled(folder: string, version: string): Promise<[string, string][]> {
  const bytes = await quietly(readWhole(join(folder, 'results.csv')));
  if (bytes === undefined) return [];
  return csvParse(bytes.toString('utf8'))
    .filter((row) => row.status === 'done' && row.version === version && row.case_sha256 !== undefined)
    .map((row) => [row.case_sha256 as string, join(folder, 'points', nameOf(Number(row.point)))]);
}

async function single(folder: string, version: string): Promise<[string, string][]> {
  const record = await quietly(readRecord(folder));
  return record?.status === 'done' && record.versions.swathe === version ? [[record.case_sha256, folder]] : [];
}

/** Whether the run is there still, whole and finished: a table may be older than what became of its folders. */
export async function isFinished(run: string, hash: string, version: string): Promise<boolean> {
  const record = await quietly(readRecord(run));
  if (record?.status !== 'done' || record.versions.swathe !== version || record.case_sha256 !== hash) return false;
  return (await quietly(readWhole(join(run, 'summary.json')))) !== undefined;
}

async function quietly<T>(reading: Promise<T>): Promise<T | undefined> {
  try {
    return await reading;
  } catch {
    return undefined;
  }
}
