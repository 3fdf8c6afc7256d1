import { hostname } from 'node:os';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { check, lock } from 'proper-lockfile';
import { OutputError } from '../../solver/index.ts';
import { codeOf, outputError } from './files.ts';

export const LOCK_NAME = 'run.lock';
/**
 * A lock that its holder has not renewed for so long is free. Short where the holder is known to be gone; long where it may only stand
 * still, busy with one long computation; between the two where nobody has signed yet.
 */
const STALE_MS = { gone: 2000, unknown: 5000, mayLive: 30_000 };
/** Renewed so often. */
const RENEW_MS = 1000;
/** Between looks at the lock of a process that is gone. */
const LOOK_MS = 200;

/** A held run folder. */
export interface Hold {
  /** set when another process has taken the folder, which it can only where this one stood still for long */
  lost: boolean;
  release(): Promise<void>;
}

/**
 * Takes a folder for this process. The lock of a process that was killed is waited for (it runs out within two seconds); that of a
 * living one is refused at once.
 * @param last who wrote there last, as run.json says
 * @throws OutputError held by another process
 */
export async function takeFolder(folder: string, last: { pid: number; host: string } | undefined): Promise<Hold> {
  const hold: Hold = { lost: false, release: async () => {} };
  const holder = last === undefined ? 'unknown' : mayLive(last) ? 'mayLive' : 'gone';
  const stale = STALE_MS[holder];
  const patience = Date.now() + stale + 5 * LOOK_MS;
  for (;;) {
    try {
      const release = await lock(folder, {
        lockfilePath: join(folder, LOCK_NAME),
        stale,
        update: RENEW_MS,
        onCompromised: () => {
          hold.lost = true;
        },
      });
      hold.release = async () => {
        if (!hold.lost) await release();
      };
      return hold;
    } catch (error) {
      if (codeOf(error) !== 'ELOCKED') throw outputError(folder, 'locking the folder', error);
      if (holder === 'mayLive' || Date.now() > patience) throw heldError(folder, last, error);
      await pause(LOOK_MS);
    }
  }
}

/** Whether a living process, as far as can be told, writes there. @param last as of {@link takeFolder} */
export async function isHeld(folder: string, last: { pid: number; host: string } | undefined): Promise<boolean> {
  if (last === undefined || !mayLive(last)) return false;
  try {
    return await check(folder, { lockfilePath: join(folder, LOCK_NAME), stale: STALE_MS.mayLive });
  } catch (error) {
    throw outputError(folder, 'looking at the lock of the folder', error);
  }
}

function heldError(folder: string, last: { pid: number; host: string } | undefined, cause: unknown): OutputError {
  const who = last === undefined ? 'another process' : `another process (${last.pid} on ${last.host})`;
  return new OutputError(folder, `${folder}: ${who} is writing there; wait for it to end, or choose another folder.`, { cause });
}

/** False only where it is certain that the process is gone. */
function mayLive({ pid, host }: { pid: number; host: string }): boolean {
  if (host !== hostname()) return true;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return codeOf(error) !== 'ESRCH';
  }
}
