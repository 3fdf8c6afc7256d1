/** Gathers what a run yields, in SI, and packs it for a checkpoint. */
import type { Samples } from '../solver/index.ts';
import { stepsOf } from './bands.ts';
import type { Case } from './case.ts';
import type { BubbleRow, History, Recording } from './recording.ts';
import type { Derived } from './scale.ts';

type Arrays = Record<string, Float32Array | Float64Array | Uint8Array>;

const COLUMNS = ['time_s', 'holdup', 'upflow_m_s', 'released_m2', 'skimmed_m2', 'present_m2'] as const satisfies readonly (keyof History)[];
const BUBBLE = ['time_s', 'bubble', 'area_m2', 'x_m', 'y_m', 'ux_m_s', 'uy_m_s'] as const satisfies readonly (keyof BubbleRow)[];
const SIDES = ['left', 'right'] as const;
const WAYS = ['along', 'across'] as const;

export class Recorder {
  readonly #panel: Case;
  readonly #derived: Derived;
  readonly #settle: number;
  /** fluid cells of the section */
  readonly freeCells: number;
  /** wall elements under a fin */
  readonly #covered: Record<'left' | 'right', Uint8Array>;
  /** room for all samples of the run; shape (samples, nx) */
  readonly #shear: Record<'left' | 'right', Float32Array>;
  readonly #gas: Record<'left' | 'right', Uint8Array>;
  /** shape (samples, fins) */
  readonly #fins: Record<'along' | 'across', Float64Array>;
  readonly #times_s: Float64Array;
  #samples = 0;
  readonly #history: History = { time_s: [], holdup: [], upflow_m_s: [], released_m2: [], skimmed_m2: [], present_m2: [] };
  readonly #bubbles: BubbleRow[] = [];

  constructor(panel: Case, derived: Derived, solid: Uint8Array | undefined) {
    this.#panel = panel;
    this.#derived = derived;
    const { nx, ny } = derived;
    const { settle, span, sampleEvery } = stepsOf(panel);
    const samples = span / sampleEvery;
    this.#settle = settle;
    this.freeCells = solid === undefined ? nx * ny : solid.reduce((sum, cell) => sum + 1 - cell, 0);
    const row = (y: number): Uint8Array => solid?.slice(y * nx, (y + 1) * nx) ?? new Uint8Array(nx);
    this.#covered = { left: row(0), right: row(ny - 1) };
    this.#shear = { left: new Float32Array(samples * nx), right: new Float32Array(samples * nx) };
    this.#gas = { left: new Uint8Array(samples * nx), right: new Uint8Array(samples * nx) };
    const forces = samples * panel.fins.length;
    this.#fins = { along: new Float64Array(forces), across: new Float64Array(forces) };
    this.#times_s = new Float64Array(samples);
  }

  /** Takes in the solver's samples; wall rows count once the settling time is over. */
  addSamples({ steps, shear, phi, force, upflow, gasArea, skimmed }: Samples, released_m2: number): void {
    const { nx, dx_m, dt_s, unit } = this.#derived;
    const fins = this.#panel.fins.length;
    for (let n = 0; n < steps.length; n++) {
      const step = steps[n] as number;
      this.#history.time_s.push(step * dt_s);
      this.#history.holdup.push((gasArea[n] as number) / this.freeCells);
      this.#history.upflow_m_s.push((upflow[n] as number) * unit.velocity_m_s);
      this.#history.released_m2.push(released_m2);
      this.#history.skimmed_m2.push((skimmed[n] as number) * unit.area_m2);
      this.#history.present_m2.push((gasArea[n] as number) * unit.area_m2);
      if (step <= this.#settle) continue;
      const row = this.#samples++;
      this.#times_s[row] = step * dt_s;
      for (let fin = 0; fin < fins; fin++) {
        this.#fins.along[row * fins + fin] = force.x.get(n, fin) * unit.stress_Pa * dx_m;
        this.#fins.across[row * fins + fin] = force.y.get(n, fin) * unit.stress_Pa * dx_m;
      }
      for (const side of SIDES) {
        for (let x = 0; x < nx; x++) {
          const under = this.#covered[side][x] === 1;
          this.#shear[side][row * nx + x] = under ? Number.NaN : shear[side].get(n, x) * unit.stress_Pa;
          this.#gas[side][row * nx + x] = !under && phi[side].get(n, x) < 0.5 ? 1 : 0;
        }
      }
    }
  }

  addBubbles(rows: readonly BubbleRow[]): void {
    this.#bubbles.push(...rows);
  }

  /** Time of the last wall sample or history row, s. */
  get lastTime_s(): number {
    return this.#history.time_s.at(-1) ?? 0;
  }

  recording(ended: Recording['ended']): Recording {
    const { nx, dx_m, release, skim } = this.#derived;
    const length = this.#samples * nx;
    const forces = this.#samples * this.#panel.fins.length;
    const wall = (side: 'left' | 'right') => ({
      shear_Pa: this.#shear[side].subarray(0, length),
      gas: this.#gas[side].subarray(0, length),
    });
    return {
      case: this.#panel,
      derived: this.#derived,
      complete: ended !== 'stopped',
      ended,
      x_m: Float64Array.from({ length: nx }, (_, x) => (x + 0.5) * dx_m),
      membrane: { first: Math.ceil(release.to_m / dx_m - 1e-9), end: Math.floor(skim.from_m / dx_m + 1e-9) },
      times_s: this.#times_s.subarray(0, this.#samples),
      walls: { left: wall('left'), right: wall('right') },
      fins: { along_N_m: this.#fins.along.subarray(0, forces), across_N_m: this.#fins.across.subarray(0, forces) },
      history: this.#history,
      bubbles: this.#bubbles,
    };
  }

  /** Copies of all that was gathered; `restore` takes it back. */
  save(): Arrays {
    const length = this.#samples * this.#derived.nx;
    const arrays: Arrays = { times_s: this.#times_s.slice(0, this.#samples) };
    for (const side of SIDES) {
      arrays[`shear_${side}`] = this.#shear[side].slice(0, length);
      arrays[`gas_${side}`] = this.#gas[side].slice(0, length);
    }
    const forces = this.#samples * this.#panel.fins.length;
    for (const way of WAYS) arrays[`force_${way}`] = this.#fins[way].slice(0, forces);
    for (const name of COLUMNS) arrays[`history_${name}`] = Float64Array.from(this.#history[name]);
    arrays.bubbles = Float64Array.from(this.#bubbles.flatMap((row) => BUBBLE.map((name) => row[name])));
    return arrays;
  }

  restore(arrays: Arrays): void {
    const times_s = arrays.times_s ?? new Float64Array();
    this.#samples = times_s.length;
    this.#times_s.set(times_s);
    for (const side of SIDES) {
      this.#shear[side].set(arrays[`shear_${side}`] ?? []);
      this.#gas[side].set(arrays[`gas_${side}`] ?? []);
    }
    for (const way of WAYS) this.#fins[way].set(arrays[`force_${way}`] ?? []);
    for (const name of COLUMNS) this.#history[name].push(...(arrays[`history_${name}`] ?? []));
    const flat = arrays.bubbles ?? new Float64Array();
    for (let at = 0; at < flat.length; at += BUBBLE.length) {
      this.#bubbles.push(Object.fromEntries(BUBBLE.map((name, i) => [name, flat[at + i]])) as unknown as BubbleRow);
    }
  }
}
