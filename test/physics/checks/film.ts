/**
 * A film of liquid, 12 cells thick, falls down the left wall beside air; the far side of the air slips. Wall shear rho g delta,
 * speed of the surface g delta^2/(2 nu) [V].
 */
import { createSimulation } from '../../../solver/index.ts';
import { airBeside, CHANNEL, meanOf, profile, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

const [W, AIR] = [5, 24];

/**
 * Speed where phi = 1/2, over g delta^2/(2 nu), by the 1-D equation eta(phi) u' = weight outside, with 1/eta linear in phi: the thin
 * outer half of a diffuse interface is driven fast, so the surface of the film is faster than that of a sharp one.
 */
function diffuseSurface(delta: number): number {
  const [cells, reach] = [4000, delta + AIR];
  const h = reach / cells;
  const at = (n: number) => profile(delta - (n + 0.5) * h, W);
  // gravity acts where surface tension would: see solver/profile.ts
  const weight = (n: number) => 1 / 832 + at(n) ** 2 * (3 - 2 * at(n)) * (1 - 1 / 832);
  let outside = 0;
  for (let n = 0; n < cells; n++) outside += weight(n) * h;
  let u = 0;
  for (let n = 0; (n + 0.5) * h < delta; n++) {
    outside -= weight(n) * h;
    u += (outside + (weight(n) * h) / 2) * (at(n) + 55 * (1 - at(n))) * h;
  }
  return u / ((delta * delta) / 2);
}

/** Wall shear over rho g delta and the speed where phi = 1/2 over that of the 1-D equation. */
export async function film(delta: number, viscosity: number): Promise<{ shear: number; surface: number }> {
  // surface speed 0.02
  const g = (0.04 * viscosity) / (delta * delta);
  const s = await createSimulation({
    ...{ nx: 4, ny: delta + AIR, sides: { ...CHANNEL, right: 'slip' }, interfaceWidth: W, surfaceTension: 0.003 },
    ...{ liquid: { density: 1, viscosity }, gas: airBeside(viscosity) },
    // gravity acts on rho - rhoLiquid, so the liquid's own weight is a force on all cells
    ...{ gravity: { x: -g, y: 0 }, force: { x: -g, y: 0 } },
    initial: { phi: (_, y) => profile(delta - 0.5 - y, W) },
  });
  // the film settles with exp(-nu (pi / 2 delta)^2 t): 12 of its times; the air above it much sooner
  const samples = settle(s, Math.ceil((12 * 4 * delta * delta) / (Math.PI ** 2 * viscosity)), 500);
  const surface = (s.ux.get(1, delta - 1) + s.ux.get(1, delta)) / 2;
  return {
    shear: -meanOf(samples.shear.left) / (g * delta),
    surface: -surface / ((diffuseSurface(delta) * g * delta * delta) / (2 * viscosity)),
  };
}

export const check: Check = {
  name: 'film',
  async run() {
    const rows = [];
    for (const viscosity of [0.01, 0.005]) {
      const flows = [];
      for (const cells of [12, 24]) flows.push({ cells, ...(await film(cells, viscosity)) });
      const [shear, surface] = [flows.map((f) => ({ ...f, value: f.shear })), flows.map((f) => ({ ...f, value: f.surface }))];
      const part = { check: this.name, source: 'exact solution [V]', reference: 1, counts: 'delta ', at: 12 };
      rows.push(
        row({ ...part, quantity: `nu ${viscosity}: wall shear / (rho g delta)`, ours: shear, gate: 2, order: false }),
        row({ ...part, quantity: `nu ${viscosity}: surface speed / 1-D equation`, ours: surface }),
      );
    }
    return rows;
  },
};
