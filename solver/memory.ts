import type { Box } from './box.ts';
import { BLOCK, PIECE_BYTES, PIECE_ROWS } from './constants.ts';
import * as H from './header.ts';
import { listBytes, writeLists } from './lists.ts';
import { sharesMemory } from './module.ts';
import { rheologyTable } from './rheology.ts';
import type { Side } from './setup.ts';
import { tileBytes, writeTiles } from './tiles.ts';
import { wallSpeed } from './walls.ts';

/** First byte the host gives out: the header lies at 0, the kernel's own statics at 65536. */
const FIRST = 131072;
/** room for samples between two hand-overs: hundreds of steps, and little beside the fields of a small box, for every checkpoint holds it */
const SAMPLE_BYTES = 1 << 19;

const FIELDS = [H.AT_PHI, H.AT_UX, H.AT_UY, H.AT_P, H.AT_MASK, H.AT_TAU];
/** in boxes with gas alone */
const ARRIVING = [H.AT_SUM, H.AT_N20, H.AT_N11, H.AT_J10, H.AT_J01];
/** where the liquid thins */
const OF_FACES = [H.AT_ETA_X, H.AT_ETA_Y];
const WITH_GHOSTS = [H.AT_Z, H.AT_MX, H.AT_MY, H.AT_LIGHT, H.AT_OPEN];

/** What the host knows of the kernel's memory beside the header. */
export interface MemoryMap {
  memory: WebAssembly.Memory;
  header: Float64Array;
  bytesPerNumber: 4 | 8;
  /** numbers in a row of a field, ghosts and padding included */
  stride: number;
  /** most samples between two hand-overs */
  sampleCapacity: number;
}

/**
 * The one memory map: sizes the memory for a box (shared, never grown), writes the header and the fixed lists. A row of a field
 * starts 16 bytes before its cell 0, so that cell 0 lies on a group of lanes and the ghost -1 before it:
 *
 *     | 16 bytes, the last number is ghost -1 | cells, padded to whole groups | 16 bytes |
 */
export function layMemory(box: Box): MemoryMap {
  const { nx, ny, setup } = box;
  const bytesPerNumber = setup.precision === 'f64' ? 8 : 4;
  const lanes = 16 / bytesPerNumber;
  const strideBytes = 32 + Math.ceil(nx / lanes) * 16;
  const sampleBytes = 32 + 16 * box.bodies.count + 16 * nx;
  const sampleCapacity = Math.max(1, Math.floor(SAMPLE_BYTES / sampleBytes));
  let end = FIRST;
  const take = (bytes: number): number => {
    const at = end;
    end += Math.ceil(bytes / 16) * 16;
    return at;
  };
  const table = rheologyTable(setup);
  const ring = ny + 3;
  const entries: [number, number][] = [
    [H.AT_POPULATIONS, take(ring * 18 * strideBytes) + 16],
    [H.AT_PRESSURE, take((ny + 4) * strideBytes) + 16 + 2 * strideBytes],
    ...[...WITH_GHOSTS, ...(table.length > 0 ? OF_FACES : [])].map((at): [number, number] => [
      at,
      take((ny + 2) * strideBytes) + 16 + strideBytes,
    ]),
    ...[...FIELDS, ...(box.twoPhase ? ARRIVING : [])].map((at): [number, number] => [at, take(ny * strideBytes) + 16]),
    [H.AT_SKIM, take(strideBytes)],
    [H.AT_WEIGHTS, take(4 * strideBytes)],
    [H.AT_SECTIONS, take(3 * strideBytes)],
    [H.AT_ROWS, take(32 * ny)],
    [H.AT_BLOCKS, take(2 * Math.ceil(ny / BLOCK) * strideBytes)],
    [H.AT_SCRATCH, box.twoPhase ? take(PIECE_ROWS * PIECE_BYTES * Math.ceil(ny / BLOCK)) : 0],
    ...[...listBytes(box), ...(box.twoPhase ? tileBytes(box) : [])].map(([at, bytes]): [number, number] => [at, take(bytes)]),
    [H.AT_OMEGA, table.length > 0 && !box.twoPhase ? take(ny * strideBytes) + 16 : 0],
    [H.AT_TABLE, take(8 * table.length)],
    [H.AT_SAMPLES, take(sampleCapacity * sampleBytes)],
  ];
  const pages = Math.ceil(end / 65536);
  if (pages > 32768) throw new RangeError(`setup: ${nx} x ${ny} cells need ${Math.round(end / 2 ** 20)} MiB; the limit is 2048 MiB`);
  const memory = new WebAssembly.Memory({ initial: pages, maximum: pages, shared: sharesMemory() });
  const header = new Float64Array(memory.buffer, 0, H.HEADER_BYTES / 8);
  for (const [at, value] of entries) header[at] = value;
  header[H.NX] = nx;
  header[H.NY] = ny;
  header[H.STRIDE] = strideBytes;
  header[H.RING] = ring;
  header[H.THREADS] = 1;
  const map: MemoryMap = { memory, header, bytesPerNumber, stride: strideBytes / bytesPerNumber, sampleCapacity };
  header[H.THINS] = table.length > 0 ? 1 : 0;
  new Float64Array(memory.buffer, header[H.AT_TABLE], table.length).set(table);
  writeNumbers(box, header);
  writeRows(box, map);
  if (table.length > 0 && !box.twoPhase) numbers(map, header[H.AT_OMEGA] - 16, ny * map.stride).fill(box.omegaLiquid);
  writeLists(box, header, bytesPerNumber);
  if (box.twoPhase) writeTiles(box, header);
  return map;
}

