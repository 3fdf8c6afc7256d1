/**
 * The method in plain f64 TypeScript: a text to read, and the oracle of the kernel's tests. One step, in order:
 *
 * 1. Ghosts of the populations (ghosts.ts): those leaving the box come back through its sides; solids return what met them.
 * 2. With gas: `arrivals`, phi of every cell as the sum of the g that arrive, the velocity and the divergence that the f bring;
 *    ghosts of phi carry the wetting; `pressures` (forces.ts); ghosts of velocity and pressure.
 * 3. `cells`: the force, velocity, wall stress; then the collisions (collide.ts).
 *
 * Layout: fields of shape (ny + 2, nx + 2), row-major, a ghost ring of one (P: of two); populations one such field per direction,
 * after collision, f as it is (it sums to about 0), g less w: both are deviations, which f32 keeps to more digits.
 */
import ndarray from 'ndarray';
import { bodyForces } from './bodyforce.ts';
import { type Box, driveForce, resolve } from './box.ts';
import { type Cell, collideInterface, collideLiquid, collideVelocity, firstMoment, newCell } from './collide.ts';
import { Q } from './constants.ts';
import { clip, coupling, type FlowFields, kick, pressureUpdate, share, thinFaces, wallFriction, wideIndex } from './forces.ts';
import { fillGhosts, fillPhiGhosts, fillReturns, fillWallGhosts, fillWide, indexOf } from './ghosts.ts';
import { ex, ey } from './lattice.ts';
import { pulled, sharpening } from './profile.ts';
import { Recorder } from './recorder.ts';
import { EVERY, rheologyTable } from './rheology.ts';
import type { Setup } from './setup.ts';
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
  private readonly fields: FlowFields & Record<'ux' | 'uy' | 'p' | 'omega', Float64Array>;
  /** stress of the first and second row at either wall, of a box without gas; shape (4, nx) */
  private readonly stress: Float64Array[];
  /** sums of ux and gas over each section, and what sound damping takes from ux in the next step; shape (nx) each */
  private readonly sections: Float64Array;
  private readonly sectionGas: Float64Array;
  private readonly sound: Float64Array;
  private readonly recorder: Recorder;
  /** of a liquid that thins, over rate^2: eta beside gas, else omega; empty for others */
  private readonly table: Float64Array;
  private readonly cell: Cell = newCell();
  /** drive force now, mean ux now and one step ago, gas area, gas skimmed */
  private readonly totalsNow = new Float64Array(5);

  constructor(setup: Setup) {
    this.setup = setup;
    this.box = resolve(setup);
    const { nx, ny } = this.box;
    this.S = nx + 2;
    this.table = rheologyTable(setup);
    const size = this.S * (ny + 2);
    const field = () => new Float64Array(size);
    const populations = () => Array.from({ length: Q }, field);
    [this.f, this.g, this.fNext, this.gNext] = Array.from({ length: 4 }, populations);
    this.fields = {
      ...{ phi: field(), mx: field(), my: field(), sum: field(), P: new Float64Array((nx + 4) * (ny + 4)) },
      ...{ ux: field(), uy: field(), p: field(), etaX: field(), etaY: field(), omega: field().fill(this.box.omegaLiquid) },
    };
    this.fields.phi.fill(1);
    this.stress = Array.from({ length: 4 }, () => new Float64Array(nx));
    this.sections = new Float64Array(nx);
    this.sectionGas = new Float64Array(nx);
    this.sound = new Float64Array(nx);
    this.recorder = new Recorder(nx, this.box.bodies.count);
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
    this.fields.ux[i] = ux;
    this.fields.uy[i] = uy;
    this.fields.p[i] = p;
  }

  advance(steps: number, sampleEvery = 0): Status {
    for (let n = 0; n < steps; n++) {
      if (this.box.twoPhase) {
        fillReturns(this.box, this.f, 'flow');
        fillReturns(this.box, this.g, 'interface');
        this.arrivals();
        this.dampSound();
        fillPhiGhosts(this.box, this.fields.phi);
        this.pressures();
      } else fillGhosts(this.box, this.f);
      const status = this.cells();
      [this.f, this.fNext] = [this.fNext, this.f];
      [this.g, this.gNext] = [this.gNext, this.g];
      this.step++;
      if (sampleEvery > 0 && this.step % sampleEvery === 0) this.sample();
      if (status) return status;
    }
    return { kind: 'ok', step: this.step };
  }

  // ---- 2. phi, velocity and pressure as they arrive

  private arrivals(): void {
    const { nx, ny, skim, geometry } = this.box;
    const { phi } = this.fields;
    let gas = 0;
    let skimmed = 0;
    this.sections.fill(0);
    this.sectionGas.fill(0);
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        const i = this.at(x, y);
        let z = 0;
        let sum = 0;
        for (let k = 0; k < Q; k++) {
          const from = i - ey[k] * this.S - ex[k];
          z += this.g[k][from];
          sum += this.f[k][from];
          this.cell.f[k] = this.f[k][from];
        }
        phi[i] = 1 + z;
        this.fields.sum[i] = sum;
        [this.fields.mx[i], this.fields.my[i]] = firstMoment(this.cell.f);
        if (geometry.fluid[y * nx + x] === 0) continue;
        this.sections[x] += this.fields.mx[i];
        this.sectionGas[x] += 1 - clip(1 + z);
        gas -= z * (1 - skim[x]);
        skimmed -= z * skim[x];
      }
    }
    this.totalsNow[3] = gas;
    this.totalsNow[4] += skimmed;
  }

  private pressures(): void {
    const { nx, ny } = this.box;
    const { fields, box } = this;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        const i = this.at(x, y);
        [fields.p[i], fields.P[wideIndex(box, i)]] = pressureUpdate(box, fields, i, fields.p[i]);
      }
    }
    fillWallGhosts(box, fields);
    fillWide(box, fields.P);
    if (this.table.length > 0 && this.step % EVERY === 0) thinFaces(box, this.table, fields);
  }

  // ---- 3. collision

  private cells(): Status | undefined {
    const { nx, ny, geometry, speedLimit } = this.box;
    const { f, g, S, cell, fields } = this;
    let upflow = 0;
    if (!this.box.twoPhase) this.sections.fill(0);
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
        cell.Fx = this.box.forceX + this.totalsNow[0];
        cell.Fy = this.box.forceY;
        cell.soundX = this.sound[x];
        cell.skim = this.box.skim[x];
        cell.omega = fields.omega[i];
        if (this.box.twoPhase) this.collideTwoPhase(i);
        else collideLiquid(this.box, cell, this.table.length > 0 && (this.step + 1) % EVERY === 0 ? this.table : undefined);
        for (let k = 0; k < Q; k++) {
          this.fNext[k][i] = cell.f[k];
          this.gNext[k][i] = cell.g[k];
        }
        fields.ux[i] = cell.ux;
        fields.uy[i] = cell.uy;
        fields.p[i] = cell.p;
        fields.omega[i] = cell.omega;
        if (!this.box.twoPhase) this.sections[x] += cell.ux;
        upflow += cell.ux;
        if (y < 2) this.stress[y][x] = cell.tauXY;
        if (y >= ny - 2) this.stress[2 + ny - 1 - y][x] = cell.tauXY;
        const speed = this.box.twoPhase ? Math.hypot(...firstMoment(cell.f)) : Math.hypot(cell.ux, cell.uy);
        if (!(speed < speedLimit) && bad === undefined) {
          bad = { kind: Number.isFinite(speed) ? 'tooFast' : 'nonFinite', step: this.step + 1, x, y, speed };
        }
      }
    }
    const before = this.totalsNow[1];
    const now = upflow / (nx * ny);
    if (!this.box.twoPhase) this.dampSound();
    this.totalsNow[0] = driveForce(this.box.drive, this.box.rhoLiquid, this.totalsNow[0], now, before);
    this.totalsNow[1] = now;
    this.totalsNow[2] = before;
    return bad;
  }

  /**
   * What sound damping takes from ux: with gas in this very step, from what arrives, since what is taken a step late feeds velocities
   * that change sign in every step; without gas in the next one. Sections without gas weigh 1, those with a fiftieth of it or more 0.
   */
  private dampSound(): void {
    const { ny, soundDamping } = this.box;
    if (soundDamping === 0) return;
    const weights = this.sectionGas.map((gas) => Math.max(0, 1 - (50 * gas) / ny));
    const all = weights.reduce((sum, weight) => sum + weight, 0);
    const reference = all > 0 ? weights.reduce((sum, weight, x) => sum + weight * this.sections[x], 0) / all : 0;
    weights.forEach((weight, x) => {
      this.sound[x] = (soundDamping * weight * (this.sections[x] - reference)) / ny;
    });
  }

  /** Forces and both collisions of a cell of a box with gas. */
  private collideTwoPhase(i: number): void {
    const { box, cell, fields, S } = this;
    const { phi, p, P } = fields;
    const [E, N, W, So] = [phi[i + 1], phi[i + S], phi[i - 1], phi[i - S]];
    const [NE, NW, SW, SE] = [phi[i + S + 1], phi[i + S - 1], phi[i - S - 1], phi[i - S + 1]];
    const a = phi[i];
    cell.phi = a;
    cell.phiX = (E - W) / 3 + (NE - NW + SE - SW) / 12;
    cell.phiY = (N - So) / 3 + (NE - SE + NW - SW) / 12;
    const laplacian = (4 * (E + W + N + So) + NE + NW + SE + SW - 20 * a) / 6;
    const Y = clip(a) * (1 - clip(a));
    cell.sharpness = sharpening(box.profile, Y) / Math.sqrt(cell.phiX ** 2 + cell.phiY ** 2 + 1e-12);
    const mu = box.kappa * ((2 * box.profile.bend * a * (a - 1) * (a - 0.5)) / (1 + box.profile.bend * Y) - laplacian);
    const heavy = (1 - pulled(box.profile, share(a))) * (box.rhoLiquid - box.rhoGas);
    const forceX = mu * cell.phiX - heavy * box.gravityX + cell.Fx;
    const forceY = mu * cell.phiY - heavy * box.gravityY + cell.Fy;
    [cell.Fx, cell.Fy] = kick(box, fields, i, forceX, forceY);
    cell.p = p[i];
    cell.P = P[wideIndex(box, i)];
    collideVelocity(box, cell);
    cell.f[0] += coupling(box, fields, i);
    collideInterface(box, cell);
  }

  // ---- samples, totals, changes from outside

  private sample(): void {
    const { nx, ny, geometry } = this.box;
    const { phi } = this.fields;
    const [a0, a1] = geometry.wallWeights.left;
    const [b0, b1] = geometry.wallWeights.right;
    const row = this.recorder.next(this.step, this.totalsNow[1], this.totalsNow[3], this.totalsNow[4]);
    // the populations as the step pulled them
    row.forces.set(bodyForces(this.box, this.fNext, this.fields));
    for (let x = 0; x < nx; x++) {
      if (this.box.twoPhase) {
        row.shearLeft[x] = wallFriction(this.box, this.fields, this.at(x, 0), this.at(x, -1));
        row.shearRight[x] = wallFriction(this.box, this.fields, this.at(x, ny - 1), this.at(x, ny));
      } else {
        row.shearLeft[x] = a0[x] * this.stress[0][x] + a1[x] * this.stress[1][x];
        row.shearRight[x] = -(b0[x] * this.stress[2][x] + b1[x] * this.stress[3][x]);
      }
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
    return [Float64Array.of(this.step), this.totalsNow, this.sound, ...this.f, ...this.g, ...Object.values(this.fields), ...this.stress];
  }

  save(): Uint8Array {
    return Uint8Array.from(Buffer.concat(this.arrays().map(({ buffer }) => new Uint8Array(buffer))));
  }

  restore(bytes: Uint8Array): void {
    const image = new Float64Array(bytes.slice().buffer);
    const arrays = this.arrays();
    const size = arrays.reduce((n, a) => n + a.length, 0);
    if (image.length !== size) throw new RangeError(`restore: image holds ${image.length} numbers; this box needs ${size}`);
    let at = 0;
    for (const array of arrays) {
      array.set(image.subarray(at, at + array.length));
      at += array.length;
    }
    this.step = arrays[0][0];
  }

  dispose(): void {}
}
