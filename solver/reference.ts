/**
 * The method in plain f64 TypeScript: a text to read, and the oracle of the kernel's tests. One step, in order:
 *
 * 1. `fillGhosts` (ghosts.ts): populations leaving the box come back through its sides; solids return what met them.
 * 2. `interfacePass`: phi of every cell is the sum of the g that arrive; skimming; ghosts of phi carry the wetting.
 * 3. `cell`: gradients of phi, forces, velocity, pressure, wall stress; then both collisions (collide.ts).
 *
 * Layout: fields of shape (ny + 2, nx + 2), row-major, a ghost ring of one; populations one such field per direction,
 * after collision, f as it is (it sums to about 0), g less w: both are deviations, which f32 keeps to more digits.
 */
import ndarray from 'ndarray';
import { type Box, driveForce, resolve } from './box.ts';
import { type Cell, collideFlow, collideInterface, newCell } from './collide.ts';
import { Q } from './constants.ts';
import { fillGhosts, indexOf } from './ghosts.ts';
import { ex, ey } from './lattice.ts';
import { Recorder } from './recorder.ts';
import type { Setup, Side } from './setup.ts';
import type { Field, Samples, Simulation, Status } from './simulation.ts';
import { equilibriumState, placeCircle } from './state.ts';

export class Reference implements Simulation {
  readonly setup: Setup;
  readonly phi: Field;
  readonly ux: Field;
  readonly uy: Field;
  readonly pressure: Field;
  step = 0;
  private readonly box: Box;
  private readonly S: number;
  /** f, g now and after the running step; [direction][cell] */
  private f: Float64Array[];
  private g: Float64Array[];
  private fNext: Float64Array[];
  private gNext: Float64Array[];
  private readonly fields: Record<'phi' | 'ux' | 'uy' | 'p' | 'ux2' | 'uy2', Float64Array>;
  /** stress of the first and second row at either wall, of this step and the one before; shape (8, nx) */
  private stress: Float64Array[];
  /** sums of ux and gas over each section, and what sound damping takes from ux in the next step; shape (nx) each */
  private readonly sections: Float64Array;
  private readonly sectionGas: Float64Array;
  private readonly sound: Float64Array;
  private readonly recorder: Recorder;
  private readonly cell: Cell = newCell();
  /** drive force now, mean ux now and one step ago, gas area, gas skimmed */
  private readonly totalsNow = new Float64Array(5);

  constructor(setup: Setup) {
    this.setup = setup;
    this.box = resolve(setup);
    const { nx, ny } = this.box;
    this.S = nx + 2;
    const size = this.S * (ny + 2);
    const field = () => new Float64Array(size);
    const populations = () => Array.from({ length: Q }, field);
    this.f = populations();
    this.g = populations();
    this.fNext = populations();
    this.gNext = populations();
    this.fields = { phi: field(), ux: field(), uy: field(), p: field(), ux2: field(), uy2: field() };
    this.fields.phi.fill(1);
    this.stress = Array.from({ length: 8 }, () => new Float64Array(nx));
    this.sections = new Float64Array(nx);
    this.sectionGas = new Float64Array(nx);
    this.sound = new Float64Array(nx);
    this.recorder = new Recorder(nx);
    const view = (data: Float64Array): Field => ndarray(data, [nx, ny], [1, this.S], this.S + 1);
    this.phi = view(this.fields.phi);
    this.ux = view(this.fields.ux);
    this.uy = view(this.fields.uy);
    this.pressure = view(this.fields.p);
    for (let y = 0; y < ny; y++) for (let x = 0; x < nx; x++) this.start(x, y);
  }

  /** Index of a cell. */
  private at(x: number, y: number): number {
    return indexOf(this.box, x, y);
  }

  private start(x: number, y: number): void {
    const { initial } = this.setup;
    if (this.box.geometry.fluid[y * this.box.nx + x] === 0) {
      this.fields.phi[this.at(x, y)] = 1;
      return;
    }
    const velocity = initial?.velocity?.(x, y) ?? { x: 0, y: 0 };
    const phi = this.box.twoPhase ? (initial?.phi?.(x, y) ?? 1) : 1;
    this.setCell(x, y, phi, velocity.x, velocity.y, initial?.pressure?.(x, y) ?? 0);
    this.totalsNow[1] += velocity.x / (this.box.nx * this.box.ny);
    this.totalsNow[2] = this.totalsNow[1];
    this.totalsNow[3] += 1 - phi;
  }

  private setCell(x: number, y: number, phi: number, ux: number, uy: number, p: number): void {
    const i = this.at(x, y);
    const state = equilibriumState(this.box, phi, ux, uy, p);
    for (let k = 0; k < Q; k++) {
      this.f[k][i] = state.f[k];
      this.g[k][i] = state.g[k];
    }
    this.fields.phi[i] = phi;
    this.fields.ux[i] = this.fields.ux2[i] = ux;
    this.fields.uy[i] = this.fields.uy2[i] = uy;
    this.fields.p[i] = p;
  }

