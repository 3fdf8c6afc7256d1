/** The table of everything a plan of many cases may say, as cases/schema.ts is that of one case. */
import * as z from 'zod';
import { choice, line, plainNumber } from '../leaves.ts';

/** Most points of a plan: beyond it a listing is no longer read by anybody. */
export const MOST_POINTS = 20_000;

const vary = z.strictObject({
  key: line(200, 'the key to vary, as in channel.gap or fins.0.angle', ''),
  values: z.array(z.unknown()).optional().meta({ description: 'a list of values, each with its unit' }),
  from: line(60, 'first value of a range, with its unit', '').optional(),
  to: line(60, 'last value of a range, with its unit', '').optional(),
  step: line(60, 'distance between neighbouring values, with its unit', '').optional(),
  count: plainNumber({ least: 2, most: 1000, whole: true, says: 'number of values, both ends included' }).optional(),
  spacing: choice(['even', 'log'], 'whether neighbours have the same difference or the same ratio').optional(),
});

export const planTable = z
  .strictObject({
    title: line(200, 'one line for people', 'Untitled plan'),
    base: line(1000, 'the case all points start from: a ready-made one, or a file named from where the plan lies', ''),
    set: z.record(z.string(), z.unknown()).prefault({}).meta({ description: 'values changed in every point: key and value' }),
    vary: z.array(vary).meta({ description: 'the keys to vary and their values', minItems: 1 }),
    combine: choice(
      ['crossed', 'paired', 'sampled'],
      'crossed: every value with every other; paired: first with first and so on; sampled: spread over the ranges',
      'crossed',
    ),
    samples: plainNumber({ least: 2, most: MOST_POINTS, whole: true, says: 'number of points of a sampled plan' }).optional(),
    shuffle: plainNumber({ least: 0, most: 4294967295, whole: true, default: '1', says: 'seed of the draws of a sampled plan' }),
    where: z
      .array(line(300, 'a comparison every point must meet, as in channel.gap >= 2 * gas.bubble.diameter', ''))
      .prefault([])
      .meta({ description: 'comparisons; points that do not meet all of them are left out' }),
    seeds: z
      .array(plainNumber({ least: 0, most: 4294967295, whole: true, says: 'gas.seed of one run of each point' }))
      .prefault([])
      .meta({ description: "each point is run once with each of them; the base case's seed by default" }),
  })
  .meta({ title: 'Swathe plan' });

export type PlanEntries = z.output<typeof planTable>;
export type VaryEntry = z.output<typeof vary>;

/** JSON Schema (2020-12) of a plan file. */
export function planSchema(): object {
  return z.toJSONSchema(planTable, { io: 'input' });
}
