import { mkdir, readdir, readFile, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import writeFileAtomic from 'write-file-atomic';
import { OutputError } from '../../solver/index.ts';

/** What to do about a failed file operation, by the system's code. */
const REMEDIES: Record<string, string> = {
  ENOSPC: 'no space is left on the disk; free some, then go on from the last checkpoint',
  EDQUOT: 'the disk quota is used up; free some, then go on from the last checkpoint',
  EFBIG: 'the file is larger than the system allows; raise the limit, then go on from the last checkpoint',
  EROFS: 'the disk is read-only; choose a folder on another one',
  EACCES: 'permission is missing; choose a folder you may write to',
  EPERM: 'permission is missing; choose a folder you may write to',
  ENOTDIR: 'a part of the path is a file, not a folder; choose another path',
  EEXIST: 'a file with the name of the folder is in the way; choose another path',
  ENOENT: 'a part of the path is missing or may not be made; choose another path',
  ENAMETOOLONG: 'the name is too long; choose a shorter one',
  EMFILE: 'too many files are open; close some programs',
};

/** An {@link OutputError} from what the system said. */
export function outputError(path: string, doing: string, cause: unknown): OutputError {
  if (cause instanceof OutputError) return cause;
  const code = codeOf(cause) ?? '';
  const remedy = REMEDIES[code] ?? (cause instanceof Error ? cause.message : String(cause));
  return new OutputError(path, `${path}: ${doing} failed${code === '' ? '' : ` (${code})`}: ${remedy}.`, { cause });
}

export function codeOf(error: unknown): string | undefined {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : undefined;
}

/**
 * Writes a file so that a reader sees the old one or the new one, never half of one; on the disk when it returns.
 * The bytes go into the temporary file here, for the library writes once and does not look: a disk that fills up cuts the end off
 * without an error, and the short file would take the place of the whole one (seen with 7.0.1).
 * @param content pieces are written one after the other
 * @throws OutputError; the old file is still there
 */
export async function writeWhole(path: string, content: string | Buffer | readonly Buffer[]): Promise<void> {
  try {
    await writeFileAtomic(path, '', { tmpfileCreated: (temporary) => writeFile(temporary, content) });
  } catch (error) {
    throw outputError(path, 'writing', error);
  }
}

/** The content of a file, undefined where there is none. */
export async function readWhole(path: string): Promise<Buffer | undefined> {
  try {
    return await readFile(path);
  } catch (error) {
    if (codeOf(error) === 'ENOENT') return undefined;
    throw outputError(path, 'reading', error);
  }
}

/** Makes a folder and those above it. Step by step: Node's own `recursive` never returns where the system lets nothing be made (/proc). */
export async function makeFolder(path: string): Promise<void> {
  try {
    await mkdir(path);
  } catch (error) {
    if (codeOf(error) === 'ENOENT' && dirname(path) !== path && !(await isFolder(dirname(path)))) {
      await makeFolder(dirname(path));
      await makeFolder(path);
    } else if (!(await isFolder(path))) {
      throw outputError(path, 'making the folder', error);
    }
  }
}

async function isFolder(path: string): Promise<boolean> {
  try {
    return (await stat(path)).isDirectory();
  } catch {
    return false;
  }
}

/** Removes files or folders; what is not there is no error. */
export async function remove(folder: string, names: readonly string[]): Promise<void> {
  for (const name of names) {
    try {
      await rm(join(folder, name), { recursive: true, force: true });
    } catch (error) {
      throw outputError(join(folder, name), 'removing', error);
    }
  }
}

/** Names in a folder, sorted; undefined where there is no such folder. */
export async function list(folder: string): Promise<string[] | undefined> {
  try {
    return (await readdir(folder)).sort();
  } catch (error) {
    if (codeOf(error) === 'ENOENT') return undefined;
    throw outputError(folder, 'reading the folder', error);
  }
}

/** Size of a file; undefined where there is none. */
export async function sizeOf(path: string): Promise<number | undefined> {
  try {
    return (await stat(path)).size;
  } catch {
    return undefined;
  }
}