  advance(steps: number, sampleEvery = 0): Status {
    for (let n = 0; n < steps; n++) {
      fillGhosts(this.box, this.f, this.fields.phi);
      if (this.box.twoPhase) fillGhosts(this.box, this.g, undefined);
      if (this.box.twoPhase) this.interfacePass();
      const status = this.cells();
      [this.f, this.fNext] = [this.fNext, this.f];
      [this.g, this.gNext] = [this.gNext, this.g];
      this.step++;
      if (sampleEvery > 0 && this.step % sampleEvery === 0) this.sample();
      if (status) return status;
    }
    return { kind: 'ok', step: this.step };
  }

  // ---- 2. phi

  private interfacePass(): void {
    const { nx, ny, skim, geometry } = this.box;
    const { phi } = this.fields;
    let gas = 0;
    let skimmed = 0;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        const i = this.at(x, y);
        let z = 0;
        for (let k = 0; k < Q; k++) z += this.g[k][i - ey[k] * this.S - ex[k]];
        phi[i] = 1 + z;
        if (geometry.fluid[y * nx + x] === 0) continue;
        gas -= z * (1 - skim[x]);
        skimmed -= z * skim[x];
      }
    }
    this.totalsNow[3] = gas;
    this.totalsNow[4] += skimmed;
    this.fillPhiGhosts();
  }

  /** phi at a wall whose first cell holds `phi`, from d(phi)/dn = -(4/W) cos(theta) phi (1 - phi), and the ghost beyond it. */
  private wettedGhost(phi: number): number {
    const c = this.box.wetting;
    const inside = Math.min(Math.max(phi, 0), 1);
    const wall = (4 * inside) / (2 - c + Math.sqrt((2 - c) * (2 - c) + 8 * c * inside));
    return phi + 2 * (wall - inside);
  }

  private fillPhiGhosts(): void {
    const { nx, ny, setup, geometry } = this.box;
    const { phi } = this.fields;
    for (const ghost of geometry.ghosts) {
      let mean = 0;
      for (const n of ghost.neighbours) mean += n.weight * phi[this.at(n.x, n.y)];
      phi[this.at(ghost.x, ghost.y)] = this.wettedGhost(mean);
    }
    const beyond = (side: Side, inside: number, across: number): number =>
      side === 'periodic' ? phi[across] : side === 'slip' ? phi[inside] : this.wettedGhost(phi[inside]);
    const { left, right, bottom, top } = setup.sides;
    for (let x = 0; x < nx; x++) {
      phi[this.at(x, -1)] = beyond(left, this.at(x, 0), this.at(x, ny - 1));
      phi[this.at(x, ny)] = beyond(right, this.at(x, ny - 1), this.at(x, 0));
    }
    for (let y = -1; y <= ny; y++) {
      phi[this.at(-1, y)] = beyond(bottom, this.at(0, y), this.at(nx - 1, y));
      phi[this.at(nx, y)] = beyond(top, this.at(nx - 1, y), this.at(0, y));
    }
  }

  // ---- 3. collision

  private cells(): Status | undefined {
    const { nx, ny, geometry, speedLimit } = this.box;
    const { f, g, S, cell, fields } = this;
    this.sections.fill(0);
    this.sectionGas.fill(0);
    this.stress = [...this.stress.slice(4), ...this.stress.slice(0, 4)];
    let bad: Status | undefined;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        const i = this.at(x, y);
        if (geometry.fluid[y * nx + x] === 0) {
          for (let k = 0; k < Q; k++) this.fNext[k][i] = this.gNext[k][i] = 0;
          continue;
        }
        for (let k = 0; k < Q; k++) {
          const from = i - ey[k] * S - ex[k];
          cell.f[k] = f[k][from];
          cell.g[k] = g[k][from];
        }
        if (this.box.twoPhase) this.gradients(i);
        cell.driveX = this.totalsNow[0];
        cell.soundX = this.sound[x];
        cell.ux1 = fields.ux[i];
        cell.uy1 = fields.uy[i];
        cell.ux2 = fields.ux2[i];
        cell.uy2 = fields.uy2[i];
        cell.skim = this.box.skim[x];
        collideFlow(this.box, cell);
        if (this.box.twoPhase) collideInterface(this.box, cell);
        for (let k = 0; k < Q; k++) {
          this.fNext[k][i] = cell.f[k];
          this.gNext[k][i] = cell.g[k];
        }
        fields.ux2[i] = cell.ux1;
        fields.uy2[i] = cell.uy1;
        fields.ux[i] = cell.ux;
        fields.uy[i] = cell.uy;
        fields.p[i] = cell.p;
        this.sections[x] += cell.ux;
        this.sectionGas[x] += 1 - Math.min(Math.max(cell.phi, 0), 1);
        if (y < 2) this.stress[y][x] = cell.tauXY;
        if (y >= ny - 2) this.stress[2 + ny - 1 - y][x] = cell.tauXY;
        const speed = Math.hypot(cell.ux, cell.uy);
        if (!(speed < speedLimit) && bad === undefined) {
          bad = { kind: Number.isFinite(speed) ? 'tooFast' : 'nonFinite', step: this.step + 1, x, y, speed };
        }
      }
    }
    const before = this.totalsNow[1];
    const now = this.sections.reduce((sum, ux) => sum + ux, 0) / (nx * ny);
    this.dampSound();
    this.totalsNow[0] = driveForce(this.box.drive, this.box.rhoLiquid, this.totalsNow[0], now, before);
    this.totalsNow[1] = now;
    this.totalsNow[2] = before;
    return bad;
  }

  /** What sound damping takes in the next step: sections without gas weigh 1, those with a fiftieth of it or more 0. */
  private dampSound(): void {
    const { ny, soundDamping } = this.box;
    const weights = this.sectionGas.map((gas) => Math.max(0, 1 - (50 * gas) / ny));
    const all = weights.reduce((sum, weight) => sum + weight, 0);
    const reference = all > 0 ? weights.reduce((sum, weight, x) => sum + weight * this.sections[x], 0) / all : 0;
    weights.forEach((weight, x) => {
      this.sound[x] = (soundDamping * weight * (this.sections[x] - reference)) / ny;
    });
  }

  /** Isotropic gradient (8 neighbours) and Laplacian (9 points) of phi. */
  private gradients(i: number): void {
    const { phi } = this.fields;
    const { S, cell } = this;
    const [E, N, Wst, Sth] = [phi[i + 1], phi[i + S], phi[i - 1], phi[i - S]];
    const [NE, NW, SW, SE] = [phi[i + S + 1], phi[i + S - 1], phi[i - S - 1], phi[i - S + 1]];
    cell.phi = phi[i];
    cell.phiX = (E - Wst) / 3 + (NE - NW + SE - SW) / 12;
    cell.phiY = (N - Sth) / 3 + (NE - SE + NW - SW) / 12;
    cell.lapPhi = (4 * (E + Wst + N + Sth) + NE + NW + SE + SW - 20 * phi[i]) / 6;
  }

  // ---- samples, totals, changes from outside

  private sample(): void {
    const { nx, ny, geometry } = this.box;
    const { phi } = this.fields;
    const [a0, a1] = geometry.wallWeights.left;
    const [b0, b1] = geometry.wallWeights.right;
    // of two steps: what changes sign from one to the next is of the lattice, not of the flow
    const mean = (row: number, x: number) =>
      this.step === 1 ? this.stress[row][x] : 0.5 * (this.stress[row][x] + this.stress[row + 4][x]);
    const row = this.recorder.next(this.step, this.totalsNow[1], this.totalsNow[3], this.totalsNow[4]);
    for (let x = 0; x < nx; x++) {
      row.shearLeft[x] = a0[x] * mean(0, x) + a1[x] * mean(1, x);
      row.shearRight[x] = -(b0[x] * mean(2, x) + b1[x] * mean(3, x));
      row.phiLeft[x] = (phi[this.at(x, 0)] + phi[this.at(x, -1)]) / 2;
      row.phiRight[x] = (phi[this.at(x, ny - 1)] + phi[this.at(x, ny)]) / 2;
    }
  }

  takeSamples(): Samples {
    return this.recorder.take();
  }

  totals(): { gasArea: number; skimmed: number; upflow: number } {
    return { gasArea: this.totalsNow[3], skimmed: this.totalsNow[4], upflow: this.totalsNow[1] };
  }

  placeGas(circle: { x: number; y: number; radius: number }): number {
    const added = placeCircle(this.box, circle, {
      phi: (x, y) => this.phi.get(x, y),
      ux: (x, y) => this.ux.get(x, y),
      uy: (x, y) => this.uy.get(x, y),
      pressure: (x, y) => this.pressure.get(x, y),
      set: (...cell) => this.setCell(...cell),
    });
    this.totalsNow[3] += added;
    return added;
  }

  /** Everything a step reads, in one order. */
  private arrays(): Float64Array[] {
    return [this.totalsNow, this.sound, ...this.f, ...this.g, ...Object.values(this.fields), ...this.stress];
  }

  save(): Uint8Array {
    const arrays = this.arrays();
    const image = new Float64Array(1 + arrays.reduce((n, a) => n + a.length, 0));
    image[0] = this.step;
    let at = 1;
    for (const array of arrays) {
      image.set(array, at);
      at += array.length;
    }
    return new Uint8Array(image.buffer);
  }

  restore(bytes: Uint8Array): void {
    const image = new Float64Array(bytes.slice().buffer);
    const arrays = this.arrays();
    const size = 1 + arrays.reduce((n, a) => n + a.length, 0);
    if (image.length !== size) throw new RangeError(`restore: image holds ${image.length} numbers; this box needs ${size}`);
    this.step = image[0];
    let at = 1;
    for (const array of arrays) {
      array.set(image.subarray(at, at + array.length));
      at += array.length;
    }
  }
}
