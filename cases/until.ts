/** Recording until measures are sure: at which steps it is looked whether they are. */
import type { Case } from './case.ts';
import type { PlacedFinding } from './faults.ts';
import type { RecordEntries } from './recordkeys.ts';

/** Between looks: a tenth of what is recorded, so that many looks make no lucky one likely, and this at least. */
const LOOK_GROWTH = 0.1;
const LEAST_LOOK_s = 0.2;

/**
 * Steps at which it is looked whether the recording may end: the first after the least span, the last before the most. They follow from the
 * case alone.
 */
export function lookSteps(record: Case['record'], dt_s: number, steps: { settle: number; least: number; most: number }): number[] {
  if (record.until === undefined) return [];
  const looks: number[] = [];
  for (let recorded = steps.least; recorded < steps.most; ) {
    looks.push(steps.settle + recorded);
    recorded += Math.ceil(Math.max(LOOK_GROWTH * recorded, LEAST_LOOK_s / dt_s));
  }
  return looks;
}

/** What a case asks to be sure of. */
export function untilOf({ until, 'at most': atMost_s }: RecordEntries): Pick<Case['record'], 'until'> {
  if (until === undefined || atMost_s === undefined) return {};
  const sure = Object.entries(until).flatMap(([name, within]) => (within === undefined ? [] : [{ name, within }]));
  return { until: { sure, atMost_s } };
}

export function untilFindings(record: RecordEntries): PlacedFinding[] {
  const { until, 'at most': atMost_s, span } = record;
  const path = ['record', 'at most'];
  const remedy = 'Write for example {span: 3 s, until: {swept_together: 5 %}, at most: 10 s}';
  const written = `${Number(span.toPrecision(4))} s`;
  if (until === undefined && atMost_s === undefined) return [];
  if (until === undefined) return [{ path, problem: 'stands without record.until', remedy: `${remedy}, or set record.span alone` }];
  if (Object.keys(until).length === 0) return [{ path: ['record', 'until'], problem: 'names no measure', remedy }];
  if (atMost_s === undefined)
    return [{ path, problem: 'is missing: record.until needs an end', allowed: `more than the span, ${written}`, remedy }];
  if (atMost_s > span) return [];
  return [
    {
      path,
      problem: 'is not longer than the span, which is recorded in any case',
      allowed: `more than ${written}`,
      remedy: 'Shorten record.span',
    },
  ];
}
