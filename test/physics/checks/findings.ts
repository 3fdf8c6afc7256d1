/**
 * What published work and practice say of scoured channels, as signs and orders: whole cases in SI run through reading, simulation and
 * measures, as `swathe run` does. The flow is a plane section on a coarse grid, so levels are not compared.
 * - More air gains, then less and less (Ndinisa, Fane & Wiley 2006, Sep. Sci. Technol. 41, 1383 [L]; common practice).
 * - In a panel tilted by 20 deg the gas rides along the wall above it, which gains shear (common practice).
 * - Fins that throw the bubbles to one wall raise that wall's shear and drive a secondary flow on the other (common practice).
 * - A gap of 14 mm instead of 7 mm at the same air loses (Ndinisa et al. 2006 [L]).
 *
 * Each is a sum of runs with weights, such as tilted less upright, taken seed by seed: both saw the same bubbles let in. The interval is
 * that of the mean over the seeds.
 */
import { readCase, simulate } from '../../../cases/index.ts';
import { pooled } from '../../../output/compare/pooled.ts';
import { measure } from '../../../output/index.ts';
import { ANY } from '../../../output/measures/estimate.ts';
import { type Check, finding, type Row } from '../row.ts';

/** What differs between the channels; the rest is the same in all. */
interface Panel {
  gap_mm?: number;
  tilt_deg?: number;
  fins?: keyof typeof FINS;
  /** per membrane area, m3/(m2 h) */
  supply?: number;
}

/** Lengths of a recording, s, and the seeds it is run with. */
interface Extent {
  settle_s: number;
  span_s: number;
  seeds: readonly number[];
}

/** Short, so that all of them take six minutes of one core; some eight bubbles pass in each at 0.1 m3/(m2 h). */
const EXTENT: Extent = { settle_s: 0.5, span_s: 1.4, seeds: [1, 2, 3, 4] };

/** Cells in a millimetre. */
const CELLS_mm = 3;

/** Two on the left side that throw the bubbles to the right: ramps that stand on the wall, or bars held off it whose upper ends lean over. */
const FINS = {
  ramps: 'fins: [{outline: [[-1 mm, 16 mm], [3.5 mm, 21 mm], [-1 mm, 22 mm]], pitch: 18 mm, count: 2}]\n',
  bars: 'fins: [{from: 18 mm, pitch: 18 mm, count: 2, across: 2.4 mm, length: 4 mm, thickness: 0.8 mm, angle: 30 deg}]\n',
};

function textOf({ gap_mm = 8, tilt_deg = 0, fins, supply = 0.1 }: Panel, { settle_s, span_s }: Extent, seed: number): string {
  return `title: Published findings
channel: {gap: ${gap_mm} mm, height: 60 mm, tilt: ${tilt_deg} deg, membranes: [left, right], return: {loss: 2}}
${fins === undefined ? '' : FINS[fins]}liquid: {kind: water, temperature: 20 degC}
gas: {supply: ${supply} m3/(m2 h), serves: 1 m, bubble: {diameter: 3.5 mm, spread: 15 %}, across: even, seed: ${seed}}
grid: {across: ${gap_mm * CELLS_mm}, speed: 0.3 m/s}
record: {settle: ${settle_s} s, span: ${span_s} s, every: 2 ms}
swept: {above: 0.5 Pa, within: 0.25 s}
`;
}

type Terms = readonly (readonly [weight: number, panel: Panel])[];
type Answers = Map<string, number>;

/** Runs of panels, each once however often it is asked for. */
class Runs {
  readonly extent: Extent;
  readonly #known = new Map<string, Promise<Answers>>();

  constructor(extent: Extent) {
    this.extent = extent;
  }

