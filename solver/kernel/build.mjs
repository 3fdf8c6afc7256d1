// Compiles the kernel to .build/solver: kernel.wasm over a memory that threads share, kernel-alone.wasm for where there is none such.
import { mkdirSync } from 'node:fs';
import asc from 'assemblyscript/asc';

mkdirSync('.build/solver', { recursive: true });
for (const [name, shared] of [
  ['kernel', ['--sharedMemory']],
  ['kernel-alone', []],
]) {
  const { error, stderr } = await asc.main([
    'solver/kernel/index.ts',
    ...['--outFile', `.build/solver/${name}.wasm`],
    ...['--runtime', 'stub', '-O3', '--noAssert', '--importMemory', '--disableWarning', '201'],
    ...['--enable', 'simd,bulk-memory,threads', '--maximumMemory', '32768', ...shared],
    ...['--memoryBase', '65536', '--initialMemory', '2'],
  ]);
  if (error) {
    process.stderr.write(stderr.toString());
    process.exitCode = 1;
  }
}
