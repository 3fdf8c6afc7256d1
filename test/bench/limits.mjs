// What this machine can do at most, measured beside the kernel: memory, and SIMD arithmetic.
import asc from 'assemblyscript/asc';
import { median, spread, timed } from './timing.mjs';

const REPEATS = 5;

/** Memory read and written together by copying 256 MiB, which no cache holds; GB/s. */
export function copyBandwidth() {
  const bytes = 2 ** 28;
  const [from, to] = [new Uint8Array(bytes).fill(1), new Uint8Array(bytes)];
  to.set(from);
  const runs = Array.from({ length: REPEATS }, () => (2 * bytes) / timed(() => to.set(from)).cpu_s / 1e9);
  return { GB_s: median(runs), spread: spread(runs) };
}

const CHAINS = 8;
const LOOP = `export function loop(turns: i32): f32 {
  const a = f32x4.splat(0.999);
  const b = f32x4.splat(0.001);
${Array.from({ length: CHAINS }, (_, n) => `  let v${n} = f32x4.splat(${n + 1});`).join('\n')}
  do {
${Array.from({ length: CHAINS }, (_, n) => `    v${n} = f32x4.add(f32x4.mul(v${n}, a), b);`).join('\n')}
  } while (--turns);
  return f32x4.extract_lane(${Array.from({ length: CHAINS }, (_, n) => `v${n}`).reduce((sum, v) => `f32x4.add(${sum}, ${v})`)}, 0);
}`;

/** Multiplications and additions a second in a loop of eight independent chains of four lanes, 1e9. */
export async function arithmetic() {
  const { binary, error } = await asc.compileString(LOOP, { optimizeLevel: 3, runtime: 'stub', enable: ['simd'] });
  if (error) throw error;
  const { instance } = await WebAssembly.instantiate(binary, {});
  const turns = 2e7;
  instance.exports.loop(turns);
  const runs = Array.from({ length: REPEATS }, () => (turns * CHAINS * 8) / timed(() => instance.exports.loop(turns)).cpu_s / 1e9);
  return { Gop_s: median(runs), spread: spread(runs) };
}
