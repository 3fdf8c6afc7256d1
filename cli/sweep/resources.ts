import { readFile, statfs } from 'node:fs/promises';
import { totalmem } from 'node:os';
import { UsageError } from '../../solver/index.ts';

const UNITS: Record<string, number> = { kB: 1e3, MB: 1e6, GB: 1e9 };

/** Bytes from "500 MB". */
export function bytesOf(option: string, text: string): number {
  const parts = /^(\d+(?:\.\d+)?) ?(kB|MB|GB)$/.exec(text.trim());
  const bytes = parts === null ? 0 : Number(parts[1]) * UNITS[parts[2]];
  if (bytes > 0) return bytes;
  throw new UsageError(option, `--${option} ${text}: not a size above zero with its unit, as in --${option} "500 MB"`);
}

const TIMES: Record<string, number> = { s: 1, min: 60, h: 3600, d: 86_400 };

/** Seconds from "90 min". */
export function secondsOf(option: string, text: string): number {
  const parts = /^(\d+(?:\.\d+)?) ?(s|min|h|d)$/.exec(text.trim());
  const seconds = parts === null ? 0 : Number(parts[1]) * TIMES[parts[2]];
  if (seconds > 0) return seconds;
  throw new UsageError(option, `--${option} ${text}: not a time above zero in s, min, h or d, as in --${option} "90 min"`);
}

/** Share of the machine's memory that the cases may have together where no limit is given. */
const MEMORY_SHARE = 0.8;

export function memoryPerCase(cases: number): number {
  return (MEMORY_SHARE * totalmem()) / cases;
}

/** Memory that a process holds, bytes; undefined where it is gone. */
export async function memoryOf(pid: number): Promise<number | undefined> {
  try {
    const text =
      process.platform === 'linux'
        ? await readFile(`/proc/${pid}/status`, 'utf8')
        : (await (await import('execa')).execa('ps', ['-o', 'rss=', '-p', String(pid)])).stdout;
    const kilobytes = /VmRSS:\s+(\d+) kB|^\s*(\d+)\s*$/m.exec(text);
    return kilobytes === null ? undefined : 1024 * Number(kilobytes[1] ?? kilobytes[2]);
  } catch {
    return undefined;
  }
}

/** Free space for what is written into a folder, bytes. */
export async function freeSpace(folder: string): Promise<number> {
  const { bavail, bsize } = await statfs(folder);
  return bavail * bsize;
}
