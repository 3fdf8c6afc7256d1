import { join } from 'node:path';
import { OutputError } from '../../solver/index.ts';
import { readWhole } from '../folder/files.ts';

/** One measure that grids are compared by. */
export interface Refined {
  /** as in the tables; ends in its SI unit, a share has none */
  name: string;
  /** which wall; `together`: all membrane walls; `channel`: the whole section */
  place: 'left' | 'right' | 'together' | 'channel';
  /** where it stands in summary.json */
  path: readonly string[];
  /** values it can have */
  range: { least: number; most: number };
}

const SHARE = { least: 0, most: 1 };
const SIZE = { least: 0, most: Number.POSITIVE_INFINITY };
const ANY = { least: Number.NEGATIVE_INFINITY, most: Number.POSITIVE_INFINITY };

/** The measures of a refinement, in the order of its table. */
export const REFINED: readonly Refined[] = [
  ...(['left', 'right'] as const).map((place) => ({ name: 'swept', place, path: ['walls', place, 'swept', 'within'], range: SHARE })),
  { name: 'swept', place: 'together', path: ['together', 'within'], range: SHARE },
  ...(['left', 'right'] as const).flatMap((place) => [
    { name: 'mean_abs_Pa', place, path: ['walls', place, 'shear', 'meanAbs_Pa'], range: SIZE },
    { name: 'rms_Pa', place, path: ['walls', place, 'shear', 'rms_Pa'], range: SIZE },
    { name: 'p95_Pa', place, path: ['walls', place, 'shear', 'percentiles_Pa', 'p95'], range: SIZE },
    { name: 'share_above', place, path: ['walls', place, 'shear', 'shareAbove'], range: SHARE },
  ]),
  { name: 'holdup', place: 'channel', path: ['loop', 'holdup'], range: SHARE },
  { name: 'upflow_m_s', place: 'channel', path: ['loop', 'upflow_m_s'], range: ANY },
];

/**
 * The values of {@link REFINED} that stand in the summary.json of a finished run, in that order; null where the run has none.
 * @throws OutputError no summary, or not one of ours
 */
export async function readAnswers(folder: string): Promise<(number | null)[]> {
  const path = join(folder, 'summary.json');
  const bytes = await readWhole(path);
  if (bytes === undefined) throw new OutputError(path, `${path}: there is no such file; run the case in this folder to its end.`);
  let content: unknown;
  try {
    content = JSON.parse(bytes.toString('utf8'));
  } catch (cause) {
    throw new OutputError(path, `${path}: this is no JSON; run the case anew (--again).`, { cause });
  }
  return REFINED.map((measure) => {
    const value = measure.path.reduce<unknown>((inner, key) => entry(inner, key), content);
    if (value === null || (typeof value === 'number' && Number.isFinite(value))) return value;
    throw new OutputError(path, `${path}: ${measure.path.join('.')} is no number; run the case anew (--again).`);
  });
}

function entry(inner: unknown, key: string): unknown {
  return typeof inner === 'object' && inner !== null && key in inner ? (inner as Record<string, unknown>)[key] : undefined;
}
