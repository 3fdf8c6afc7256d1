/**
 * The ready-made cases. Their texts are files beside this one in the source tree, read where they lie: the one place in this
 * room that opens files. Compiled code stands two folders away from them.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { parseDocument } from 'yaml';
import { UsageError } from '../solver/index.ts';

function shelf(): URL {
  const beside = new URL('./gallery/', import.meta.url);
  return existsSync(beside) ? beside : new URL('../../cases/gallery/', import.meta.url);
}

/** Names of all ready-made cases, in alphabetical order. */
export function galleryNames(): string[] {
  return readdirSync(shelf())
    .filter((file) => file.endsWith('.yaml'))
    .map((file) => file.slice(0, -'.yaml'.length))
    .sort();
}

/**
 * The text of a ready-made case.
 * @throws UsageError for a name that is not in the gallery
 */
export function galleryText(name: string): string {
  const names = galleryNames();
  if (!names.includes(name)) throw new UsageError('case', `There is no ready-made case "${name}"; there are ${names.join(', ')}`);
  return readFileSync(new URL(`${name}.yaml`, shelf()), 'utf8');
}

/** The title of a ready-made case, without reading the rest of it. */
export function galleryTitle(name: string): string {
  return String(parseDocument(galleryText(name)).get('title'));
}
