import { OutputError } from '../../solver/index.ts';
import { readAnswers } from '../folder/answers.ts';

/** The answers of a refinement, in the order of its table: those that a designer decides by. */
export const REFINED: readonly string[] = [
  ...['left', 'right', 'together'].map((place) => `swept_${place}`),
  ...['left', 'right'].flatMap((place) => [
    `mean_shear_${place}_Pa`,
    `rms_shear_${place}_Pa`,
    `p95_shear_${place}_Pa`,
    `share_above_${place}`,
  ]),
  'holdup',
  'upflow_m_s',
];

/**
 * The values of {@link REFINED} of a finished run, in that order; null where the run has none.
 * @throws OutputError no summary, not one of ours, or one without such an answer
 */
export async function readRefined(folder: string): Promise<(number | null)[]> {
  const answers = await readAnswers(folder);
  return REFINED.map((name) => {
    const answer = answers.get(name);
    if (answer === undefined) throw new OutputError(folder, `${folder}: the run has no answer ${name}; run the case anew (--again).`);
    return answer.value;
  });
}
