import { spawn } from 'node:child_process';
import { join } from 'node:path';

/** A run to be computed in a process of its own. */
export interface Job {
  /** for people: which run this is */
  label: string;
  /** words after `swathe` */
  words: string[];
  /** cell updates it takes, to tell the time left by */
  updates: number;
}

/** How one process ended. */
export interface Ending {
  job: Job;
  exit: number;
  /** what it said */
  said: string;
}

/**
 * Runs `swathe` with the words of each job, `atOnce` of them side by side, in the order given. After an abort nothing is begun any more and
 * those at work are asked to stop, which keeps a checkpoint.
 * @returns how each of those that were begun ended
 */
export async function runChildren(
  jobs: readonly Job[],
  { atOnce, signal, onEnd }: { atOnce: number; signal: AbortSignal; onEnd: (ending: Ending) => void },
): Promise<Ending[]> {
  const waiting = [...jobs];
  const endings: Ending[] = [];
  const work = async (): Promise<void> => {
    for (let job = waiting.shift(); job !== undefined && !signal.aborted; job = waiting.shift()) {
      const ending = await runChild(job, signal);
      endings.push(ending);
      onEnd(ending);
    }
  };
  await Promise.all(Array.from({ length: Math.min(atOnce, jobs.length) }, work));
  return endings;
}

function runChild(job: Job, signal: AbortSignal): Promise<Ending> {
  return new Promise((resolve, reject) => {
    const main = join(import.meta.dirname, 'main.js');
    const child = spawn(process.execPath, [main, ...job.words], { stdio: ['ignore', 'ignore', 'pipe'] });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => {
      said += chunk.toString();
    });
    const stop = (): void => {
      child.kill('SIGINT');
    };
    signal.addEventListener('abort', stop, { once: true });
    child.on('error', reject);
    child.on('close', (exit, killed) => {
      signal.removeEventListener('abort', stop);
      resolve({ job, exit: exit ?? 1, said: killed === null ? said : `${said}ended by ${killed}\n` });
    });
  });
}
