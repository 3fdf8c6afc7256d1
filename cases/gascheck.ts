/** Which gas can be let in: what the table of keys cannot see of bubbles, places and times. */
import { bandsOf, gridOf } from './bands.ts';
import type { Case } from './case.ts';
import type { PlacedFinding } from './faults.ts';
import { CLEAR_CELLS, fitting_m } from './gas.ts';
import { distanceTo } from './polygon.ts';
import type { CaseEntries } from './schema.ts';
import { mm } from './units.ts';

/** What shares may miss of 100 % through rounding. */
const ROUNDED = 0.005;

export function gasFindings(entries: CaseEntries, panel: Case): PlacedFinding[] {
  const { gas, liquid } = panel;
  const found = mixtureFindings(entries);
  if (gas.softened && (gas.density_kg_m3 < gas.airDensity_kg_m3 || gas.density_kg_m3 >= liquid.density_kg_m3)) {
    const air = Number(gas.airDensity_kg_m3.toPrecision(4));
    found.push({ path: ['gas', 'softened', 'density'], problem: 'is lighter than air', allowed: `${air} kg/m3 to 200 kg/m3` });
  }
  if (gas.supply_m_s === 0) return found;
  const large = fitFindings(entries, panel);
  return [...found, ...(large.length > 0 ? large : placeFindings(entries, panel))];
}

function mixtureFindings({ gas: { across, bubble } }: CaseEntries): PlacedFinding[] {
  const found: PlacedFinding[] = [];
  if (Array.isArray(across) && across.length === 0)
    found.push({ path: ['gas', 'across'], problem: 'is empty', allowed: 'at least one place, or a word' });
  if (bubble.mixture === undefined) return found;
  for (const key of ['diameter', 'spread'] as const)
    if (bubble[key] !== undefined) {
      const remedy = 'Each kind of the mixture has its own';
      found.push({ path: ['gas', 'bubble', key], atKey: true, problem: 'stands beside a mixture', allowed: 'one of the two', remedy });
    }
  const path = ['gas', 'bubble', 'mixture'];
  const all = bubble.mixture.reduce((sum, { share }) => sum + share, 0);
  if (bubble.mixture.length === 0) found.push({ path, problem: 'is empty', allowed: 'at least one kind of bubble' });
  else if (Math.abs(all - 1) > ROUNDED) {
    const problem = `has shares that add up to ${Number((100 * all).toPrecision(4))} %`;
    found.push({ path, problem, allowed: '100 % together' });
  }
  return found;
}

/** Kinds whose mean does not fit into the gap. */
function fitFindings({ gas: { bubble } }: CaseEntries, panel: Case): PlacedFinding[] {
  const fits_m = fitting_m(panel);
  const remedy =
    'A bubble is let in as a circle and needs two cells of liquid beside it; larger ones form in the channel where bubbles merge';
  const mixed = bubble.mixture !== undefined;
  return panel.gas.bubble.kinds.flatMap(({ diameter_m }, i) => {
    if (diameter_m <= fits_m) return [];
    const path = ['gas', 'bubble', ...(mixed ? ['mixture', i] : []), 'diameter'];
    return [{ path, problem: 'does not fit into the gap', allowed: `at most ${mm(fits_m)}`, remedy }];
  });
}

/** Written places at which a bubble of the mean diameter would stand in a wall. */
function placeFindings({ gas: { across } }: CaseEntries, panel: Case): PlacedFinding[] {
  if (typeof across === 'string') return [];
  const { gap_m } = panel.channel;
  const nearest_m = panel.gas.bubble.diameter_m / 2 + CLEAR_CELLS * gridOf(panel).dx_m;
  return [across].flat().flatMap((at_m, i) => {
    if (at_m >= nearest_m - 1e-12 && at_m <= gap_m - nearest_m + 1e-12) return [];
    const path = ['gas', 'across', ...(Array.isArray(across) ? [i] : [])];
    const remedy = 'left and right stand for as near to that wall as each bubble can be';
    const allowed = `${mm(nearest_m)} to ${mm(gap_m - nearest_m)}`;
    return [{ path, problem: 'puts a bubble of the mean diameter into a wall', allowed, remedy }];
  });
}

/** Bubbles of the start that stand in walls, fins, one another or the band where gas is taken out. */
export function startFindings(panel: Case): PlacedFinding[] {
  const { gas, channel, fins } = panel;
  const { skim } = bandsOf(panel);
  const clear_m = CLEAR_CELLS * gridOf(panel).dx_m;
  return gas.start.flatMap((bubble, i): PlacedFinding[] => {
    const path = ['gas', 'start', i];
    const reach_m = bubble.diameter_m / 2 + clear_m;
    if (2 * reach_m > channel.gap_m + 1e-12) {
      return [{ path: [...path, 'diameter'], problem: 'does not fit into the gap', allowed: `at most ${mm(channel.gap_m - 2 * clear_m)}` }];
    }
    if (bubble.across_m < reach_m - 1e-12 || bubble.across_m > channel.gap_m - reach_m + 1e-12) {
      return [
        { path: [...path, 'across'], problem: 'puts the bubble into a wall', allowed: `${mm(reach_m)} to ${mm(channel.gap_m - reach_m)}` },
      ];
    }
    if (bubble.along_m < reach_m || bubble.along_m > skim.from_m - reach_m) {
      const allowed = `${mm(reach_m)} to ${mm(skim.from_m - reach_m)}`;
      return [
        { path: [...path, 'along'], problem: 'puts the bubble outside the channel or into the band where gas is taken out', allowed },
      ];
    }
    const fin = fins.findIndex((outline) => distanceTo(outline, bubble.across_m, bubble.along_m) < bubble.diameter_m / 2);
    if (fin >= 0) return [{ path, problem: `lies on fin ${fin + 1}`, remedy: 'Move the bubble or make it smaller' }];
    const other = gas.start.findIndex((b, j) => j < i && apart(b, bubble) < (b.diameter_m + bubble.diameter_m) / 2);
    return other < 0 ? [] : [{ path, problem: `overlaps the bubble of entry ${other + 1}`, remedy: 'Move one of them' }];
  });
}

function apart(a: { across_m: number; along_m: number }, b: { across_m: number; along_m: number }): number {
  return Math.hypot(a.across_m - b.across_m, a.along_m - b.along_m);
}
