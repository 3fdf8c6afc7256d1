import type { WriteStream } from 'node:tty';
import { Presets, SingleBar } from 'cli-progress';
import type { Progress } from '../cases/index.ts';
import { duration, percent, plain } from './numbers.ts';

/** Wall time between plain lines, s. */
const LINE_EVERY_S = 10;
/** Until then a rate says nothing, s. */
const FIRST_RATE_S = 1;

/** Shows how far a run is. */
export interface ProgressView {
  /** @param sure how sure the measures are that end the run; undefined where its length is fixed */
  update(progress: Progress, sure?: string): void;
  end(): void;
}

/** A bar with the time left on a terminal, else a line every ten seconds, else nothing. */
export function progressView(stream: WriteStream, quiet: boolean): ProgressView {
  if (quiet) return { update: () => {}, end: () => {} };
  return stream.isTTY ? bar(stream) : lines(stream);
}

function bar(stream: WriteStream): ProgressView {
  const view = new SingleBar(
    { stream, format: '{bar} {percentage} %  {state}', barsize: 24, hideCursor: true, clearOnComplete: true, fps: 4, emptyOnZero: true },
    Presets.shades_grey,
  );
  const left = timeLeft();
  let started = false;
  return {
    update: (progress, sure) => {
      if (!started) view.start(progress.steps, progress.step, { state: '' });
      started = true;
      view.update(progress.step, { state: state(progress, left(progress), sure) });
    },
    end: () => view.stop(),
  };
}

function lines(stream: WriteStream): ProgressView {
  const left = timeLeft();
  let last = performance.now();
  return {
    update: (progress, sure) => {
      const leftNow = left(progress);
      if (performance.now() - last < 1000 * LINE_EVERY_S) return;
      last = performance.now();
      stream.write(`${percent(progress.step / progress.steps, 2)}  ${state(progress, leftNow, sure)}\n`);
    },
    end: () => {},
  };
}

function state(progress: Progress, left_s: number | undefined, sure: string | undefined): string {
  const total_s = (progress.time_s / Math.max(1, progress.step)) * progress.steps;
  const most = sure === undefined ? '' : 'at most ';
  const left = left_s === undefined ? '' : `, ${most}${duration(left_s)} left`;
  const flow = `hold-up ${percent(progress.holdup, 2)}, upflow ${plain(progress.upflow_m_s, 2)} m/s`;
  return `${progress.time_s.toFixed(2)} of ${most}${plain(total_s)} s, ${flow}${left}${sure ? `; ${sure}` : ''}`;
}

/** Wall time still needed, s, at the pace since this process began: a resumed run counts only its own steps. */
function timeLeft(): (progress: Progress) => number | undefined {
  const start = performance.now();
  let first = Number.NaN;
  return ({ step, steps }) => {
    if (Number.isNaN(first)) first = step;
    const passed_s = (performance.now() - start) / 1000;
    return step === first || passed_s < FIRST_RATE_S ? undefined : (passed_s * (steps - step)) / (step - first);
  };
}
