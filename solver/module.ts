let module: Promise<WebAssembly.Module> | undefined;

/** The compiled kernel, loaded once: from the build beside this file, or seen from the sources. */
export function kernelModule(): Promise<WebAssembly.Module> {
  module ??= load();
  return module;
}

async function load(): Promise<WebAssembly.Module> {
  const built = import.meta.url.includes('/.build/') ? './kernel.wasm' : '../.build/solver/kernel.wasm';
  const url = new URL(built, import.meta.url);
  if (url.protocol !== 'file:') return WebAssembly.compileStreaming(fetch(url));
  const { readFile } = await import('node:fs/promises');
  return WebAssembly.compile(await readFile(url));
}
