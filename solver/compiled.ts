import ndarray from 'ndarray';
import { type Box, resolve } from './box.ts';
import { AT_TEAM, BLOCK, Q, TEAM_BYTES } from './constants.ts';
import * as H from './header.ts';
import { layMemory, type MemoryMap, numbers } from './memory.ts';
import { Recorder } from './recorder.ts';
import type { Setup } from './setup.ts';
import type { Field, Samples, Simulation, Status } from './simulation.ts';
import { equilibriumState, placeCircle } from './state.ts';
import { endTeam, startTeam } from './team.ts';

interface Kernel {
  version(): number;
  populations(y: number): number;
  advance32(steps: number, sampleEvery: number): number;
  advance64(steps: number, sampleEvery: number): number;
  wake32(): void;
  wake64(): void;
}

/** Ends the threads of simulations that nobody holds any more. */
const abandoned = new FinalizationRegistry<WebAssembly.Memory>(endTeam);

/** The simulation on the compiled kernel: memory, start, samples and state; every step is the kernel's. */
export class Compiled implements Simulation {
  readonly setup: Setup;
  readonly phi: Field;
  readonly ux: Field;
  readonly uy: Field;
  readonly pressure: Field;
  private readonly box: Box;
  private readonly map: MemoryMap;
  private readonly kernel: Kernel;
  private readonly recorder: Recorder;

  /**
   * @param code the kernel's module
   * @param threads most threads that see to a step; a box without gas takes one
   * @throws {RangeError} on a setup that cannot be computed
   */
  static async create(setup: Setup, code: WebAssembly.Module, threads: number): Promise<Compiled> {
    const box = resolve(setup);
    const map = layMemory(box);
    const env = {
      memory: map.memory,
      abort: () => {
        throw new Error('the kernel aborted');
      },
    };
    const { exports } = await WebAssembly.instantiate(code, { env });
    const simulation = new Compiled(box, map, exports as unknown as Kernel);
    const blocks = box.twoPhase ? Math.ceil(box.ny / BLOCK) : 1;
    if ((await startTeam(map, code, threads, blocks)) > 1) abandoned.register(simulation, map.memory, simulation);
    return simulation;
  }

  private constructor(box: Box, map: MemoryMap, kernel: Kernel) {
    if (kernel.version() !== H.VERSION) throw new Error('kernel and host are of different builds; run npm run build');
    this.setup = box.setup;
    this.box = box;
    this.map = map;
    this.kernel = kernel;
    this.recorder = new Recorder(box.nx, box.bodies.count);
    const { header, stride } = map;
    const { nx, ny } = box;
    const view = (entry: number): Field => ndarray(numbers(map, header[entry], ny * stride - 2), [nx, ny], [1, stride]);
    this.phi = view(H.AT_PHI);
    this.ux = view(H.AT_UX);
    this.uy = view(H.AT_UY);
    this.pressure = view(H.AT_P);
    this.start();
  }

  get step(): number {
    return this.map.header[H.STEP];
  }

