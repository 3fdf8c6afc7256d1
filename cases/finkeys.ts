/** The part of the table of keys that tells the fins. */
import * as z from 'zod';
import { flag, plainNumber, quantity } from './leaves.ts';

/** How an entry makes several fins of one. */
const pitch = quantity('length', {
  unit: 'mm',
  least: 0.1,
  most: 3000,
  says: 'distance from one fin to the next along the channel',
}).optional();
const count = plainNumber({ least: 1, most: 500, whole: true, default: '1', says: 'number of fins in the group' });
const sides = {
  alternate: flag('mirrors every other fin across the middle of the gap', 'false'),
  mirrored: flag('sets the mirror image of every fin across the middle of the gap beside it', 'false'),
};

const thickness = quantity('length', { unit: 'mm', least: 0.1, most: 100, says: 'short side of the fin' });

const corners = z.array(
  z.tuple([
    quantity('length', { unit: 'mm', least: -50, most: 150, says: 'across, from the left wall' }),
    quantity('length', { unit: 'mm', least: 0, most: 3000, says: 'along, from the bottom' }),
  ]),
);

const straight = z.strictObject({
  from: quantity('length', { unit: 'mm', least: 0, most: 3000, says: 'height of the centre of the lowest fin' }),
  pitch,
  count,
  across: quantity('length', { unit: 'mm', least: -50, most: 150, says: "distance of the fin's centre from the left wall" }),
  length: quantity('length', { unit: 'mm', least: 0.1, most: 500, says: 'long side of the fin' }),
  thickness,
  angle: quantity('angle', {
    unit: 'deg',
    least: -90,
    most: 90,
    default: '0 deg',
    says: 'lean of the long side from the channel axis; positive turns the upper end to the right',
  }),
  ...sides,
});

const curved = z.strictObject({
  path: corners.meta({ description: 'corners [across, along] of the middle line of the lowest fin, from end to end', minItems: 2 }),
  thickness,
  pitch,
  count,
  ...sides,
});

const outlined = z.strictObject({
  outline: corners.meta({ description: 'corners [across, along] of a closed polygon, at least three; the lowest fin', minItems: 3 }),
  pitch,
  count,
  ...sides,
});

export const finKeys = z
  .array(z.union([straight, curved, outlined]))
  .prefault([])
  .meta({ description: 'groups of fins: straight ones, curved ones by their middle line, and free outlines' });

export type FinEntry = z.output<typeof finKeys>[number];
