/** What the table of keys cannot see: one part of a case against another. Runs only on a case whose single values are sound. */
import { bandsOf, gridOf, stepsOf } from './bands.ts';
import type { Case } from './case.ts';
import type { PlacedFinding } from './faults.ts';
import { finFindings } from './fincheck.ts';
import type { PlacedFin } from './fins.ts';
import { gasFindings, startFindings } from './gascheck.ts';
import type { CaseEntries } from './schema.ts';
import { mm } from './units.ts';
import { untilFindings } from './until.ts';

/** Most cells of a grid, and most wall values of a recording (5 bytes each). */
const MOST_CELLS = 2e7;
const MOST_WALL_VALUES = 4e8;

/** Longest relaxation time: the solver takes viscous forces explicitly and refuses a lattice viscosity above 0.16, tau 0.98. */
const LONGEST_TAU = 0.98;

/** Every contradiction within a case. */
export function contradictions(entries: CaseEntries, panel: Case, fins: readonly PlacedFin[]): PlacedFinding[] {
  const single = [
    ...channelFindings(entries),
    ...recordFindings(panel),
    ...untilFindings(entries.record),
    ...gasFindings(entries, panel),
    ...sizeFindings(panel),
  ];
  if (single.length > 0) return single;
  const bands = bandFindings(panel);
  return bands.length > 0 ? bands : [...finFindings(entries, panel, fins), ...startFindings(panel)];
}

function channelFindings({ channel }: CaseEntries): PlacedFinding[] {
  const found: PlacedFinding[] = [];
  const path = ['channel', 'membranes'];
  if (channel.membranes.length === 0) found.push({ path, problem: 'is empty', allowed: 'left, right or both' });
  if (new Set(channel.membranes).size < channel.membranes.length)
    found.push({ path, problem: 'names a wall twice', allowed: 'left, right or both' });
  const { loss, upflow } = channel.return;
  if ((loss === undefined) === (upflow === undefined)) {
    const problem = loss === undefined ? 'says neither loss nor upflow' : 'says both loss and upflow';
    found.push({
      path: ['channel', 'return'],
      problem,
      allowed: 'one of loss, upflow',
      remedy: 'Write {loss: 1.5} for a tank, {upflow: 0.1 m/s} for a pump, {upflow: 0 m/s} for no loop flow',
    });
  }
  return found;
}

function recordFindings({ record, swept }: Case): PlacedFinding[] {
  const found: PlacedFinding[] = [];
  const most = `at most the span, ${Number(record.span_s.toPrecision(4))} s`;
  if (record.every_s > record.span_s) found.push({ path: ['record', 'every'], problem: 'is longer than the time recorded', allowed: most });
  if (swept.within_s > record.span_s * (1 + 1e-9)) {
    found.push({
      path: ['swept', 'within'],
      problem: 'is longer than the time recorded',
      allowed: most,
      remedy: 'Shorten it, or record a longer span',
    });
  }
  return found;
}

function sizeFindings(panel: Case): PlacedFinding[] {
  const { nx, ny, dx_m, dt_s } = gridOf(panel);
  const { span, sampleEvery } = stepsOf(panel);
  const found: PlacedFinding[] = [];
  if (nx * ny > MOST_CELLS) {
    const most = Math.floor(Math.sqrt((MOST_CELLS * panel.channel.gap_m) / panel.channel.height_m));
    found.push({ path: ['grid', 'across'], problem: `makes a grid of ${nx * ny} cells`, allowed: `at most ${most} for this channel` });
  }
  if (found.length === 0 && (span / sampleEvery) * nx > MOST_WALL_VALUES) {
    const least_ms = (1000 * span * dt_s * nx) / MOST_WALL_VALUES;
    const allowed = `at least ${Number(least_ms.toPrecision(3))} ms for this span and grid`;
    found.push({
      path: ['record', 'every'],
      problem: 'makes a recording too large to hold',
      allowed,
      remedy: 'Sample less often or record a shorter span',
    });
  }
  const tau = (nu: number): number => 0.5 + (3 * nu * dt_s) / dx_m ** 2;
  const tauLiquid = tau(panel.liquid.viscosity_Pa_s / panel.liquid.density_kg_m3);
  const tauGas = tau(panel.gas.viscosity_Pa_s / panel.gas.density_kg_m3);
  if (Math.max(tauLiquid, tauGas) > LONGEST_TAU) {
    const factor = (Math.max(tauLiquid, tauGas) - 0.5) / (LONGEST_TAU - 0.5);
    const allowed = `at least ${Number((factor * panel.grid.speed_m_s).toPrecision(3))} m/s for these fluids and cells`;
    found.push({
      path: ['grid', 'speed'],
      problem: 'makes the time step too long for the viscosity',
      allowed,
      remedy: 'Raise it, or take fewer cells across',
    });
  }
  return found;
}

function bandFindings(panel: Case): PlacedFinding[] {
  const { release, skim } = bandsOf(panel);
  const bands_m = release.to_m + skim.to_m - skim.from_m;
  if (bands_m <= 0.6 * skim.to_m) return [];
  const problem = `leaves too little between the band where gas is let in (${mm(release.to_m)}) and the one where it is taken out (${mm(skim.to_m - skim.from_m)})`;
  return [
    {
      path: ['channel', 'height'],
      problem,
      allowed: `at least ${mm(bands_m / 0.6)}`,
      remedy: 'Make the channel higher, the bubbles smaller or grid.speed larger',
    },
  ];
}
