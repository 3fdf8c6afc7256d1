/** The gas of a case: what the text says, with defaults and what follows from the temperature filled in. */
import type { BubbleKind, Case } from './case.ts';
import { airDensity_kg_m3, airViscosity_Pa_s } from './fluids.ts';
import { sharesByNumber } from './mixture.ts';
import type { CaseEntries } from './schema.ts';

/** Cells of liquid kept between a wall and a bubble that is let in. */
export const CLEAR_CELLS = 2;

/** Of bubbles of which the case says nothing else. */
const DIAMETER_m = 5e-3;
const SPREAD = 0.15;

/** Diameter of the largest circle that fits into the gap. */
export function fitting_m({ channel, grid }: { channel: { gap_m: number }; grid: { across: number } }): number {
  return channel.gap_m - (2 * CLEAR_CELLS * channel.gap_m) / grid.across;
}

export function gasOf({ channel, gas, grid, liquid }: CaseEntries): Case['gas'] {
  const { temperature: temperature_K } = liquid;
  const most_m = fitting_m({ channel: { gap_m: channel.gap }, grid });
  const kinds = kindsOf(gas.bubble, most_m);
  return {
    supply_m_s: gas.supply,
    ...(gas.pulse === undefined ? {} : { pulse: { on_s: gas.pulse.on, off_s: gas.pulse.off } }),
    serves_m: gas.serves ?? channel.height,
    bubble: { diameter_m: kinds.reduce((sum, { diameter_m, share }) => sum + share * diameter_m, 0), kinds },
    across: placesOf(gas.across, channel.gap),
    start: gas.start.map(({ across, along, diameter }) => ({ across_m: across, along_m: along, diameter_m: diameter })),
    seed: gas.seed,
    density_kg_m3: gas.softened?.density ?? airDensity_kg_m3(temperature_K),
    viscosity_Pa_s: gas.softened?.viscosity ?? airViscosity_Pa_s(temperature_K),
    airDensity_kg_m3: airDensity_kg_m3(temperature_K),
    softened: gas.softened !== undefined,
  };
}

function kindsOf(bubble: CaseEntries['gas']['bubble'], most_m: number): BubbleKind[] {
  if (bubble.mixture === undefined) return [{ diameter_m: bubble.diameter ?? DIAMETER_m, spread: bubble.spread ?? SPREAD, share: 1 }];
  const all = bubble.mixture.reduce((sum, { share }) => sum + share, 0);
  const kinds = bubble.mixture.map(({ diameter, spread, share }) => ({ diameter_m: diameter, spread, share: share / all }));
  return bubble.shares === 'gas' ? sharesByNumber(kinds, most_m) : kinds;
}

function placesOf(across: CaseEntries['gas']['across'], gap_m: number): Case['gas']['across'] {
  if (across === 'middle') return { at_m: [gap_m / 2] };
  if (typeof across === 'string') return across;
  return { at_m: typeof across === 'number' ? [across] : across };
}
