/** A thread beside the first: a kernel of its own over the one memory, at work whenever the first calls. Runs in Node and in browsers. */

/** What a thread is given. */
export interface Task {
  code: WebAssembly.Module;
  memory: WebAssembly.Memory;
  number: number;
  bytesPerNumber: 4 | 8;
}

interface Serving {
  serve32(number: number): void;
  serve64(number: number): void;
}

async function serve({ code, memory, number, bytesPerNumber }: Task, ready: () => void): Promise<void> {
  const { exports } = await WebAssembly.instantiate(code, { env: { memory, abort: () => undefined } });
  const kernel = exports as unknown as Serving;
  ready();
  if (bytesPerNumber === 8) kernel.serve64(number);
  else kernel.serve32(number);
}

const inNode = typeof process === 'object' && process.versions?.node !== undefined;
if (inNode) {
  const { parentPort, workerData } = await import('node:worker_threads');
  await serve(workerData as Task, () => parentPort?.postMessage('ready'));
  parentPort?.close();
} else {
  const scope = globalThis as unknown as { onmessage: (event: { data: Task }) => void; postMessage(message: string): void };
  scope.onmessage = ({ data }) => void serve(data, () => scope.postMessage('ready'));
}
