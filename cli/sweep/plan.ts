import { existsSync, statSync } from 'node:fs';
import { basename, dirname, join, resolve } from 'node:path';
import { galleryNames, type Plan, readPlan } from '../../cases/index.ts';
import type { SweepTexts } from '../../output/index.ts';
import { UsageError } from '../../solver/index.ts';
import { caseSource, readText } from '../source.ts';

/** A plan as the command line names it: a file, or the folder of a sweep that was begun. */
export interface PlanSource {
  plan: Plan;
  texts: SweepTexts;
  /** where the sweep is, or shall be */
  folder: string;
}

/**
 * @param out folder asked for; else that of the sweep itself, or runs/<name of the plan>
 * @throws UsageError nothing answers the name, CaseError for what stands in it
 */
export async function readPlanSource(word: string, out: string | undefined): Promise<PlanSource> {
  if (existsSync(word) && statSync(word).isDirectory()) {
    const { SweepFolder } = await import('../../output/index.ts');
    const texts = await SweepFolder.texts(word);
    if (texts === undefined) throw new UsageError('plan', `${word} is a folder without a sweep in it; give a plan file`);
    if (out !== undefined) throw new UsageError('out', `--out ${out}: ${word} is a sweep that has its folder; leave --out out`);
    const plan = await readPlan(texts.plan, join(word, 'plan.yaml'), () => ({ text: texts.base, file: join(word, 'base.yaml') }));
    return { plan, texts, folder: resolve(word) };
  }
  if (!existsSync(word)) {
    const hint = galleryNames().includes(word) ? `; ${word} is a single case, a plan names it as its base` : '';
    throw new UsageError('plan', `${word}: no such file${hint}; swathe sweep needs a plan (see the README, "Overnight")`);
  }
  const text = readText(word);
  let base = '';
  const plan = await readPlan(text, word, (named) => {
    const source = caseSource(galleryNames().includes(named) ? named : join(dirname(word), named));
    base = source.text;
    return source;
  });
  const name = basename(word).replace(/\.ya?ml$/i, '');
  return { plan, texts: { plan: text, base, start: plan.baseText }, folder: resolve(out ?? join('runs', name)) };
}
