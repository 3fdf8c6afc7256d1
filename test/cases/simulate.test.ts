import { beforeAll, describe, expect, it } from 'vitest';
import { type Case, type Checkpoint, type Hooks, layOut, type Progress, type Recording, readCase, simulate } from '../../cases/index.ts';
import { SolverError, UsageError } from '../../solver/index.ts';

/** A channel small enough to run in a second, with releases, a fin and a bubble near the skim band at the start. */
const text = `
channel: {gap: 6 mm, height: 40 mm, tilt: 10 deg, membranes: [right]}
fins: [{from: 24 mm, across: 0.8 mm, length: 3 mm, thickness: 1 mm}]
gas:
  supply: 2 m3/(m2 h)
  serves: 1 m
  bubble: {diameter: 3 mm}
  start: [{across: 3.5 mm, along: 25 mm, diameter: 3.5 mm}]
  softened: {density: 20 kg/m3, viscosity: 2e-4 Pa s}
grid: {across: 20, speed: 0.15 m/s}
record: {settle: 20 ms, span: 60 ms, every: 1 ms}
swept: {within: 50 ms}
`;
const read = (...sets: string[]): Case => readCase(text, 'tiny.yaml', sets);
const frameEvery_s = 0.013;

interface Frame {
  time_s: number;
  phi: number[];
}
interface Whole {
  recording: Recording;
  frames: Frame[];
}

async function run(panel: Case, hooks: Hooks = {}): Promise<Whole> {
  const frames: Frame[] = [];
  const onFrame: Hooks['onFrame'] = ({ time_s, phi }) => void frames.push({ time_s, phi: [...phi] });
  const recording = await simulate(panel, { frameEvery_s, onFrame, ...hooks });
  return { recording, frames };
}

/** Stops the run once it has come to `step`, and hands back what it left. */
async function stopAt(panel: Case, step: number, hooks: Hooks = {}): Promise<Whole & { checkpoint: Checkpoint }> {
  const stop = new AbortController();
  let checkpoint: Checkpoint | undefined;
  const onProgress = (progress: Progress): void => {
    if (progress.step >= step) stop.abort();
  };
  const onCheckpoint = (made: Checkpoint): void => {
    checkpoint = made;
  };
  const whole = await run(panel, { onProgress, onCheckpoint, signal: stop.signal, ...hooks });
  if (checkpoint === undefined) throw new Error('no checkpoint was handed over');
  return { ...whole, checkpoint };
}

