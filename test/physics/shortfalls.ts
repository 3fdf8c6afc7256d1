import type { Row } from './row.ts';

const BENT = 'far from 90 deg the angle comes out more extreme than asked, on any grid';
const SOUND = 'the bubble starts with its Laplace pressure alone; sound of the first moments probably swings through the speed';
const LINE = 'beside the wall where the interface meets it; flow reflects there like a mirror and the interface straight back';

/** Gates not held yet: check, words the quantity begins with, why, and the figure that was seen. */
export const KNOWN: readonly { check: string; quantity: string; reason: string }[] = [
  {
    ...{ check: 'laplace', quantity: 'capillary number of parasitic currents' },
    reason: '2.8e-4 at R 20, in the gas beside the interface: force and pressure gradient do not cancel to the last digit there',
  },
  {
    ...{ check: 'capillary-wave', quantity: 'set A' },
    reason: '0.07 a0 at 128 cells, order 1.6: the wave is slowed by an interface 5 cells thick; thinner ones feel the grid',
  },
  {
    ...{ check: 'capillary-wave', quantity: 'set B' },
    reason: '0.07 a0 at 128 cells, order 1.6: the wave is slowed by an interface 5 cells thick; thinner ones feel the grid',
  },
  { check: 'contact-angle', quantity: 'angle at 30 deg', reason: `4.3 deg: ${BENT}` },
  { check: 'contact-angle', quantity: 'angle at 150 deg', reason: `3.2 deg: ${BENT}` },
  { check: 'rising-bubble', quantity: 'case 1: greatest rise speed', reason: `1.8 % above at 160 cells: ${SOUND}` },
  {
    check: 'stall',
    quantity: 'rho g H^2/sigma 2.4',
    reason: 'creeps by 0.09 H at 32 cells: the contact lines are not at rest',
  },
  {
    check: 'long-bubble',
    quantity: '20 mm',
    reason: '0.203 sqrt(gH) at 80 cells across, 0.027 slow; the film is as thick as the interface',
  },
  {
    check: 'at-rest',
    quantity: 'tilt 0 deg',
    reason: `1.9e-5: ${LINE}`,
  },
  {
    check: 'at-rest',
    quantity: 'tilt 20 deg',
    reason: `1.4e-3: ${LINE}`,
  },
  {
    check: 'gas-area',
    quantity: 'gas area after 1000000 steps',
    reason: '0.71 % lost in 1e6 steps before the velocity form, not rerun: rounding of f32 in the interface populations',
  },
];

/** Why a row may fail without the run failing. */
export function shortfallOf(row: Row): string | undefined {
  return KNOWN.find(({ check, quantity }) => check === row.check && row.quantity.startsWith(quantity))?.reason;
}
