/** The keys of a case that say what is recorded, and for how long. */
import * as z from 'zod';
import { quantity } from './leaves.ts';

const STEMS = [
  ['swept', ''],
  ['touched', ''],
  ['mean_shear', '_Pa'],
  ['rms_shear', '_Pa'],
  ['p95_shear', '_Pa'],
  ['share_above', ''],
  ['events', '_1_s'],
];
const PLACES = ['left', 'right', 'together'];

/** Answers that a recording can be made to wait for, by their names in every result. */
export const UNTIL_NAMES: readonly string[] = [
  ...STEMS.flatMap(([stem, unit]) => PLACES.map((place) => `${stem}_${place}${unit}`)),
  'holdup',
  'upflow_m_s',
];

export const recordKeys = z.strictObject({
  settle: quantity('time', { unit: 's', least: 0, most: 600, default: '1 s', says: 'time computed before the recording starts' }),
  span: quantity('time', { unit: 's', least: 0.001, most: 3600, default: '3 s', says: 'time recorded; with until, the least' }),
  every: quantity('time', { unit: 'ms', least: 0.01, most: 1000, default: '2 ms', says: 'time between wall samples' }),
  until: z
    .strictObject(
      Object.fromEntries(
        UNTIL_NAMES.map((name) => [
          name,
          quantity('share', {
            unit: '%',
            least: 0.1,
            most: 100,
            says: 'half of the 95 % interval over the value, at which the measure is sure enough',
          }).optional(),
        ]),
      ),
    )
    .optional()
    .meta({ description: 'ends the recording once all of these measures are as sure as asked' }),
  'at most': quantity('time', { unit: 's', least: 0.001, most: 3600, says: 'time recorded where until is not reached' }).optional(),
});

export type RecordEntries = z.output<typeof recordKeys>;
