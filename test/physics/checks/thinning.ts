/**
 * Channel full of a liquid that thins under shear, in a box made for gas, under a force G per volume. Half width h, stress G y:
 *
 *   power law      U = n/(2n + 1) h (G h/K)^(1/n), that is tau_w = K [(2n + 1)/n U/h]^n [V]
 *   yield stress   rate = (G y - tauYield)/eta outside the plug of half width y0 = tauYield/G; s = y0/h:
 *                  U = G h^2/(3 eta) (1 - 3/2 s + 1/2 s^3) [V] (Bingham's plane flow)
 */
import { createSimulation, type Setup } from '../../../solver/index.ts';
import { airBeside, CHANNEL, meanOf, settle } from '../channel.ts';

/** eta at the wall: some ten times that of water on the standard grid */
const ETA_WALL = 0.01;
const RATE_WALL = 1e-3;

/** Wall shear over G h, and mean velocity over the exact one; `plug` is s. */
export async function thinning(cells: number, index: number, plug: number, precision: 'f32' | 'f64', most?: number) {
  const h = cells / 2;
  const stress = ETA_WALL * RATE_WALL;
  const yieldStress = plug * stress;
  const consistency = (stress - yieldStress) / RATE_WALL ** index;
  const setup: Setup = {
    ...{ nx: 4, ny: cells, sides: CHANNEL, precision, surfaceTension: 0.003, force: { x: stress / h, y: 0 } },
    liquid: { density: 1, viscosity: ETA_WALL, rheology: { consistency, index, yieldStress, least: 1e-4, ...(most ? { most } : {}) } },
    gas: airBeside(1e-3),
  };
  const simulation = await createSimulation(setup);
  const samples = settle(simulation, Math.round((6 * h * h) / ETA_WALL), 64);
  const exact =
    plug > 0 ? ((stress * h) / (3 * consistency)) * (1 - 1.5 * plug + 0.5 * plug ** 3) : (index / (2 * index + 1)) * h * RATE_WALL;
  return {
    shear: (meanOf(samples.shear.left) + meanOf(samples.shear.right)) / (2 * stress),
    mean: samples.upflow[samples.upflow.length - 1] / exact,
  };
}