const sideCode = (side: Side): number => (side === 'periodic' ? 0 : side === 'slip' ? 2 : 1);

function writeNumbers(box: Box, header: Float64Array): void {
  const { sides } = box.setup;
  const entries = [
    [sides.left, H.SIDE_LEFT, H.SPEED_LEFT],
    [sides.right, H.SIDE_RIGHT, H.SPEED_RIGHT],
    [sides.bottom, H.SIDE_BOTTOM, H.SPEED_BOTTOM],
    [sides.top, H.SIDE_TOP, H.SPEED_TOP],
  ] as const;
  for (const [side, kind, speed] of entries) {
    header[kind] = sideCode(side);
    header[speed] = wallSpeed(side);
  }
  header[H.TWO_PHASE] = box.twoPhase ? 1 : 0;
  header[H.RHO_LIQUID] = box.rhoLiquid;
  header[H.RHO_GAS] = box.rhoGas;
  header[H.FLUIDITY_LIQUID] = box.fluidityLiquid;
  header[H.FLUIDITY_GAS] = box.fluidityGas;
  header[H.BEND] = box.profile.bend;
  header[H.KAPPA] = box.kappa;
  header[H.WIDTH] = box.W;
  header[H.OMEGA_PHI] = box.omegaPhi;
  header[H.WETTING] = box.wetting;
  header[H.FORCE_X] = box.forceX;
  header[H.FORCE_Y] = box.forceY;
  header[H.GRAVITY_X] = box.gravityX;
  header[H.GRAVITY_Y] = box.gravityY;
  header[H.SPEED_LIMIT] = box.speedLimit;
  header[H.GAS_LIMIT] = box.gasLimit;
  header[H.NU0] = box.nu0;
  header[H.SOUND_DAMPING] = box.soundDamping;
  header[H.DRIVE_KIND] = box.drive === undefined ? 0 : box.drive.kind === 'loss' ? 1 : 2;
  header[H.DRIVE_VALUE] = box.drive === undefined ? 0 : box.drive.kind === 'loss' ? box.drive.coefficient : box.drive.target;
}

function writeRows({ nx, ny, geometry, skim, twoPhase, walls }: Box, map: MemoryMap): void {
  const { header, bytesPerNumber } = map;
  const rows = [...geometry.wallWeights.left, ...geometry.wallWeights.right];
  rows.forEach((row, n) => {
    numbers(map, header[H.AT_WEIGHTS] + n * header[H.STRIDE], nx).set(row);
  });
  numbers(map, header[H.AT_SKIM], nx).set(skim);
  for (let y = 0; y < ny; y++) {
    numbers(map, header[H.AT_MASK] + y * header[H.STRIDE], nx).set(geometry.fluid.subarray(y * nx, (y + 1) * nx));
  }
  if (!twoPhase) return;
  for (let y = -1; y <= ny; y++) {
    const row = walls.open.subarray((y + 1) * (nx + 2), (y + 2) * (nx + 2));
    numbers(map, header[H.AT_OPEN] + y * header[H.STRIDE] - bytesPerNumber, nx + 2).set(row);
  }
}

/** A view of `length` numbers of the run's precision at a byte address. */
export function numbers(map: MemoryMap, at: number, length: number): Float32Array | Float64Array {
  const buffer = map.memory.buffer;
  return map.bytesPerNumber === 8 ? new Float64Array(buffer, at, length) : new Float32Array(buffer, at, length);
}
