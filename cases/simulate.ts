/**
 * Runs a case from start to end, or from a checkpoint to the end. All that happens between steps happens at whole step numbers
 * fixed by the case (observations, frames) or by the supply's own state (releases); the loop below may cut the way between them into any
 * pieces, so a run that was stopped and resumed, anywhere, equals one that was not, bit for bit.
 */
import { createSimulation, type Simulation, SolverError, type Status, UsageError } from '../solver/index.ts';
import { stepsOf } from './bands.ts';
import { follow, PatchFinder, type TrackState } from './bubbles.ts';
import type { Case } from './case.ts';
import { Recorder } from './recorder.ts';
import type { Checkpoint, Hooks, Recording } from './recording.ts';
import { Supply, type SupplyState } from './release.ts';
import { type Derived, layOut } from './scale.ts';
import { Snapshooter } from './snapshot.ts';
import { lookSteps } from './until.ts';

/** Time between looks at the bubbles. */
const OBSERVE_s = 0.01;

/** Wall-clock time of a piece of work between two chances to stop, ms. */
const PIECE_ms = 75;

/** What stands beside the solver's image in a checkpoint. */
interface Saved {
  case: string;
  supply: SupplyState;
  track: TrackState;
}

/**
 * Simulates a case.
 * @throws SolverError when the flow leaves the range the method carries; UsageError for a checkpoint of another case
 */
export async function simulate(panel: Case, hooks: Hooks = {}): Promise<Recording> {
  const { setup, derived } = layOut(panel);
  const simulation = await createSimulation(setup, hooks.threads);
  try {
    const run = new Run(panel, derived, simulation, hooks);
    if (hooks.resume === undefined) await run.events();
    else run.resume(hooks.resume);
    return await run.toEnd();
  } finally {
    simulation.dispose();
  }
}

class Run {
  readonly #panel: Case;
  readonly #derived: Derived;
  readonly #simulation: Simulation;
  readonly #hooks: Hooks;
  readonly #recorder: Recorder;
  readonly #finder: PatchFinder;
  readonly #snapshooter: Snapshooter;
  #supply: Supply;
  #track: TrackState = { last: [], next: 1 };
  /** steps between observations; between frames, 0 for none */
  readonly #observeEvery: number;
  readonly #frameEvery: number;
  /** steps at which it is looked whether the measures are sure */
  readonly #looks: readonly number[];
  #sure = false;

  constructor(panel: Case, derived: Derived, simulation: Simulation, hooks: Hooks) {
    const { solid } = simulation.setup;
    const stepsIn = (time_s: number): number => Math.max(1, Math.round(time_s / derived.dt_s));
    this.#panel = panel;
    this.#derived = derived;
    this.#simulation = simulation;
    this.#hooks = hooks;
    this.#recorder = new Recorder(panel, derived, solid);
    this.#finder = new PatchFinder(derived.nx, derived.ny, solid);
    this.#snapshooter = new Snapshooter(derived, solid);
    this.#supply = new Supply(panel, derived);
    const { settle, least, span: most } = stepsOf(panel);
    this.#looks = lookSteps(panel.record, derived.dt_s, { settle, least, most });
    this.#observeEvery = stepsIn(OBSERVE_s);
    this.#frameEvery = hooks.frameEvery_s === undefined ? 0 : stepsIn(hooks.frameEvery_s);
  }

