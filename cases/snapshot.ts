/** A picture's worth of the state in SI, in buffers that are used again for every snapshot. */
import type { Simulation } from '../solver/index.ts';
import type { Snapshot } from './recording.ts';
import type { Derived } from './scale.ts';

export class Snapshooter {
  readonly #derived: Derived;
  readonly #solid: Uint8Array;
  readonly #phi: Float32Array;
  readonly #ux_m_s: Float32Array;
  readonly #uy_m_s: Float32Array;

  constructor(derived: Derived, solid: Uint8Array | undefined) {
    const cells = derived.nx * derived.ny;
    this.#derived = derived;
    this.#solid = solid ?? new Uint8Array(cells);
    this.#phi = new Float32Array(cells);
    this.#ux_m_s = new Float32Array(cells);
    this.#uy_m_s = new Float32Array(cells);
  }

  take({ step, phi, ux, uy }: Simulation): Snapshot {
    const { nx, ny, dt_s, unit } = this.#derived;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        const i = y * nx + x;
        this.#phi[i] = phi.get(x, y);
        this.#ux_m_s[i] = ux.get(x, y) * unit.velocity_m_s;
        this.#uy_m_s[i] = uy.get(x, y) * unit.velocity_m_s;
      }
    }
    return { time_s: step * dt_s, nx, ny, phi: this.#phi, ux_m_s: this.#ux_m_s, uy_m_s: this.#uy_m_s, solid: this.#solid };
  }
}
