import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { galleryNames, galleryText, galleryTitle } from '../cases/index.ts';
import { OutputError, UsageError } from '../solver/index.ts';
import { suggestion } from './words.ts';

/** Lists the ready-made cases, prints the text of one, or copies one or all of them. */
export function gallery({ name, copy }: { name: string | undefined; copy: string | undefined }): void {
  const names = galleryNames();
  if (name !== undefined && !names.includes(name)) {
    const near = suggestion(name, names);
    throw new UsageError('name', `${name} is no ready-made case${near}${near === '' ? '; ' : ' '}there are ${names.join(', ')}`);
  }
  if (copy !== undefined) copyTexts(name === undefined ? names : [name], copy);
  else if (name !== undefined) process.stdout.write(galleryText(name));
  else process.stdout.write(listing(names));
}

function listing(names: string[]): string {
  const width = Math.max(...names.map((name) => name.length));
  const lines = names.map((name) => `${name.padEnd(width)}  ${galleryTitle(name)}`);
  return `${lines.join('\n')}\n\nswathe run NAME runs one, swathe gallery NAME prints it, swathe gallery NAME --copy DIR makes it yours to change.\n`;
}

/** Looks first and writes after, so that a refusal leaves nothing half done. A file with the same text is left alone. */
function copyTexts(names: string[], folder: string): void {
  const files = names.map((name) => ({ path: join(folder, `${name}.yaml`), text: galleryText(name) }));
  const missing = files.filter(({ path, text }) => {
    if (!existsSync(path)) return true;
    if (read(path) === text) return false;
    throw new OutputError(
      path,
      `${path} is there and differs from the ready-made case; it was kept. Move it away, or copy into another folder`,
    );
  });
  try {
    mkdirSync(folder, { recursive: true });
    for (const { path, text } of missing) writeFileSync(path, text, { flag: 'wx' });
  } catch (error) {
    throw new OutputError(folder, `cannot copy into ${folder}; choose a folder that can be written`, { cause: error });
  }
  for (const { path } of files) process.stdout.write(`${path}\n`);
}

function read(path: string): string {
  try {
    return readFileSync(path, 'utf8');
  } catch (error) {
    throw new OutputError(path, `${path} is in the way and cannot be read; copy into another folder`, { cause: error });
  }
}
