import type { Recording, WallSide } from '../../cases/index.ts';
import { type AirMeasures, airMeasures } from './air.ts';
import { type Answer, answersOf } from './answers.ts';
import { type BackTransportMeasures, backTransport } from './backtransport.ts';
import { type DepositMeasures, depositOn } from './deposit.ts';
import { type ElementRow, elementRows } from './elements.ts';
import { type Felt, type Place, placesOf } from './felt.ts';
import { type FinForce, finForces } from './finforce.ts';
import { type Histogram, shearHistogram } from './histogram.ts';
import { type LoopMeasures, loopMeasures } from './loop.ts';
import { notesOn } from './notes.ts';
import { type Basis, basisOf } from './passages.ts';
import { type ShearStatistics, shearStatistics } from './shear.ts';
import { type Sureness, sureness } from './sure.ts';
import { layWall } from './surface.ts';
import { type Swept, sweptFraction, sweptTogether } from './swept.ts';

/** The answers of one recording. Shares are dimensionless, 0 to 1; null: not to be had from this recording, see `notes`. */
export interface Measures {
  /** false while the asked span is not fully recorded */
  complete: boolean;
  /** headline measures with their 95 % intervals; the same names in every run */
  answers: Answer[];
  recorded: {
    samples: number;
    from_s: number | null;
    to_s: number | null;
    every_s: number;
    ended: Recording['ended'];
    /** what the recording was to go on for */
    until: Sureness[];
  };
  /** what the numbers rest on */
  basis: Basis;
  /** what swept means here */
  swept: { above_Pa: number; within_s: number };
  walls: Record<WallSide, WallMeasures>;
  /** the walls that carry a membrane, as one surface */
  together: Swept;
  /** one per fin of the case */
  fins: FinForce[];
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
  const answers = answersOf(recording, places);
  const measures = {
    complete: recording.complete,
    answers,
    recorded: {
      samples: times.length,
      from_s: times.length === 0 ? null : times[0],
      to_s: times.length === 0 ? null : times[times.length - 1],
      every_s: recording.derived.sampleEvery * recording.derived.dt_s,
      ended: recording.ended,
      until: sureness(recording.case, (name) => find(answers, name)),
    },
    basis: basisOf(recording, places),
    swept: { above_Pa: asked.above_Pa, within_s: asked.within_s },
    walls,
    together: sweptTogether(membranes.map((side) => walls[side].swept)),
    fins: finForces(recording),
    loop: loopMeasures(recording),
    air: airMeasures(recording),
    backTransport: each((walls) => backTransport(walls, recording.case)),
    deposit: each((walls) => depositOn(walls, recording.case)),
    elements: [...elementRows(recording, surfaces.left), ...elementRows(recording, surfaces.right)],
  };
  return { ...measures, notes: notesOn(recording, measures) };
}

function find(answers: readonly Answer[], name: string): Answer {
  const found = answers.find((answer) => answer.name === name);
  if (found === undefined) throw new Error(`no answer is called ${name}`);
  return found;
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
