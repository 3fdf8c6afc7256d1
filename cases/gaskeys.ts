/** The part of the table of keys that tells the gas: how much, in what bubbles, where and when. */
import * as z from 'zod';
import { choice, leftOut, plainNumber, quantity, wordOrLength } from './leaves.ts';

const spread = { unit: '%', least: 0, most: 40, says: 'standard deviation of the diameter over its mean' };

const bubble = z.strictObject({
  diameter: quantity('length', {
    unit: 'mm',
    least: 0.5,
    most: 90,
    says: 'mean diameter of the bubbles let in, 5 mm by default',
  }).optional(),
  spread: quantity('share', { ...spread, says: `${spread.says}, 15 % by default` }).optional(),
  mixture: z
    .array(
      z.strictObject({
        diameter: quantity('length', { unit: 'mm', least: 0.5, most: 90, says: 'mean diameter of this kind' }),
        spread: quantity('share', { ...spread, default: '15 %' }),
        share: quantity('share', { unit: '%', least: 0.01, most: 100, says: 'part that this kind has in the whole' }),
      }),
    )
    .optional()
    .meta({ description: 'in place of diameter and spread: kinds of bubble, with shares that add up to 100 %', minItems: 1 }),
  shares: choice(['gas', 'number'], 'what the shares of a mixture are of: the gas let in, or the number of bubbles', 'gas'),
});

const place = { unit: 'mm', least: 0, most: 100 };

const across = z
  .union([
    wordOrLength(['middle', 'even', 'left', 'right'], {
      ...place,
      says: 'where in the gap bubbles are let in; even: anywhere, left and right: two cells clear of that wall',
    }),
    z
      .array(quantity('length', { ...place, says: 'a nozzle, from the left wall' }))
      .meta({ description: 'nozzles; each bubble takes one of them by chance', minItems: 1 }),
  ])
  .prefault('middle');

export const gasKeys = z.strictObject({
  supply: quantity('supply', { unit: 'm3/(m2 h)', least: 0, most: 20, says: 'air per membrane area and time, while it is on; 0 for none' }),
  pulse: z
    .strictObject({
      on: quantity('time', { unit: 's', least: 0.01, most: 3600, says: 'time with air, first' }),
      off: quantity('time', { unit: 's', least: 0, most: 3600, says: 'time without, after it' }),
    })
    .optional()
    .meta({ description: 'air on and off in turn, from the start of the run' }),
  serves: quantity('length', {
    unit: 'mm',
    least: 10,
    most: 10000,
    says: "membrane height this air serves; the channel's by default",
  }).optional(),
  bubble: leftOut(bubble),
  across,
  start: z
    .array(
      z.strictObject({
        across: quantity('length', { unit: 'mm', least: 0, most: 100, says: 'centre, from the left wall' }),
        along: quantity('length', { unit: 'mm', least: 0, most: 3000, says: 'centre, from the bottom' }),
        diameter: quantity('length', { unit: 'mm', least: 0.5, most: 90, says: 'of the bubble' }),
      }),
    )
    .prefault([])
    .meta({ description: 'bubbles that are there at the start' }),
  seed: plainNumber({ least: 0, most: 4294967295, whole: true, default: '1', says: 'of the random releases' }),
  softened: z
    .strictObject({
      density: quantity('density', { unit: 'kg/m3', least: 1, most: 200, says: 'of the gas as computed; buoyancy keeps that of air' }),
      viscosity: quantity('viscosity', { unit: 'mPa s', least: 0.01, most: 10, says: 'dynamic viscosity of the gas as computed' }),
    })
    .optional()
    .meta({ description: 'a gas heavier and thicker than air, where true air is more than the method carries' }),
});