  /** Goes on from a checkpoint: all events of its step are done. */
  resume({ json, solver, arrays }: Checkpoint): void {
    const saved = JSON.parse(json) as Saved;
    if (saved.case !== JSON.stringify(this.#panel)) {
      throw new UsageError('resume', 'The checkpoint belongs to another case. Start the run anew, or take the case it was made with');
    }
    this.#simulation.restore(solver);
    this.#recorder.restore(arrays);
    this.#supply = new Supply(this.#panel, this.#derived, saved.supply);
    this.#track = saved.track;
  }

  async toEnd(): Promise<Recording> {
    const { steps, sampleEvery } = this.#derived;
    const { signal, checkpointEvery_s = Number.POSITIVE_INFINITY } = this.#hooks;
    let piece = 10;
    let saved_ms = performance.now();
    while (this.#simulation.step < steps && !this.#sure) {
      if (signal?.aborted === true) {
        await this.#checkpoint();
        return this.#recorder.recording('stopped');
      }
      const start_ms = performance.now();
      const from = this.#simulation.step;
      const status = this.#simulation.advance(Math.min(piece, this.#nextEvent() - from), sampleEvery);
      this.#recorder.addSamples(this.#simulation.takeSamples(), this.#supply.state.released_m2);
      if (status.kind !== 'ok') throw this.#failure(status);
      const perStep_ms = (performance.now() - start_ms) / (this.#simulation.step - from);
      piece = Math.max(1, Math.min(2 * piece, Math.round(PIECE_ms / Math.max(perStep_ms, 1e-6))));
      await this.events();
      this.#progress();
      if (performance.now() - saved_ms >= 1000 * checkpointEvery_s && this.#simulation.step < steps && !this.#sure) {
        await this.#checkpoint();
        saved_ms = performance.now();
      }
      // a timer would sleep for a millisecond
      await new Promise((resolve) => setImmediate(resolve));
    }
    if (this.#panel.record.until === undefined) return this.#recorder.recording('span');
    return this.#recorder.recording(this.#sure ? 'sure' : 'atMost');
  }

  /** The next step at which something is due. */
  #nextEvent(): number {
    const { step } = this.#simulation;
    const after = (every: number): number => every * (Math.floor(step / every) + 1);
    const due = [this.#derived.steps, after(this.#observeEvery)];
    if (this.#frameEvery > 0) due.push(after(this.#frameEvery));
    due.push(...this.#looks.filter((look) => look > step).slice(0, 1));
    if (this.#supply.step > step) due.push(this.#supply.step);
    return Math.min(...due);
  }

  /** What is due at the step reached, in a fixed order. */
  async events(): Promise<void> {
    const { step } = this.#simulation;
    if (step % this.#observeEvery === 0) {
      const patches = this.#finder.find(this.#simulation);
      this.#recorder.addBubbles(follow(this.#track, patches, step * this.#derived.dt_s, this.#derived));
    }
    if (this.#frameEvery > 0 && step % this.#frameEvery === 0) await this.#hooks.onFrame?.(this.#snapshooter.take(this.#simulation));
    if (step === this.#supply.step) this.#supply.release(this.#simulation);
    if (this.#looks.includes(step)) this.#sure = this.#hooks.sureEnough?.(this.#recorder.recording('sure')) ?? false;
  }

  #progress(): void {
    const { step } = this.#simulation;
    const { steps, dt_s, unit } = this.#derived;
    const { gasArea, upflow } = this.#simulation.totals();
    const holdup = gasArea / this.#recorder.freeCells;
    this.#hooks.onProgress?.({ step, steps, time_s: step * dt_s, holdup, upflow_m_s: upflow * unit.velocity_m_s });
  }

  async #checkpoint(): Promise<void> {
    if (this.#hooks.onCheckpoint === undefined) return;
    const saved: Saved = { case: JSON.stringify(this.#panel), supply: this.#supply.state, track: this.#track };
    await this.#hooks.onCheckpoint({
      step: this.#simulation.step,
      solver: this.#simulation.save(),
      json: JSON.stringify(saved),
      arrays: this.#recorder.save(),
    });
  }

  #failure(status: Exclude<Status, { kind: 'ok' }>): SolverError {
    const { dx_m, dt_s, unit } = this.#derived;
    const { kind, step, x, y, speed } = status;
    const { gas, grid } = this.#panel;
    const limit_m_s = (this.#simulation.setup.speedLimit ?? 0.4) * unit.velocity_m_s;
    const figure = (value: number): string => String(Number(value.toPrecision(3)));
    const what =
      kind === 'nonFinite'
        ? 'a value is not finite'
        : `the speed is ${figure(speed * unit.velocity_m_s)} m/s; at most ${figure(limit_m_s)} m/s can be carried`;
    const place = `${figure(1000 * (x + 0.5) * dx_m)} mm along and ${figure(1000 * (y + 0.5) * dx_m)} mm across`;
    const finer = `a finer time step (grid.speed: ${figure(1.5 * grid.speed_m_s)} m/s in place of ${figure(grid.speed_m_s)} m/s)`;
    const softer = gas.softened
      ? 'a softer gas (smaller gas.softened.density)'
      : 'a softened gas (gas.softened: {density: 20 kg/m3, viscosity: 2e-4 Pa s})';
    const message = `The flow cannot be followed any further: at ${figure(step * dt_s)} s (step ${step}), ${place}, ${what}. The last good sample is of ${figure(this.#recorder.lastTime_s)} s. Try ${finer} or ${softer}`;
    return new SolverError(message, kind, step, x, y);
  }
}
