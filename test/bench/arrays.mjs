// One liquid between two walls, written straight down with ndarray: what the same job costs without a kernel. One relaxation time.
import ndarray from 'ndarray';

const EX = [0, 1, 0, -1, 0, 1, -1, -1, 1];
const EY = [0, 0, 1, 0, -1, 1, 1, -1, -1];
const W = [4 / 9, 1 / 9, 1 / 9, 1 / 9, 1 / 9, 1 / 36, 1 / 36, 1 / 36, 1 / 36];
const OPPOSITE = [0, 3, 4, 1, 2, 7, 8, 5, 6];

export function arrays({ nx, ny, liquid, force }) {
  const omega = 1 / (3 * liquid.viscosity + 0.5);
  const field = () => ndarray(new Float64Array(9 * nx * ny), [9, nx, ny]);
  let [now, next] = [field(), field()];
  const step = () => {
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        let rho = 0;
        let ux = 0.5 * force.x;
        let uy = 0;
        for (let k = 0; k < 9; k++) {
          const f = now.get(k, x, y);
          rho += f;
          ux += EX[k] * f;
          uy += EY[k] * f;
        }
        for (let k = 0; k < 9; k++) {
          const eu = EX[k] * ux + EY[k] * uy;
          const equilibrium = W[k] * (rho + 3 * eu + 4.5 * eu * eu - 1.5 * (ux * ux + uy * uy));
          const f = now.get(k, x, y) + omega * (equilibrium - now.get(k, x, y)) + 3 * W[k] * EX[k] * force.x;
          const to = y + EY[k];
          if (to < 0 || to >= ny) next.set(OPPOSITE[k], x, y, f);
          else next.set(k, (x + EX[k] + nx) % nx, to, f);
        }
      }
    }
    [now, next] = [next, now];
  };
  return {
    setup: { nx, ny },
    advance: (steps) => {
      for (let n = 0; n < steps; n++) step();
      return { kind: 'ok' };
    },
  };
}
