import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { basename, dirname, join, resolve } from 'node:path';
import { type Case, caseText, galleryNames, galleryText, readCase } from '../cases/index.ts';
import { UsageError } from '../solver/index.ts';
import { nearMiss } from './words.ts';

/** A case as the command line names it. */
export interface Source {
  /** the run folder is named after it */
  name: string;
  /** the text as run: changed by the values set on the command line */
  text: string;
  panel: Case;
}

/**
 * The case that `word` names: a ready-made one, or else a file; a name without a folder and an ending means the ready-made one first.
 * @throws UsageError when nothing answers the name, CaseError for what stands in it
 */
export function readSource(word: string, sets: string[]): Source {
  const { name, file, text } = caseSource(word);
  return { name, text: caseText(text, sets), panel: readCase(text, file, sets) };
}

/** The text that `word` names, as {@link readSource} finds it. */
export function caseSource(word: string): { name: string; file: string; text: string } {
  if (galleryNames().includes(word)) return { name: word, file: word, text: galleryText(word) };
  return { name: nameOf(word), file: word, text: readText(word) };
}

/** A `case.yaml` is named after its folder, any other file after itself. */
function nameOf(file: string): string {
  const own = basename(file).replace(/\.ya?ml$/i, '');
  return own === 'case' ? basename(dirname(resolve(file))) || own : own;
}

/** @throws UsageError no file, or no text */
export function readText(file: string): string {
  if (!existsSync(file)) throw new UsageError('case', notFound(file));
  if (statSync(file).isDirectory()) {
    const inside = existsSync(join(file, 'case.yaml'))
      ? `; to go on with the run in it: swathe run ${join(file, 'case.yaml')} --out ${file}`
      : '';
    throw new UsageError('case', `${file} is a folder, not a case file${inside}`);
  }
  let bytes: Buffer;
  try {
    bytes = readFileSync(file);
  } catch (error) {
    throw new UsageError('case', `${file} cannot be read: ${(error as Error).message}`);
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new UsageError('case', `${file} is not UTF-8 text; a case file is plain text (swathe gallery tilted-panel prints one)`);
  }
}

function notFound(word: string): string {
  const folder = dirname(word);
  const beside = existsSync(folder) && statSync(folder).isDirectory() ? readdirSync(folder).filter((file) => /\.ya?ml$/.test(file)) : [];
  const near = nearMiss(basename(word), [...galleryNames(), ...beside]);
  const meant = near === undefined ? '' : `. Did you mean ${beside.includes(near) ? join(folder, near) : near}?`;
  return `${word}: no such file, and no ready-made case has that name (swathe gallery lists them)${meant}`;
}
