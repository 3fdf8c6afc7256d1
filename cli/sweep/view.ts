import type { WriteStream } from 'node:tty';
import { MultiBar, Presets, type SingleBar } from 'cli-progress';
import { duration } from '../numbers.ts';

/** How far a sweep is. */
export interface SweepProgress {
  points: number;
  done: number;
  failed: number;
  running: { name: string; share: number; says: string }[];
  /** cell updates */
  made: number;
  total: number;
  left_s: number | undefined;
}

/** Shows a sweep on a terminal, or as lines. */
export interface SweepView {
  update(progress: SweepProgress): void;
  /** a line that stays */
  say(text: string): void;
  end(): void;
}

export function sweepView(stream: WriteStream, quiet: boolean): SweepView {
  if (quiet) return { update: () => {}, say: () => {}, end: () => {} };
  return stream.isTTY ? bars(stream) : lines(stream);
}

/** done 12, failed 1, running 2 of 24; about 3m left */
export function countsLine({ points, done, failed, running, left_s }: SweepProgress): string {
  const left = left_s === undefined ? '' : `; about ${duration(left_s)} left`;
  return `done ${done}, failed ${failed}, running ${running.length} of ${points}${left}`;
}

/** Wall time between plain lines that no case has ended for, s. */
const LINE_EVERY_S = 60;

function lines(stream: WriteStream): SweepView {
  let last = performance.now();
  return {
    update: (progress) => {
      if (performance.now() - last < 1000 * LINE_EVERY_S) return;
      last = performance.now();
      stream.write(`${countsLine(progress)}\n`);
    },
    say: (text) => {
      last = performance.now();
      stream.write(`${text}\n`);
    },
    end: () => {},
  };
}

/** Long lines go on in the next one, or end at the edge. */
const WRAP = '\x1b[?7h';
const CUT = '\x1b[?7l';
const CLEAR_BELOW = '\x1b[J';

/** One bar for the sweep and one for each running case; what has ended scrolls away above them. */
function bars(stream: WriteStream): SweepView {
  const format = '{bar} {percentage} %  {says}';
  const view = new MultiBar(
    // redrawn whole: a line that stays is written over the topmost bar, and those that did not change would be left where they were
    {
      stream,
      format,
      barsize: 24,
      hideCursor: true,
      clearOnComplete: true,
      fps: 4,
      emptyOnZero: true,
      forceRedraw: true,
      autopadding: true,
    },
    Presets.shades_grey,
  );
  const overall = view.create(1000, 0, { says: 'starting' });
  const perCase = new Map<string, SingleBar>();
  const perMille = (share: number): number => Math.round(1000 * share);
  return {
    update: (progress) => {
      overall.update(perMille(progress.made / Math.max(1, progress.total)), { says: countsLine(progress) });
      for (const [name, bar] of perCase) {
        if (progress.running.some((one) => one.name === name)) continue;
        view.remove(bar);
        perCase.delete(name);
      }
      for (const { name, share, says } of progress.running) {
        const bar = perCase.get(name) ?? view.create(1000, 0, { says: '' });
        perCase.set(name, bar);
        bar.update(perMille(share), { says: `${name} ${says}` });
      }
    },
    // in the place of the bars, which are drawn anew below; they are cut off at the edge, messages are not
    say: (text) => view.log(`${CLEAR_BELOW}${WRAP}${text}${CUT}\n`),
    end: () => {
      // the last lines are said still
      view.update();
      view.stop();
    },
  };
}
