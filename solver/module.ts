/** Whether threads can share memory: not so in a page that is not isolated from others, where everything runs on one thread. */
export const sharesMemory = (): boolean => typeof SharedArrayBuffer === 'function';

let module: Promise<WebAssembly.Module> | undefined;

/** The compiled kernel, loaded once: from the build beside this file, or seen from the sources. */
export function kernelModule(): Promise<WebAssembly.Module> {
  module ??= load();
  return module;
}

async function load(): Promise<WebAssembly.Module> {
  const name = sharesMemory() ? 'kernel.wasm' : 'kernel-alone.wasm';
  const url = new URL(import.meta.url.includes('/.build/') ? name : `../.build/solver/${name}`, import.meta.url);
  if (url.protocol !== 'file:') return WebAssembly.compileStreaming(fetch(url));
  const { readFile } = await import('node:fs/promises');
  return WebAssembly.compile(await readFile(url));
}
