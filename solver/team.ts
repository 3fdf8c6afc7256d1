/** The threads beside the first: started once, asleep between calls, ended with the simulation. */
import { AT_CALLS, AT_QUIT } from './constants.ts';
import * as H from './header.ts';
import type { MemoryMap } from './memory.ts';
import { sharesMemory } from './module.ts';
import type { Task } from './worker.ts';

/** Most threads of a simulation. */
const MOST = 64;

/**
 * Starts `threads - 1` threads and waits until they are ready. Fewer, down to none, where the box has fewer blocks of rows or the
 * platform shares no memory.
 * @returns how many threads there are, the first included
 */
export async function startTeam(map: MemoryMap, code: WebAssembly.Module, threads: number, blocks: number): Promise<number> {
  const all = sharesMemory() ? Math.max(1, Math.min(threads, blocks, MOST)) : 1;
  map.header[H.THREADS] = all;
  const { memory, bytesPerNumber } = map;
  const starts = Array.from({ length: all - 1 }, (_, n) => start({ code, memory, number: n + 1, bytesPerNumber }));
  await Promise.all(starts);
  return all;
}

async function start(task: Task): Promise<void> {
  const built = import.meta.url.includes('/.build/') ? './worker.js' : '../.build/solver/worker.js';
  const url = new URL(built, import.meta.url);
  if (url.protocol !== 'file:') {
    const worker = new Worker(url, { type: 'module' });
    await new Promise<void>((resolve, reject) => {
      worker.onmessage = () => resolve();
      worker.onerror = (event) => reject(new Error(`a thread of the solver did not start: ${event.message}`));
      worker.postMessage(task);
    });
    return;
  }
  const threads = await import('node:worker_threads');
  const worker = new threads.Worker(url, { workerData: task, execArgv: [] });
  await new Promise<void>((resolve, reject) => {
    worker.once('message', resolve);
    worker.once('error', reject);
  });
  // a sleeping thread keeps no process alive
  worker.unref();
}

/** Ends the threads of a memory. */
export function endTeam(memory: WebAssembly.Memory): void {
  const words = new Int32Array(memory.buffer);
  Atomics.store(words, AT_QUIT / 4, 1);
  Atomics.add(words, AT_CALLS / 4, 1);
  Atomics.notify(words, AT_CALLS / 4);
}
