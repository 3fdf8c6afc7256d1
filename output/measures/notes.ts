import { type Recording, SLUDGE_CAUTION, type WallSide } from '../../cases/index.ts';
import type { Answer } from './answers.ts';
import type { Basis } from './passages.ts';
import type { Sureness } from './sure.ts';
import { windowSamples } from './swept.ts';

/** Answers without an interval that a note names; the others are counted. */
const NAMED = 6;

/** What notes are made from, beside the recording. */
interface Noted {
  answers: readonly Answer[];
  basis: Basis;
  recorded: { samples: number; ended: Recording['ended']; until: readonly Sureness[] };
  walls: Record<WallSide, { elements: { open: number; underFin: number } }>;
}

/** Passages of bubbles below which a recording is called short: then single ones decide. `check` warns of as many. */
const FEW_PASSAGES = 20;

/** What a reader must know about the measures of a recording. */
export function notesOn(recording: Recording, measures: Noted): string[] {
  return [...lengthNotes(recording), ...sureNotes(measures), ...finNotes(measures), ...fluidNotes(recording)];
}

function lengthNotes(recording: Recording): string[] {
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
  return found;
}

/** How sure the numbers are, and why some may not be. */
function sureNotes({ answers, basis, recorded }: Noted): string[] {
  const found: string[] = [];
  if (recorded.samples === 0) return found;
  const { passages, independent } = basis;
  if (passages.together < FEW_PASSAGES) {
    const worth = independent.together === null ? '' : `, worth about ${Math.round(independent.together)} independent moments`;
    found.push(
      `Too short to be sure: ${passages.together} ${passages.together === 1 ? 'bubble' : 'bubbles'} passed the middle of the membrane while it was ` +
        `recorded${worth}. Single passages decide, and the intervals cannot know of what did not occur: lengthen record.span, or run several gas.seed.`,
    );
  }
  const untold = answers.filter(({ value, low }) => value !== null && low === null).map(({ name }) => name);
  if (untold.length > 0) {
    const named = untold.slice(0, NAMED).join(', ') + (untold.length > NAMED ? ` and ${untold.length - NAMED} more` : '');
    found.push(`No interval can be told for ${named}: never changed, or changed too slowly for a recording of this length.`);
  }
  if (recorded.ended === 'atMost') {
    const missed = recorded.until.filter(({ within, reached }) => reached === null || reached > within);
    for (const { name, within, reached } of missed) {
      const came = reached === null ? 'its interval cannot be told' : `it is sure within ${percent(reached)}`;
      found.push(
        `${name} was to be sure within ${percent(within)}, but ${came} at the end of record.at most. Record longer, or ask for less.`,
      );
    }
  }
  return found;
}

function finNotes({ walls }: Noted): string[] {
  const found: string[] = [];
  for (const side of ['left', 'right'] as const) {
    const { open, underFin } = walls[side].elements;
    if (underFin > 0)
      found.push(`The ${side} wall has ${underFin} of ${open + underFin} elements under fins; they are left out of every measure.`);
  }
  return found;
}

function fluidNotes({ case: panel }: Recording): string[] {
  const found: string[] = [];
  if (panel.liquid.kind === 'sludge') found.push(`Caution: ${SLUDGE_CAUTION}.`);
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

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(2))} %`;
}
