import { createHash } from 'node:crypto';
import { join } from 'node:path';
import type { Checkpoint } from '../../cases/index.ts';
import { OutputError } from '../../solver/index.ts';
import { readWhole, remove, writeWhole } from './files.ts';

/**
 * A checkpoint file:
 *
 *     8 bytes   SWCHECK1
 *     4 bytes   length of the header, little-endian
 *     header    JSON: what it belongs to, step, the rest of the state, and name, type and length of each part
 *     parts     the solver's image, then the typed arrays, as they lie in memory (little-endian on all machines Node.js runs on)
 *     32 bytes  SHA-256 of all before
 *
 * Two files take turns: the older one is overwritten, so that a good one is left whatever happens to the new.
 */
const MAGIC = 'SWCHECK1';
const DIGEST_BYTES = 32;
export const CHECKPOINT_FILES = ['checkpoint-a.bin', 'checkpoint-b.bin'] as const;
type CheckpointFile = (typeof CHECKPOINT_FILES)[number];

/** What a checkpoint belongs to: it fits no other case and no other version. */
export interface Origin {
  /** SHA-256 of the case text */
  case_sha256: string;
  /** version of swathe */
  version: string;
}

type PartArray = Checkpoint['arrays'][string];
type PartType = 'Float32Array' | 'Float64Array' | 'Uint8Array';

interface Header {
  origin: Origin;
  step: number;
  json: string;
  parts: { name: string; type: PartType; length: number }[];
}

const MAKERS: Record<PartType, (bytes: ArrayBuffer) => PartArray> = {
  Float32Array: (bytes) => new Float32Array(bytes),
  Float64Array: (bytes) => new Float64Array(bytes),
  Uint8Array: (bytes) => new Uint8Array(bytes),
};

/** Name of the part that is the solver's image; the others are names of arrays behind a colon. */
const SOLVER = 'solver';

/** The pieces of a checkpoint file; the parts are not copied. */
function encodeCheckpoint(checkpoint: Checkpoint, origin: Origin): Buffer[] {
  const parts: [string, PartArray][] = [[SOLVER, checkpoint.solver]];
  for (const [name, array] of Object.entries(checkpoint.arrays)) parts.push([`:${name}`, array]);
  const header: Header = {
    origin,
    step: checkpoint.step,
    json: checkpoint.json,
    parts: parts.map(([name, array]) => ({ name, type: typeOf(array), length: array.length })),
  };
  const headerBytes = Buffer.from(JSON.stringify(header), 'utf8');
  const start = Buffer.alloc(MAGIC.length + 4);
  start.write(MAGIC, 'latin1');
  start.writeUInt32LE(headerBytes.length, MAGIC.length);
  const body = [start, headerBytes, ...parts.map(([, array]) => Buffer.from(array.buffer, array.byteOffset, array.byteLength))];
  const digest = createHash('sha256');
  for (const piece of body) digest.update(piece);
  return [...body, digest.digest()];
}

function typeOf(array: PartArray): PartType {
  return array instanceof Float32Array ? 'Float32Array' : array instanceof Float64Array ? 'Float64Array' : 'Uint8Array';
}

/** The checkpoint in a file's bytes, or undefined where they are not a whole, unharmed one. */
function decodeCheckpoint(bytes: Buffer): { checkpoint: Checkpoint; origin: Origin } | undefined {
  const body = bytes.subarray(0, Math.max(0, bytes.length - DIGEST_BYTES));
  if (body.length < MAGIC.length + 4 || body.toString('latin1', 0, MAGIC.length) !== MAGIC) return undefined;
  if (!createHash('sha256').update(body).digest().equals(bytes.subarray(body.length))) return undefined;
  // from here on the bytes are what encodeCheckpoint wrote
  let at = MAGIC.length + 4;
  const headerEnd = at + body.readUInt32LE(MAGIC.length);
  const header = JSON.parse(body.toString('utf8', at, headerEnd)) as Header;
  at = headerEnd;
  let solver = new Uint8Array(0);
  const arrays: Checkpoint['arrays'] = {};
  for (const part of header.parts) {
    const length = part.length * { Float32Array: 4, Float64Array: 8, Uint8Array: 1 }[part.type];
    // a copy of its own, for a typed array must start on a multiple of its element
    const own = new Uint8Array(body.subarray(at, at + length));
    at += length;
    if (part.name === SOLVER) solver = own;
    else arrays[part.name.slice(1)] = MAKERS[part.type](own.buffer);
  }
  return { checkpoint: { step: header.step, solver, json: header.json, arrays }, origin: header.origin };
}

/** What was found when looking for a checkpoint. */
export interface FoundCheckpoint {
  /** the newest whole one; undefined: start over */
  checkpoint: Checkpoint | undefined;
  /** what to tell the user: broken files, and what is done about them */
  notes: string[];
}

/** The two checkpoint files of a run folder. */
export class CheckpointPair {
  private readonly folder: string;
  /** the file with the newest whole checkpoint; the other is the one to overwrite */
  private newest: CheckpointFile | undefined;

  constructor(folder: string) {
    this.folder = folder;
  }

  /** @throws OutputError no space, no permission; the other file is untouched then */
  async write(checkpoint: Checkpoint, origin: Origin): Promise<void> {
    const [first, second] = CHECKPOINT_FILES;
    const target = this.newest === first ? second : first;
    await writeWhole(join(this.folder, target), encodeCheckpoint(checkpoint, origin));
    this.newest = target;
  }

  /**
   * The newest whole checkpoint. A broken file is passed over, with a note.
   * @throws OutputError when a whole one was made for another case or by another version
   */
  async read(origin: Origin): Promise<FoundCheckpoint> {
    let newest: { file: CheckpointFile; checkpoint: Checkpoint } | undefined;
    const broken: string[] = [];
    for (const file of CHECKPOINT_FILES) {
      const path = join(this.folder, file);
      const bytes = await readWhole(path);
      if (bytes === undefined) continue;
      const found = decodeCheckpoint(bytes);
      if (found === undefined) {
        broken.push(file);
        continue;
      }
      refuseForeign(path, found.origin, origin);
      if (newest === undefined || found.checkpoint.step > newest.checkpoint.step) newest = { file, checkpoint: found.checkpoint };
    }
    this.newest = newest?.file;
    const instead = newest === undefined ? 'the run starts over' : `going on from the previous one, step ${newest.checkpoint.step}`;
    return { checkpoint: newest?.checkpoint, notes: broken.map((file) => `${file} is broken (its checksum does not fit); ${instead}.`) };
  }

  async remove(): Promise<void> {
    await remove(this.folder, CHECKPOINT_FILES);
    this.newest = undefined;
  }
}

function refuseForeign(path: string, found: Origin, wanted: Origin): void {
  if (found.case_sha256 !== wanted.case_sha256) {
    throw new OutputError(path, `${path}: the checkpoint was made for another case; choose another folder, or start this one over.`);
  }
  if (found.version !== wanted.version) {
    throw new OutputError(
      path,
      `${path}: the checkpoint was made by swathe ${found.version}, this is ${wanted.version}, and going on would mix the two; ` +
        'start the run over, or finish it with the version that began it.',
    );
  }
}
