/**
 * The one table of everything a case file may say: keys, units, ranges, defaults and what they mean.
 * The reader, the messages and the editors' JSON Schema are all made from it. Limits are those of what the method can carry,
 * not of what is sensible to build.
 */
import * as z from 'zod';
import { depositKeys, particleKeys } from './afterkeys.ts';
import { airKeys } from './airkeys.ts';
import { finKeys } from './finkeys.ts';
import { gasKeys } from './gaskeys.ts';
import { choice, leftOut, line, plainNumber, quantity } from './leaves.ts';
import { type Memory, remembered } from './memory.ts';
import { recordKeys } from './recordkeys.ts';

const membranes = z
  .array(choice(['left', 'right'], 'a wall that carries a membrane'))
  .prefault(['left', 'right'])
  .meta({ description: 'walls that carry a membrane: left, right or both', minItems: 1, maxItems: 2, uniqueItems: true });

const channel = z.strictObject({
  gap: quantity('length', { unit: 'mm', least: 1, most: 100, says: 'free distance between the two walls' }),
  height: quantity('length', { unit: 'mm', least: 10, most: 3000, says: 'length of the computed section along the channel' }),
  tilt: quantity('angle', {
    unit: 'deg',
    least: -60,
    most: 60,
    default: '0 deg',
    says: 'lean from the vertical; positive: the right wall faces down and gas rides along it',
  }),
  wetting: quantity('angle', {
    unit: 'deg',
    least: 20,
    most: 160,
    default: '60 deg',
    says: 'contact angle on walls and fins, in the liquid',
  }),
  membranes,
  return: z
    .strictObject({
      loss: plainNumber({ least: 0, most: 1000, says: 'loss coefficient of the way back through the tank, on the mean upflow' }).optional(),
      upflow: quantity('speed', { unit: 'm/s', least: -2, most: 2, says: 'mean upflow held by a pump; 0 m/s for none' }).optional(),
    })
    .prefault({ loss: '1.5' })
    .meta({ description: 'how the liquid comes back to the bottom: a loss coefficient or a given upflow' }),
});

const water = z.strictObject({
  kind: z.literal('water'),
  temperature: quantity('temperature', { unit: 'degC', least: 1, most: 60, default: '20 degC', says: 'of water and air' }),
});

const sludge = z.strictObject({
  kind: z.literal('sludge'),
  solids: quantity('density', { unit: 'g/L', least: 2, most: 20, says: 'suspended solids of the activated sludge' }),
  temperature: quantity('temperature', { unit: 'degC', least: 1, most: 60, default: '20 degC', says: 'of sludge and air' }),
});

const thinning = z.strictObject({
  kind: z.literal('thinning'),
  consistency: quantity('viscosity', {
    unit: 'mPa s',
    least: 0.2,
    most: 5000,
    says: 'K of viscosity = K rate^(n - 1), that is the viscosity at a shear rate of 1 1/s without the yield stress',
  }),
  index: plainNumber({ least: 0.2, most: 1, says: 'n of viscosity = K rate^(n - 1)' }),
  'yield stress': quantity('stress', { unit: 'Pa', least: 0, most: 10, default: '0 Pa', says: 'below which the liquid hardly flows' }),
  density: quantity('density', { unit: 'kg/m3', least: 500, most: 2000, default: '1000 kg/m3', says: 'of the liquid' }),
  temperature: quantity('temperature', { unit: 'degC', least: 1, most: 60, default: '20 degC', says: 'of liquid and air' }),
});

const custom = z.strictObject({
  kind: z.literal('custom'),
  density: quantity('density', { unit: 'kg/m3', least: 500, most: 2000, says: 'of the liquid' }),
  viscosity: quantity('viscosity', { unit: 'mPa s', least: 0.2, most: 200, says: 'dynamic viscosity of the liquid' }),
  'surface tension': quantity('tension', { unit: 'mN/m', least: 10, most: 200, says: 'of the liquid against air' }),
  temperature: quantity('temperature', { unit: 'degC', least: 1, most: 60, default: '20 degC', says: 'of the air' }),
});

const grid = z.strictObject({
  across: plainNumber({ least: 12, most: 400, whole: true, default: '40', says: 'cells across the gap' }),
  speed: quantity('speed', {
    unit: 'm/s',
    least: 0.05,
    most: 5,
    default: '0.3 m/s',
    says: 'speed that one time step carries 0.02 cells far; a larger one makes the steps finer',
  }),
});

const swept = z.strictObject({
  above: quantity('stress', { unit: 'Pa', least: 0.001, most: 1000, default: '0.5 Pa', says: 'wall shear that counts as sweeping' }),
  within: quantity('time', {
    unit: 's',
    least: 0.001,
    most: 3600,
    says: 'window to be swept in; 1 s or the span, if shorter, by default',
  }).optional(),
});

/** A case file, as text leaves turned into SI values. */
export const caseTable = z
  .strictObject({
    title: line(200, 'one line for people', 'Untitled panel'),
    channel,
    fins: finKeys,
    liquid: leftOut(z.discriminatedUnion('kind', [water, sludge, thinning, custom]), { kind: 'water' }),
    gas: gasKeys,
    grid: leftOut(grid),
    record: leftOut(recordKeys),
    swept: leftOut(swept),
    air: leftOut(airKeys),
    particles: particleKeys,
    deposit: depositKeys,
  })
  .meta({ title: 'Swathe case' });

/** What the table hands over: SI values, not yet checked against one another. */
export type CaseEntries = z.output<typeof caseTable>;

/** Sections as the table has read them, by name and text. */
const sections: Memory<z.ZodSafeParseResult<unknown>> = new Map();

/**
 * Holds entries (maps, lists and texts) against the table. Sections read before are not read again: the points of a plan share nearly all of
 * theirs. Where one is wrong the whole is read, so that what is found has its place.
 */
export function readEntries(entries: unknown): z.ZodSafeParseResult<CaseEntries> {
  const { shape } = caseTable;
  const isMap = typeof entries === 'object' && entries !== null && !Array.isArray(entries);
  if (!isMap || Object.keys(entries).some((name) => !Object.hasOwn(shape, name))) return caseTable.safeParse(entries);
  const data: Record<string, unknown> = {};
  for (const [name, schema] of Object.entries(shape)) {
    const section = (entries as Record<string, unknown>)[name];
    const read = remembered(sections, `${name} ${JSON.stringify(section)}`, () => schema.safeParse(section));
    if (!read.success) return caseTable.safeParse(entries);
    data[name] = read.data;
  }
  return { success: true, data: data as CaseEntries };
}

/** JSON Schema (2020-12) of a case file, for completion and checks in editors. */
export function caseSchema(): object {
  return z.toJSONSchema(caseTable, { io: 'input' });
}