  private start(): void {
    const { nx, ny, geometry, setup, twoPhase } = this.box;
    let sum = 0;
    let gas = 0;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        if (geometry.fluid[y * nx + x] === 0) {
          this.phi.set(x, y, 1);
          continue;
        }
        const velocity = setup.initial?.velocity?.(x, y) ?? { x: 0, y: 0 };
        const phi = twoPhase ? (setup.initial?.phi?.(x, y) ?? 1) : 1;
        this.setCell(x, y, phi, velocity.x, velocity.y, setup.initial?.pressure?.(x, y) ?? 0);
        sum += velocity.x;
        gas += 1 - phi;
      }
    }
    this.map.header[H.UPFLOW] = this.map.header[H.UPFLOW_BEFORE] = sum / (nx * ny);
    this.map.header[H.GAS_AREA] = this.map.header[H.GAS_DUE] = gas;
  }

  private setCell(x: number, y: number, phi: number, ux: number, uy: number, p: number): void {
    const { f, g } = equilibriumState(this.box, phi, ux, uy, p);
    const row = numbers(this.map, this.kernel.populations(y), 18 * this.map.stride - 4);
    for (let k = 0; k < Q; k++) {
      row[k * this.map.stride + x] = f[k];
      row[(Q + k) * this.map.stride + x] = g[k];
    }
    const { header } = this.map;
    const at = y * header[H.STRIDE] + x * this.map.bytesPerNumber;
    const set = (entry: number, value: number): void => {
      numbers(this.map, header[entry] + at, 1)[0] = value;
    };
    set(H.AT_PHI, phi);
    set(H.AT_Z, phi - 1);
    set(H.AT_UX, ux);
    set(H.AT_UY, uy);
    set(H.AT_P, p);
  }

  advance(steps: number, sampleEvery = 0): Status {
    const { header, sampleCapacity, bytesPerNumber } = this.map;
    const chunk = sampleEvery > 0 ? sampleEvery * sampleCapacity : steps;
    for (let left = steps; left > 0; ) {
      const done =
        bytesPerNumber === 8
          ? this.kernel.advance64(Math.min(left, chunk), sampleEvery)
          : this.kernel.advance32(Math.min(left, chunk), sampleEvery);
      left -= done;
      this.drain();
      if (header[H.STATUS] === 0) continue;
      const kind = header[H.STATUS] === 1 ? 'nonFinite' : 'tooFast';
      return { kind, step: this.step, x: header[H.BAD_X], y: header[H.BAD_Y], speed: header[H.BAD_SPEED] };
    }
    return { kind: 'ok', step: this.step };
  }

  /** Moves the samples out of the kernel's buffer. */
  private drain(): void {
    const { header, memory } = this.map;
    const { nx, bodies } = this.box;
    const forceBytes = 16 * bodies.count;
    for (let n = 0; n < header[H.SAMPLES]; n++) {
      const at = header[H.AT_SAMPLES] + n * (32 + forceBytes + 16 * nx);
      const [step, upflow, gasArea, skimmed] = new Float64Array(memory.buffer, at, 4);
      const rows = new Float32Array(memory.buffer, at + 32 + forceBytes, 4 * nx);
      const sample = this.recorder.next(step, upflow, gasArea, skimmed);
      sample.forces.set(new Float64Array(memory.buffer, at + 32, 2 * bodies.count));
      sample.shearLeft.set(rows.subarray(0, nx));
      sample.shearRight.set(rows.subarray(nx, 2 * nx));
      sample.phiLeft.set(rows.subarray(2 * nx, 3 * nx));
      sample.phiRight.set(rows.subarray(3 * nx));
    }
    header[H.SAMPLES] = 0;
  }

  takeSamples(): Samples {
    return this.recorder.take();
  }

  placeGas(circle: { x: number; y: number; radius: number }): number {
    if (this.box.twoPhase) this.kernel[this.map.bytesPerNumber === 8 ? 'wake64' : 'wake32']();
    const added = placeCircle(this.box, circle, {
      phi: (x, y) => this.phi.get(x, y),
      ux: (x, y) => this.ux.get(x, y),
      uy: (x, y) => this.uy.get(x, y),
      pressure: (x, y) => this.pressure.get(x, y),
      set: (...cell) => this.setCell(...cell),
    });
    this.map.header[H.GAS_AREA] += added;
    this.map.header[H.GAS_DUE] += added;
    return added;
  }

  totals(): { gasArea: number; skimmed: number; upflow: number } {
    const { header } = this.map;
    return { gasArea: header[H.GAS_AREA], skimmed: header[H.SKIMMED], upflow: header[H.UPFLOW] };
  }

  /** The whole memory: header, populations, fields. */
  save(): Uint8Array {
    const image = new Uint8Array(this.map.memory.buffer).slice();
    image.fill(0, AT_TEAM, AT_TEAM + TEAM_BYTES);
    // any number of threads goes on alike
    new Float64Array(image.buffer)[H.THREADS] = 0;
    return image;
  }

  restore(image: Uint8Array): void {
    const memory = new Uint8Array(this.map.memory.buffer);
    if (image.length !== memory.length) {
      throw new RangeError(`restore: image holds ${image.length} bytes; this box needs ${memory.length}`);
    }
    const threads = this.map.header[H.THREADS];
    // a thread on its way to sleep counts itself in at any moment: the words of the team are never written, not even for a while
    memory.set(image.subarray(0, AT_TEAM));
    memory.set(image.subarray(AT_TEAM + TEAM_BYTES), AT_TEAM + TEAM_BYTES);
    this.map.header[H.THREADS] = threads;
  }

  dispose(): void {
    if (this.map.header[H.THREADS] === 1) return;
    this.map.header[H.THREADS] = 1;
    abandoned.unregister(this);
    endTeam(this.map.memory);
  }
}
