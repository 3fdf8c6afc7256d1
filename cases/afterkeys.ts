/** The part of the table of keys that tells what measures ask beside the flow: particles and deposit. */
import * as z from 'zod';
import { leftOut, plainNumber, quantity } from './leaves.ts';

export const particleKeys = leftOut(
  z
    .strictObject({
      length: quantity('length', {
        unit: 'mm',
        least: 1,
        most: 10000,
        says: 'membrane along the flow over which the layer at the wall builds up; gas.serves by default',
      }).optional(),
      'wall to bulk': plainNumber({
        least: 1.01,
        most: 10000,
        default: '60',
        says: 'particles at the wall over those in the bulk, by volume',
      }),
    })
    .meta({ description: 'for the estimate of back-transport' }),
);

export const depositKeys = z
  .strictObject({
    flux: quantity('flux', {
      unit: 'L/(m2 h)',
      least: 0,
      most: 1000,
      says: 'through the membrane; air.flux, or 20 L/(m2 h), by default',
    }).optional(),
    solids: quantity('density', { unit: 'g/L', least: 0.001, most: 100, default: '10 g/L', says: 'that the flux carries to the wall' }),
    layer: quantity('load', { unit: 'g/m2', least: 0.001, most: 10000, default: '5 g/m2', says: 'mass of solids that covers the wall' }),
    above: quantity('stress', {
      unit: 'Pa',
      least: 0.001,
      most: 1000,
      says: 'wall shear beyond which deposit comes off; swept.above by default',
    }).optional(),
    clears: quantity('time', {
      unit: 's',
      least: 0.001,
      most: 3600,
      default: '0.1 s',
      says: 'time in which such shear takes off 63 % of it',
    }),
    start: quantity('share', { unit: '%', least: 0, most: 100, default: '100 %', says: 'of the wall covered when the recording starts' }),
  })
  .optional()
  .meta({ description: 'asks for the share of the walls still covered by a deposit against time' });