describe('a run', () => {
  let whole: Whole;
  beforeAll(async () => {
    whole = await run(read());
  });

  it('records both walls after settling only, at the times asked for', () => {
    const { times_s, walls, derived, complete } = whole.recording;
    expect(complete).toBe(true);
    expect(times_s).toHaveLength(60);
    expect(times_s[0]).toBeGreaterThan(0.02);
    expect(times_s[0]).toBeLessThan(0.0215);
    expect(walls.left.shear_Pa).toHaveLength(60 * derived.nx);
    expect(walls.right.gas).toHaveLength(60 * derived.nx);
  });

  it('marks the elements under a fin and no others', () => {
    const { walls, derived, x_m, times_s } = whole.recording;
    for (const row of [0, times_s.length - 1]) {
      for (let x = 0; x < derived.nx; x++) {
        const under = Math.abs((x_m[x] as number) - 0.024) < 0.0015 && layOut(read()).setup.solid?.[x] === 1;
        expect(Number.isNaN(walls.left.shear_Pa[row * derived.nx + x])).toBe(under);
        expect(Number.isNaN(walls.right.shear_Pa[row * derived.nx + x])).toBe(false);
      }
    }
  });

  it('leaves both bands out of the membrane', () => {
    const { membrane, derived, x_m } = whole.recording;
    expect(x_m[membrane.first]).toBeGreaterThan(derived.release.to_m);
    expect((x_m[membrane.first] as number) - derived.release.to_m).toBeLessThan(derived.dx_m * 1.001);
    expect(x_m[membrane.end - 1]).toBeLessThan(derived.skim.from_m);
  });

  it('keeps the books of gas: what was there and let in is skimmed or still there', () => {
    const { history } = whole.recording;
    const started = (history.present_m2[0] as number) - (history.released_m2[0] as number) + (history.skimmed_m2[0] as number);
    const last = history.time_s.length - 1;
    const balance =
      started + (history.released_m2[last] as number) - (history.skimmed_m2[last] as number) - (history.present_m2[last] as number);
    expect(history.time_s).toHaveLength(80);
    expect(history.released_m2[last]).toBeGreaterThan(5e-6);
    expect(history.skimmed_m2[last]).toBeGreaterThan(1e-7);
    expect(Math.abs(balance) / (history.present_m2[last] as number)).toBeLessThan(BALANCE);
    expect(history.holdup[last]).toBeCloseTo((history.present_m2[last] as number) / (0.006 * 0.0399 - 0.0013 * 0.003), 2);
  });

  it('sees bubbles rise, and the one at the start where it was put', () => {
    const { bubbles } = whole.recording;
    expect(bubbles[0]?.time_s).toBe(0);
    expect(bubbles[0]?.x_m).toBeCloseTo(0.025, 4);
    expect(bubbles[0]?.y_m).toBeCloseTo(0.0035, 4);
    // the tail of the diffuse profile adds pi W^2 pi^2/48 cells [V]: 16.1 of 0.09 mm2 each
    expect(bubbles[0]?.area_m2).toBeCloseTo(Math.PI * 0.00175 ** 2 + 16.1 * 9e-8, 6);
    const first = bubbles.filter(({ bubble, time_s }) => bubble === 1 && time_s < 0.045);
    expect(first.length).toBeGreaterThan(3);
    for (let i = 1; i < first.length; i++) expect(first[i]?.x_m).toBeGreaterThan(first[i - 1]?.x_m as number);
    expect(new Set(bubbles.map(({ bubble }) => bubble)).size).toBeGreaterThan(1);
  });

  it('hands over frames at the times asked for, the start included', () => {
    expect(whole.frames.map(({ time_s }) => Math.round(time_s * 1000))).toEqual([0, 13, 26, 39, 52, 65, 78]);
  });

  it.each([1, 500, 1111, 1900])('that was stopped at step %d or soon after and resumed equals the whole one bit for bit', async (step) => {
    const cut = await stopAt(read(), step);
    expect(cut.recording.complete).toBe(false);
    expect(cut.checkpoint.step).toBeLessThan(whole.recording.derived.steps);
    const rest = await run(read(), { resume: cut.checkpoint });
    expect(rest.recording).toEqual(whole.recording);
    expect([...cut.frames, ...rest.frames]).toEqual(whole.frames);
  });

  it('that was stopped twice, with its checkpoints written as JSON, equals the whole one', async () => {
    const once = await stopAt(read(), 300);
    const twice = await stopAt(read(), 1500, { resume: once.checkpoint });
    expect(twice.checkpoint.step).toBeGreaterThan(once.checkpoint.step);
    const { json, ...rest } = twice.checkpoint;
    const { recording } = await run(read(), { resume: { ...rest, json: JSON.stringify(JSON.parse(json)) } });
    expect(recording).toEqual(whole.recording);
  });

  it('of mixed bubbles from several nozzles with air in turn equals the whole one as well, stopped while the air is on or off', async () => {
    const panel = read(
      'gas.bubble={mixture: [{diameter: 3 mm, share: 60 %}, {diameter: 2 mm, share: 40 %}]}',
      'gas.across=[2.2 mm, 3.8 mm]',
      'gas.pulse={on: 20 ms, off: 15 ms}',
    );
    const pulsed = await run(panel);
    const { history } = pulsed.recording;
    const letIn = history.time_s.filter((_, i) => i > 0 && history.released_m2[i] !== history.released_m2[i - 1]);
    expect(letIn.length).toBeGreaterThan(1);
    // a release shows in the sample that follows it, up to 1 ms later
    for (const time_s of letIn) expect(time_s % 0.035).toBeLessThan(0.0211);
    for (const step of [300, 700]) {
      const cut = await stopAt(panel, step);
      expect(cut.recording.complete).toBe(false);
      expect((await run(panel, { resume: cut.checkpoint })).recording).toEqual(pulsed.recording);
    }
  });

  it('is not changed by checkpoints, however often they are made', async () => {
    const steps: number[] = [];
    const { recording } = await run(read(), { checkpointEvery_s: 0, onCheckpoint: ({ step }) => void steps.push(step) });
    expect(steps.length).toBeGreaterThan(5);
    expect(recording).toEqual(whole.recording);
  });

  it('differs for another seed', async () => {
    const { recording } = await run(read('gas.seed=2'));
    expect(recording.walls.right.shear_Pa).not.toEqual(whole.recording.walls.right.shear_Pa);
  });

  it('does nothing for a signal that was given before it began', async () => {
    const { recording, checkpoint } = await stopAt(read(), 0, { signal: AbortSignal.abort() });
    expect(recording.complete).toBe(false);
    expect(recording.times_s).toHaveLength(0);
    expect(checkpoint.step).toBe(0);
  });

  it('refuses the checkpoint of another case', async () => {
    const { checkpoint } = await stopAt(read(), 1);
    await expect(simulate(read('gas.seed=2'), { resume: checkpoint })).rejects.toThrow(UsageError);
  });

  it('that leaves what the method carries says where, when, how fast and what to try', async () => {
    // a pump of 2 m/s makes the liquid faster than the speed limit of this coarse step
    const panel = read('channel.return={upflow: 2 m/s}', 'grid.speed=0.05 m/s', 'channel.height=120 mm', 'fins=[]');
    const failure = await simulate(panel).catch((error: unknown) => error);
    expect(failure).toBeInstanceOf(SolverError);
    const { message, step, exit } = failure as SolverError;
    expect(exit).toBe(3);
    expect(step).toBeGreaterThan(0);
    expect(message).toMatch(/at [\d.e-]+ s \(step \d+\), [\d.]+ mm along and [\d.]+ mm across, the speed is [\d.]+ m\/s; at most 1 m\/s/);
    expect(message).toContain('Try a finer time step (grid.speed: 0.075 m/s in place of 0.05 m/s) or a softer gas');
  });
});

/** Relative to the gas present; 1.1e-5 seen: f32 populations, and phi held within [0, 1]. */
const BALANCE = 1e-4;
