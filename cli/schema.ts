import { existsSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { caseSchema } from '../cases/index.ts';
import { OutputError } from '../solver/index.ts';

/** Prints the JSON Schema of case files, or writes it to a new file. */
export function schema({ out }: { out: string | undefined }): void {
  const text = `${JSON.stringify(caseSchema(), null, 2)}\n`;
  if (out === undefined) {
    process.stdout.write(text);
    return;
  }
  if (existsSync(out)) throw new OutputError(out, `${out} is there; it was kept. Remove it, or choose another name`);
  try {
    writeFileSync(out, text, { flag: 'wx' });
  } catch (error) {
    throw new OutputError(out, `cannot write ${out}; is ${dirname(out)} a folder that can be written?`, { cause: error });
  }
  process.stdout.write(
    `${out}\nEditors that know JSON Schema use it when a case file starts with the line\n# yaml-language-server: $schema=${out}\n`,
  );
}
