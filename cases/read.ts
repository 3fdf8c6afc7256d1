/** Case text to Case: parse, hold against the table of keys, fill in what follows from fluids, check part against part. */
import { CaseError } from '../solver/index.ts';
import type { Case } from './case.ts';
import { contradictions } from './checks.ts';
import { findings, placed } from './faults.ts';
import { finOutlines, type PlacedFin } from './fins.ts';
import { waterDensity_kg_m3, waterSurfaceTension_N_m, waterViscosity_Pa_s } from './fluids.ts';
import { gasOf } from './gas.ts';
import { type CaseEntries, readEntries } from './schema.ts';
import { type CaseTree, parseTree, plain } from './text.ts';
import { apparentViscosity_Pa_s, sludge, TYPICAL_RATE_1_s } from './thinning.ts';
import { untilOf } from './until.ts';

/** Permeate flux of a deposit where the case tells none: 20 L/(m2 h), common practice. */
const FLUX_m_s = 20 / 3.6e6;

/**
 * Reads the text of a case file.
 * @param file name shown in messages
 * @param sets overrides, each `path=value`
 * @throws CaseError that carries every fault found
 */
export function readCase(text: string, file: string, sets: readonly string[] = []): Case {
  const tree = parseTree(text, file, sets);
  return caseFrom(plain(tree.document.contents), tree);
}

/**
 * The case that plain entries make.
 * @param tree where messages say the entries stand
 * @throws CaseError that carries every fault found
 */
export function caseFrom(entries: unknown, tree: CaseTree): Case {
  const read = readEntries(entries);
  if (!read.success) throw new CaseError(findings(read.error.issues, entries).map((found) => placed(tree, entries, found)));
  const fins = finsOf(read.data);
  const panel = resolve(read.data, fins);
  const wrong = contradictions(read.data, panel, fins);
  if (wrong.length > 0) throw new CaseError(wrong.map((found) => placed(tree, entries, found)));
  return panel;
}

function finsOf({ fins, channel }: CaseEntries): PlacedFin[] {
  return fins.flatMap((fin, entry) => finOutlines(fin, channel.gap).map((outline) => ({ outline, entry })));
}

function resolve(entries: CaseEntries, fins: readonly PlacedFin[]): Case {
  const { title, channel, gas, grid, record, swept, air, particles } = entries;
  const { loss, upflow } = channel.return;
  return {
    title,
    channel: {
      gap_m: channel.gap,
      height_m: channel.height,
      tilt_rad: channel.tilt,
      membranes: channel.membranes,
      return: upflow === undefined ? { loss: loss ?? 0 } : { upflow_m_s: upflow },
    },
    fins: fins.map(({ outline }) => outline),
    ...liquidOf(entries),
    contactAngle_rad: channel.wetting,
    gas: gasOf(entries),
    grid: { across: grid.across, speed_m_s: grid.speed },
    record: { settle_s: record.settle, span_s: record.span, every_s: record.every, ...untilOf(record) },
    swept: { above_Pa: swept.above, within_s: swept.within ?? Math.min(1, record.span) },
    air: {
      depth_m: air.depth,
      losses_m: air.losses,
      efficiency: air.efficiency,
      inlet_K: air.inlet,
      ...(air.flux === undefined ? {} : { flux_m_s: air.flux }),
    },
    particles: { length_m: particles.length ?? gas.serves ?? channel.height, wallToBulk: particles['wall to bulk'] },
    ...depositOf(entries),
  };
}

function depositOf({ deposit, swept, air }: CaseEntries): Pick<Case, 'deposit'> {
  if (deposit === undefined) return {};
  const { flux = air.flux ?? FLUX_m_s, solids, layer, above = swept.above, clears, start } = deposit;
  return { deposit: { flux_m_s: flux, solids_kg_m3: solids, layer_kg_m2: layer, above_Pa: above, clears_s: clears, start } };
}

function liquidOf({ liquid }: CaseEntries): Pick<Case, 'liquid' | 'surfaceTension_N_m'> {
  const { kind, temperature: temperature_K } = liquid;
  if (kind === 'custom') {
    const { density: density_kg_m3, viscosity: viscosity_Pa_s } = liquid;
    return { liquid: { kind, temperature_K, density_kg_m3, viscosity_Pa_s }, surfaceTension_N_m: liquid['surface tension'] };
  }
  const water_kg_m3 = waterDensity_kg_m3(temperature_K);
  const water_Pa_s = waterViscosity_Pa_s(temperature_K, water_kg_m3);
  const surfaceTension_N_m = waterSurfaceTension_N_m(temperature_K);
  if (kind === 'water')
    return { liquid: { kind, temperature_K, density_kg_m3: water_kg_m3, viscosity_Pa_s: water_Pa_s }, surfaceTension_N_m };
  const law =
    kind === 'sludge'
      ? { ...sludge(liquid.solids), yieldStress_Pa: 0 }
      : { consistency_Pa_sn: liquid.consistency, index: liquid.index, yieldStress_Pa: liquid['yield stress'] };
  const rheology = { ...law, least_Pa_s: water_Pa_s };
  const viscosity_Pa_s = apparentViscosity_Pa_s(rheology, TYPICAL_RATE_1_s);
  const density_kg_m3 = kind === 'sludge' ? water_kg_m3 : liquid.density;
  return { liquid: { kind, temperature_K, density_kg_m3, viscosity_Pa_s, rheology }, surfaceTension_N_m };
}
