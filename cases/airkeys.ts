/** The part of the table of keys that tells what the air costs: how it is blown in, and what the membranes give for it. */
import * as z from 'zod';
import { quantity } from './leaves.ts';

export const airKeys = z.strictObject({
  depth: quantity('length', { unit: 'm', least: 0, most: 20, default: '2.5 m', says: 'of the nozzles below the surface of the tank' }),
  losses: quantity('length', { unit: 'm', least: 0, most: 20, default: '1 m', says: 'of pipes, valves and nozzles, as height of liquid' }),
  efficiency: quantity('share', { unit: '%', least: 1, most: 100, default: '60 %', says: 'of blower, drive and motor together' }),
  inlet: quantity('temperature', { unit: 'degC', least: -40, most: 60, default: '20 degC', says: 'of the air that the blower takes in' }),
  flux: quantity('flux', {
    unit: 'L/(m2 h)',
    least: 0.1,
    most: 1000,
    says: 'permeate per membrane area, for the energy per volume of it',
  }).optional(),
});
