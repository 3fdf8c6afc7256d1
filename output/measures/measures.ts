import type { Recording, WallSide } from '../../cases/index.ts';
import { type AirMeasures, airMeasures } from './air.ts';
import { type Answer, answersOf, type Place, type Places } from './answers.ts';
import { type BackTransportMeasures, backTransport } from './backtransport.ts';
import { type DepositMeasures, depositOn } from './deposit.ts';
import { type ElementRow, elementRows } from './elements.ts';
import { type Felt, felt } from './felt.ts';
import { type Histogram, shearHistogram } from './histogram.ts';
import { type LoopMeasures, loopMeasures } from './loop.ts';
import { type ShearStatistics, shearStatistics } from './shear.ts';
import { clip, layWall, type Surface } from './surface.ts';
import { type Swept, sweptFraction, sweptTogether, windowSamples } from './swept.ts';

/** The answers of one recording. Shares are dimensionless, 0 to 1; null: not to be had from this recording, see `notes`. */
export interface Measures {
  /** false while the asked span is not fully recorded */
  complete: boolean;
  /** headline measures with their 95 % intervals; the same names in every run */
  answers: Answer[];
  recorded: { samples: number; from_s: number | null; to_s: number | null; every_s: number };
  /** what swept means here */
  swept: { above_Pa: number; within_s: number };
  walls: Record<WallSide, WallMeasures>;
  /** the walls that carry a membrane, as one surface */
  together: Swept;
  /** gas and liquid going round */
  loop: LoopMeasures;
  /** what the air costs */
  air: AirMeasures;
  /** an estimate, from the shear of each wall and of the membrane walls together */
  backTransport: Record<Place, BackTransportMeasures>;
  /** null where the case asks for none */
  deposit: Record<Place, DepositMeasures | null>;
  /** one row per element, left wall first; bands included */
  elements: ElementRow[];
  /** what a reader must know about these numbers */
  notes: string[];
}

export interface WallMeasures {
  /** carries a membrane; a plain wall is measured all the same, over the same height */
  membrane: boolean;
  /** between the bands: those that count, and those a fin covers */
  elements: { open: number; underFin: number };
  shear: ShearStatistics;
  histogram: Histogram;
  swept: Swept;
}

/** All measures of a recording. Pure: the recording is not changed. */
export function measure(recording: Recording): Measures {
  const asked = recording.case.swept;
  const surfaces = { left: layWall(recording, 'left'), right: layWall(recording, 'right') };
  const places = placesOf(recording, surfaces);
  const each = <T>(of: (walls: readonly Felt[]) => T): Record<Place, T> => ({
    left: of(places.left),
    right: of(places.right),
    together: of(places.together),
  });
  const walls = { left: measureWall(recording, places.left[0]), right: measureWall(recording, places.right[0]) };
  const { membranes } = recording.case.channel;
  const times = recording.times_s;
  return {
    complete: recording.complete,
    answers: answersOf(recording, places),
    recorded: {
      samples: times.length,
      from_s: times.length === 0 ? null : times[0],
      to_s: times.length === 0 ? null : times[times.length - 1],
      every_s: recording.derived.sampleEvery * recording.derived.dt_s,
    },
    swept: { above_Pa: asked.above_Pa, within_s: asked.within_s },
    walls,
    together: sweptTogether(membranes.map((side) => walls[side].swept)),
    loop: loopMeasures(recording),
    air: airMeasures(recording),
    backTransport: each((walls) => backTransport(walls, recording.case)),
    deposit: each((walls) => depositOn(walls, recording.case)),
    elements: [...elementRows(recording, surfaces.left), ...elementRows(recording, surfaces.right)],
    notes: notes(recording, walls),
  };
}

function placesOf(recording: Recording, surfaces: Record<WallSide, Surface>): Places {
  const between = (side: WallSide): Felt => felt(clip(surfaces[side], recording.membrane));
  const walls = { left: between('left'), right: between('right') };
  return { left: [walls.left], right: [walls.right], together: recording.case.channel.membranes.map((side) => walls[side]) };
}

function measureWall({ case: { swept } }: Recording, wall: Felt): WallMeasures {
  const { membrane, elements, covered } = wall.surface;
  return {
    membrane,
    elements: { open: elements.length, underFin: covered },
    shear: shearStatistics(wall, swept),
    histogram: shearHistogram(wall.sorted_Pa()),
    swept: sweptFraction(wall.surface, swept),
  };
}

function notes(recording: Recording, walls: Record<WallSide, WallMeasures>): string[] {
  const found: string[] = [];
  const { case: panel, derived, times_s } = recording;
  const every_s = derived.sampleEvery * derived.dt_s;
  const held_s = times_s.length * every_s;
  if (!recording.complete) {
    found.push(
      `The recording is not complete: ${seconds(held_s)} of ${seconds(panel.record.span_s)} are recorded. Run it to its end before using the numbers.`,
    );
  }
  if (times_s.length === 0) {
    found.push('No wall sample was recorded: every wall measure is empty. Record beyond the settling time (record.settle, record.span).');
  } else if (windowSamples(panel.swept.within_s, every_s) > times_s.length) {
    found.push(
      `The recording of ${seconds(held_s)} is shorter than the window of ${seconds(panel.swept.within_s)} asked for the swept fraction, which is therefore empty; ` +
        'the fraction over the whole recording is given. Lengthen record.span or shorten swept.within.',
    );
  } else if (held_s < 2 * panel.swept.within_s) {
    found.push(
      `The recording of ${seconds(held_s)} holds fewer than two separate windows of ${seconds(panel.swept.within_s)}: the swept fraction may change much with a longer record.span.`,
    );
  }
  for (const side of ['left', 'right'] as const) {
    const { open, underFin } = walls[side].elements;
    if (underFin > 0)
      found.push(`The ${side} wall has ${underFin} of ${open + underFin} elements under fins; they are left out of every measure.`);
  }
  if (panel.gas.softened) {
    found.push(
      `The gas is softened: computed with ${panel.gas.density_kg_m3} kg/m3 and ${panel.gas.viscosity_Pa_s} Pa s instead of air at ` +
        `${panel.gas.airDensity_kg_m3.toPrecision(3)} kg/m3; the buoyancy is that of real air.`,
    );
  }
  return found;
}

function seconds(value_s: number): string {
  return `${Number(value_s.toPrecision(4))} s`;
}
