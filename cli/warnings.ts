import { type Case, type Derived, SLUDGE_CAUTION } from '../cases/index.ts';
import { plain } from './numbers.ts';

const GRAVITY_M_S2 = 9.80665;

/**
 * Gap, in capillary lengths sqrt(sigma / (drho g)), below which a fully wetted plane bubble does not rise.
 * @see Bretherton 1961, J. Fluid Mech. 10, 166; its plane form gives rho g H^2 / sigma = 2.871 (derived, not printed there)
 */
const STALL_GAP = 1.694;

/** Shear rate below which viscosity hardly matters to scoured walls, which see some 100 1/s. */
const SLOW_1_S = 1;

/** Cells across a bubble, least: the interface alone takes five. */
const LEAST_CELLS = 16;

/** Bubbles in the recorded time below which a mean says little. */
const FEW_BUBBLES = 20;

/** What bites in a case: each warning names the value, the limit and what to change. Empty for a sound case. */
export function warnings(panel: Case, derived: Derived): string[] {
  return [
    stalled(panel),
    ...thinning(panel, derived),
    coarse(panel, derived),
    softened(panel, derived),
    shortRecord(panel),
    brokenPulse(panel),
    fewBubbles(panel, derived),
  ].filter((text) => text !== undefined);
}

function stalled({ channel, liquid, gas, surfaceTension_N_m }: Case): string | undefined {
  const difference_kg_m3 = liquid.density_kg_m3 - gas.airDensity_kg_m3;
  const limit_m = STALL_GAP * Math.sqrt(surfaceTension_N_m / (difference_kg_m3 * GRAVITY_M_S2));
  if (channel.gap_m >= limit_m) return undefined;
  return (
    `gap ${plain(1000 * channel.gap_m)} mm is below ${plain(1000 * limit_m)} mm (${STALL_GAP} capillary lengths): a plane bubble that spans it ` +
    'does not rise by itself, though a real one does. Widen channel.gap, or set an upflow'
  );
}

function thinning({ liquid: { kind } }: Case, { thickest }: Derived): string[] {
  if (thickest === undefined) return [];
  const { viscosity_Pa_s, below_1_s } = thickest;
  const found = kind === 'sludge' ? [SLUDGE_CAUTION] : [];
  if (below_1_s > SLOW_1_S)
    found.push(
      `below a shear rate of ${plain(below_1_s)} 1/s the liquid is computed with ${plain(1000 * viscosity_Pa_s)} mPa s, thinner than it is. ` +
        'Raise grid.speed, or take fewer cells across',
    );
  return found;
}

function coarse({ grid, gas }: Case, { cellsPerBubble }: Derived): string | undefined {
  if (cellsPerBubble >= LEAST_CELLS) return undefined;
  const across = Math.ceil((grid.across * LEAST_CELLS) / cellsPerBubble);
  return (
    `a bubble of ${plain(1000 * Math.min(...gas.bubble.kinds.map((kind) => kind.diameter_m)))} mm has ${plain(cellsPerBubble)} cells, fewer than ${LEAST_CELLS}: its shape and rise are ` +
    `not resolved and small parts dissolve. Set grid.across to ${across} or more`
  );
}

function softened({ gas, liquid }: Case, { densityRatio }: Derived): string | undefined {
  if (!gas.softened) return undefined;
  return (
    `the gas is softened: ${plain(gas.density_kg_m3)} kg/m3 and ${plain(gas.viscosity_Pa_s)} Pa s, liquid to gas ${plain(densityRatio)} instead of ` +
    `${plain(liquid.density_kg_m3 / gas.airDensity_kg_m3)}; buoyancy keeps the real difference`
  );
}

function shortRecord({ record, swept }: Case): string | undefined {
  if (record.span_s >= 2 * swept.within_s) return undefined;
  return (
    `record.span ${plain(record.span_s)} s holds fewer than two separate windows of swept.within ${plain(swept.within_s)} s: ` +
    'the swept fraction rests on one. Record longer, or ask for a shorter time'
  );
}

/** Part of a period, relative, by which a recording may miss whole ones. */
const PERIOD_MISS = 0.01;

function brokenPulse({ record, gas }: Case): string | undefined {
  if (gas.pulse === undefined || gas.supply_m_s === 0) return undefined;
  const period_s = gas.pulse.on_s + gas.pulse.off_s;
  const periods = record.span_s / period_s;
  if (Math.round(periods) > 0 && Math.abs(periods - Math.round(periods)) <= PERIOD_MISS) return undefined;
  return (
    `record.span ${plain(record.span_s)} s is no whole number of periods of gas.pulse (${plain(period_s)} s): times with and without air do not ` +
    `count in the means as they come. Set record.span to ${plain(period_s * Math.max(1, Math.round(periods)))} s`
  );
}

function fewBubbles({ record, gas }: Case, { bubblesPerSecond }: Derived): string | undefined {
  const bubbles = bubblesPerSecond * (record.until?.atMost_s ?? record.span_s);
  if (bubbles >= FEW_BUBBLES || (gas.supply_m_s === 0 && gas.start.length > 0)) return undefined;
  if (bubbles === 0) return 'no gas: neither gas.supply nor gas.start lets any in';
  const period_s = gas.pulse === undefined ? 1 : gas.pulse.on_s + gas.pulse.off_s;
  const needed_s = plain(period_s * Math.ceil(FEW_BUBBLES / bubblesPerSecond / period_s));
  return (
    `about ${plain(bubbles, 2)} bubbles are let in while recording, fewer than ${FEW_BUBBLES}: means and the swept fraction depend on single ` +
    `bubbles. Set record.span to ${needed_s} s or more, or compare several values of gas.seed`
  );
}

/** Said beside every result that could be taken for more than it is. */
export const CAUTION = `A plane section ranks geometries; it does not predict a module. For screening before bench trials, not for design.`;