  #answers(panel: Panel, seed: number): Promise<Answers> {
    const text = textOf(panel, this.extent, seed);
    const known = this.#known.get(text) ?? answersOf(text);
    this.#known.set(text, known);
    return known;
  }

  /** The weighted sum of an answer over panels, one value per seed. */
  async sums(answer: string, terms: Terms): Promise<number[]> {
    const found: number[] = [];
    for (const seed of this.extent.seeds) {
      let sum = 0;
      for (const [weight, panel] of terms) sum += weight * ((await this.#answers(panel, seed)).get(answer) ?? Number.NaN);
      found.push(sum);
    }
    return found;
  }
}

async function answersOf(text: string): Promise<Answers> {
  const { answers } = measure(await simulate(readCase(text, 'finding', [])));
  return new Map(answers.map(({ name, value }) => [name, value ?? Number.NaN]));
}

interface Asked {
  quantity: string;
  source: string;
  /** of the sum, by the source */
  sign: 1 | -1;
  answer: string;
  unit: string;
  terms: Terms;
}

const NDINISA = 'Ndinisa, Fane & Wiley 2006 [L]';
const PRACTICE = 'common practice';

/** Answers for both walls together, and for the right one: the upper of a tilted panel, and the one the fins aim at. */
const TOGETHER = [
  { word: 'mean shear', answer: 'mean_shear_together_Pa', unit: 'Pa' },
  { word: 'share swept', answer: 'swept_together', unit: '' },
];
const RIGHT = [
  { word: 'mean shear', answer: 'mean_shear_right_Pa', unit: 'Pa' },
  { word: 'share swept', answer: 'swept_right', unit: '' },
];

/** The wall the fins are held near: a secondary flow goes along it. */
const LEFT = { word: 'mean shear', answer: 'mean_shear_left_Pa', unit: 'Pa' };

const less = (one: Panel, other: Panel): Terms => [
  [1, one],
  [-1, other],
];

/** The gain from one supply to a higher one, per m3/(m2 h). */
const gain = (from: number, to: number): Terms =>
  less({ supply: to }, { supply: from }).map(([sign, panel]) => [sign / (to - from), panel]);

const reversed = (terms: Terms): Terms => terms.map(([weight, panel]) => [-weight, panel]);

/** Findings by the check they stand under. */
const FINDINGS: Readonly<Record<string, readonly Asked[]>> = {
  'finding-supply': TOGETHER.flatMap(({ word, ...what }): Asked[] => {
    const part = { ...what, source: NDINISA };
    const per = `${word} gained per m3/(m2 h)`;
    return [
      { ...part, quantity: `${per}, 0.05 to 0.2`, sign: 1, terms: gain(0.05, 0.2) },
      {
        ...part,
        quantity: `${per}, 0.2 to 0.8, less that from 0.05 to 0.2`,
        sign: -1,
        terms: [...gain(0.2, 0.8), ...reversed(gain(0.05, 0.2))],
      },
      {
        ...part,
        quantity: `${per}, 0.4 to 0.8, less that from 0.1 to 0.2`,
        sign: -1,
        terms: [...gain(0.4, 0.8), ...reversed(gain(0.1, 0.2))],
      },
    ];
  }),
  'finding-tilt': RIGHT.map(({ word, ...what }) => ({
    ...{ ...what, quantity: `${word} of the upper wall, tilt 20 deg less upright`, source: PRACTICE, sign: 1 },
    terms: less({ tilt_deg: 20 }, {}),
  })),
  'finding-fins': (['ramps', 'bars'] as const).flatMap((fins) =>
    [...RIGHT, LEFT].map(({ word, ...what }): Asked => {
      const wall = what.answer === LEFT.answer ? 'other' : 'aimed';
      const quantity = `${word} of the ${wall} wall, ${fins} less plain`;
      return { ...what, quantity, source: PRACTICE, sign: 1, terms: less({ fins }, {}) };
    }),
  ),
  'finding-gap': TOGETHER.map(({ word, ...what }) => ({
    ...{ ...what, quantity: `${word}, gap 14 mm less 7 mm`, source: NDINISA, sign: -1 },
    terms: less({ gap_mm: 14 }, { gap_mm: 7 }),
  })),
};

/** The rows of one of the findings, or the first few of them. */
export async function rowsOf(check: string, extent: Extent, first = Number.POSITIVE_INFINITY): Promise<Row[]> {
  const runs = new Runs(extent);
  const rows: Row[] = [];
  for (const { quantity, source, sign, answer, unit, terms } of FINDINGS[check].slice(0, first)) {
    const values = await runs.sums(answer, terms);
    const { value, low, high } = pooled(
      values.map((sum, n) => ({ seed: extent.seeds[n], value: sum, low: null, high: null })),
      ANY,
    );
    const seen = { value, low: low ?? Number.NEGATIVE_INFINITY, high: high ?? Number.POSITIVE_INFINITY };
    rows.push(finding({ check, quantity, source, sign, seen, unit, grid: `${values.length} seeds` }));
  }
  return rows;
}

export const findingChecks: readonly Check[] = Object.keys(FINDINGS).map((name) => ({ name, run: () => rowsOf(name, EXTENT) }));
