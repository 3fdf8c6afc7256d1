import { type Case, layOut } from '../../cases/index.ts';
import { Supply } from '../../cases/release.ts';
import type { Simulation } from '../../solver/index.ts';

/** Runs the supply alone: the box is a real one, but no time passes in it. */
export function schedule(panel: Case, until_s: number): { times_s: number[]; areas_m2: number[]; places_m: number[]; due_m2: number } {
  const { derived } = layOut(panel);
  const supply = new Supply(panel, derived);
  const clock = { step: 0 };
  const areas: number[] = [];
  const box = {
    setup: { nx: derived.nx, ny: derived.ny },
    phi: { get: () => 1 },
    get step() {
      return clock.step;
    },
    placeGas({ radius }: { radius: number }) {
      areas.push(Math.PI * radius ** 2 * derived.unit.area_m2);
      return Math.PI * radius ** 2;
    },
  } as unknown as Simulation;
  const times_s: number[] = [];
  const places_m: number[] = [];
  while (supply.step * derived.dt_s < until_s) {
    clock.step = supply.step;
    times_s.push(clock.step * derived.dt_s);
    places_m.push(supply.state.across_m);
    supply.release(box);
  }
  return { times_s, areas_m2: areas, places_m, due_m2: derived.gasVelocity_m_s * panel.channel.gap_m * until_s };
}
