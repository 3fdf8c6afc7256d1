// Compiles the kernel to .build/solver/kernel.wasm.
import { mkdirSync } from 'node:fs';
import asc from 'assemblyscript/asc';

mkdirSync('.build/solver', { recursive: true });
const { error, stderr } = await asc.main([
  'solver/kernel/index.ts',
  ...['--outFile', '.build/solver/kernel.wasm'],
  ...['--runtime', 'stub', '-O3', '--noAssert', '--importMemory', '--disableWarning', '201'],
  ...['--enable', 'simd,bulk-memory'],
  ...['--sharedMemory', '--maximumMemory', '32768', '--enable', 'threads'],
  ...['--memoryBase', '65536', '--initialMemory', '2'],
]);
if (error) {
  process.stderr.write(stderr.toString());
  process.exitCode = 1;
}
