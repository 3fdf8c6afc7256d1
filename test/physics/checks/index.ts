import type { Check } from '../row.ts';
import { check as cavity } from './cavity.ts';
import { check as cylinders } from './cylinders.ts';
import { check as oscillating } from './oscillating.ts';
import { check as poiseuille } from './poiseuille.ts';
import { check as taylorGreen } from './taylor-green.ts';

/** All checks in the order of the table. */
export const CHECKS: readonly Check[] = [poiseuille, oscillating, taylorGreen, cavity, cylinders];
