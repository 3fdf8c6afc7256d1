import type { Recording } from '../../cases/index.ts';
import type { DepositMeasures } from '../measures/deposit.ts';
import { meanOf } from '../measures/estimate.ts';
import type { Measures, WallMeasures } from '../measures/measures.ts';
import type { Swept } from '../measures/swept.ts';

/** What every reader of results has to bear in mind. */
const CAUTIONS = [
  'For screening and ranking of geometries only. Confirm by a bench trial before anything is built or changed.',
  'Compressed air, cleaning chemicals and the lifting of modules can hurt people: local codes and licensed practice come first.',
];

/** What the numbers do not hold. */
const LEFT_OUT = [
  'Plane section: bubbles are as wide as the sheet, liquid cannot pass beside them; they rise slower than real ones and absolute shear is indicative.',
  'No sludge chemistry, no cake, no permeation through the membrane.',
  'Release and skim bands, the settling time and wall elements under fins count in no wall measure.',
];

/** summary.json: the answers of a run in short; curves and single elements are in the tables. */
export function summary(recording: Recording, measures: Measures): string {
  const { left, right } = measures.walls;
  const content = {
    title: recording.case.title,
    complete: measures.complete,
    answers: Object.fromEntries(measures.answers.map(({ name, value, low, high }) => [name, { value, low, high }])),
    recorded: measures.recorded,
    basis: measures.basis,
    swept: measures.swept,
    walls: { left: wallSummary(left), right: wallSummary(right) },
    together: sweptSummary(measures.together),
    fins: measures.fins,
    loop: measures.loop,
    air: measures.air,
    backTransport: backTransportSummary(recording, measures),
    deposit: depositSummary(recording, measures),
    derived: recording.derived,
    notes: measures.notes,
    leftOut: LEFT_OUT,
    cautions: CAUTIONS,
  };
  return `${JSON.stringify(content, null, 2)}\n`;
}

function backTransportSummary({ case: { particles } }: Recording, { backTransport: { left, right, together } }: Measures): object {
  const kind = 'estimate by the formulas of Belfort, Davis & Zydney 1994, mean over the recorded shear; least total over all radii';
  return { kind, ...particles, worst: { left: left.worst, right: right.worst, together: together.worst } };
}

function depositSummary({ case: { deposit } }: Recording, { deposit: of }: Measures): object | null {
  if (deposit === undefined) return null;
  const ends = (covered: DepositMeasures | null): object => ({
    atEnd: covered?.fromStart.at(-1) ?? null,
    settled: covered === null || covered.settled.length === 0 ? null : meanOf(covered.settled),
  });
  const kind = 'first-order covering and clearing above a threshold; a model of ours with the figures of the case';
  return { kind, ...deposit, left: ends(of.left), right: ends(of.right), together: ends(of.together) };
}

function wallSummary({ membrane, elements, shear, swept }: WallMeasures): object {
  return { membrane, elements, swept: sweptSummary(swept), shear };
}

function sweptSummary({ elements, within, whole, touched }: Swept): object {
  return { elements, within, whole, touched };
}
