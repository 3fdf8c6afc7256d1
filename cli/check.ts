import { type Case, type Derived, layOut } from '../cases/index.ts';
import { airMeasures } from '../output/index.ts';
import { count, duration, percent, plain, size } from './numbers.ts';
import { readSource } from './source.ts';
import { type Trial, trial } from './trial.ts';
import { CAUTION, warnings } from './warnings.ts';

/** Bytes of a wall sample of one element: shear in f32 and a mark for gas, both walls. */
const SAMPLE_BYTES = 10;

/** What a run will take. */
interface Forecast {
  cells: number;
  steps: number;
  updates: number;
  updatesPerSecond: number;
  wallTime_s: number;
  memory_bytes: number;
}

/** Reads and checks a case, tries it for half a second, and prints what is to come. */
export async function check({ word, sets, json }: { word: string; sets: string[]; json: boolean }): Promise<void> {
  const { panel, name } = readSource(word, sets);
  const { setup, derived } = layOut(panel);
  const forecast = forecastOf(panel, derived, await trial(panel, setup, derived));
  const bites = warnings(panel, derived);
  if (json)
    process.stdout.write(`${JSON.stringify({ name, title: panel.title, case: panel, derived, forecast, warnings: bites }, null, 2)}\n`);
  else process.stdout.write(`${page(panel, derived, forecast, bites)}\n`);
}

function forecastOf(panel: Case, derived: Derived, { updatesPerSecond, memory_bytes }: Trial): Forecast {
  const cells = derived.nx * derived.ny;
  const updates = cells * derived.steps;
  const samples = Math.ceil(longest_s(panel) / (derived.sampleEvery * derived.dt_s));
  const memory = memory_bytes + samples * derived.nx * SAMPLE_BYTES;
  return { cells, steps: derived.steps, updates, updatesPerSecond, wallTime_s: updates / updatesPerSecond, memory_bytes: memory };
}

function pulseText({ pulse }: Case['gas']): string {
  return pulse === undefined ? '' : ` in the mean; air on ${plain(pulse.on_s)} s and off ${plain(pulse.off_s)} s in turn`;
}

function longest_s({ record }: Case): number {
  return record.until?.atMost_s ?? record.span_s;
}

function spanText({ record: { span_s, until } }: Case): string {
  if (until === undefined) return `${plain(span_s)} s`;
  const sure = until.sure.map(({ name, within }) => `${name} is sure within ${percent(within)}`).join(' and ');
  return `${plain(span_s)} to ${plain(until.atMost_s)} s (until ${sure})`;
}

function page(panel: Case, derived: Derived, forecast: Forecast, bites: string[]): string {
  const { channel, record, gas } = panel;
  const air = airMeasures({ case: panel, derived });
  const energy = air.energy_J_m3 === null ? '' : `, ${plain(air.energy_J_m3 / 3.6e6)} kWh per m3 of permeate`;
  const most = record.until === undefined ? '' : 'at most ';
  const mm = (length_m: number): string => `${plain(1000 * length_m)} mm`;
  const tilt = channel.tilt_rad === 0 ? 'vertical' : `tilted ${plain((180 / Math.PI) * channel.tilt_rad)} deg`;
  const rows: [string, string][] = [
    [
      'channel',
      `${mm(channel.gap_m)} x ${mm(channel.height_m)}, ${tilt}, membranes: ${channel.membranes.join(', ') || 'none'}, fins: ${panel.fins.length}`,
    ],
    [
      'bubbles',
      `${gas.bubble.kinds.map((kind) => mm(kind.diameter_m)).join(' and ')}, ${plain(derived.bubblesPerSecond)} per second, gas velocity ${plain(1000 * derived.gasVelocity_m_s)} mm/s${pulseText(gas)}`,
    ],
    ...(derived.thickest === undefined
      ? []
      : ([
          [
            'liquid',
            `${panel.liquid.kind}, ${plain(1000 * panel.liquid.viscosity_Pa_s)} mPa s at 100 1/s, at most ${plain(1000 * derived.thickest.viscosity_Pa_s)} (below ${plain(derived.thickest.below_1_s, 2)} 1/s)`,
          ],
        ] as [string, string][])),
    ['numbers', `Re ${plain(derived.Re)}, Eo ${plain(derived.Eo)}, Mo ${plain(derived.Mo)}`],
    [
      'grid',
      `${derived.ny} across x ${derived.nx} along = ${count(forecast.cells)} cells of ${mm(derived.dx_m)}, ${plain(derived.cellsPerBubble)} per bubble`,
    ],
    [
      'relaxation',
      `tau ${plain(derived.tauLiquid, 5)} liquid, ${plain(derived.tauGas, 5)} gas, density ratio ${plain(derived.densityRatio)}`,
    ],
    [
      'time',
      `${plain(record.settle_s)} s settling + ${spanText(panel)} recorded = ${most}${count(forecast.steps)} steps of ${plain(1e6 * derived.dt_s)} us`,
    ],
    ['wall samples', `every ${plain(1000 * derived.sampleEvery * derived.dt_s)} ms (${derived.sampleEvery} steps)`],
    ['swept', `above ${plain(panel.swept.above_Pa)} Pa within ${plain(panel.swept.within_s)} s`],
    [
      'air',
      `${plain(3600 * air.supply_m_s)} m3/(m2 h) against ${plain(air.overpressure_Pa / 1000)} kPa, blower ${percent(panel.air.efficiency)}: ${plain(air.power_W_m2)} W/m2${energy}`,
    ],
    ['memory', size(forecast.memory_bytes)],
    [
      'wall time',
      `${most}about ${duration(forecast.wallTime_s)} here, at ${plain(forecast.updatesPerSecond / 1e6)} million cell updates a second`,
    ],
  ];
  const settling = percent(record.settle_s / (record.settle_s + longest_s(panel)), 2);
  const table = rows.map(([name, text]) => `${name.padEnd(13)} ${text}`).join('\n');
  const list = bites.map((text) => `warning: ${text}.`).join('\n');
  return `${panel.title}\n${table}\n${list === '' ? `no warnings; ${settling} of the time is settling` : list}\n${CAUTION}`;
}
