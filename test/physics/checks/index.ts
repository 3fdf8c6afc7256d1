import type { Check } from '../row.ts';
import { check as atRest } from './at-rest.ts';
import { check as bubbleBalance } from './bubble-balance.ts';
import { check as capillaryWave } from './capillary-wave.ts';
import { check as cavity } from './cavity.ts';
import { check as contactAngle } from './contact-angle.ts';
import { check as contactAngleInclined } from './contact-angle-inclined.ts';
import { check as cylinders } from './cylinders.ts';
import { check as film } from './film.ts';
import { findingChecks } from './findings.ts';
import { check as inclined } from './inclined.ts';
import { drift, check as laplace } from './laplace.ts';
import { check as oscillating } from './oscillating.ts';
import { check as poiseuille } from './poiseuille.ts';
import { check as rheology } from './rheology.ts';
import { check as risingBubble } from './rising-bubble.ts';
import { longCheck, stallCheck } from './slot.ts';
import { check as taylorGreen } from './taylor-green.ts';
import { check as twoLayer } from './two-layer.ts';

/** All checks in the order of the table. */
export const CHECKS: readonly Check[] = [
  ...[poiseuille, oscillating, taylorGreen, cavity, cylinders, inclined, rheology],
  ...[twoLayer, film, laplace, capillaryWave, contactAngle, contactAngleInclined],
  ...[risingBubble, bubbleBalance, stallCheck, longCheck, atRest, drift],
  ...findingChecks,
];
