/**
 * Pressure of a fluid at rest that starts to move without being compressed: div((1/rho) grad p) = div(F/rho), F of the surface and of
 * buoyancy, no flow through the sides of the box [V]. A start with the Laplace pressure alone sends out sound, which a closed box keeps.
 */
import type { Setup } from '../../solver/index.ts';

type Still = Required<Pick<Setup, 'gas' | 'surfaceTension' | 'interfaceWidth' | 'gravity'>> &
  Pick<Setup, 'nx' | 'ny' | 'liquid' | 'buoyancy'>;

/** Pressure at the cell centres, 0 on the mean, for a closed box with interface profile `phi`; shape (ny, nx). */
export function pressureAtRest(box: Still, phi: (x: number, y: number) => number): Float64Array {
  const { nx, ny, interfaceWidth: W, surfaceTension, gravity } = box;
  const [liquid, gas] = [box.liquid.density, box.gas.density];
  const inside = (n: number, end: number): number => Math.min(Math.max(n, 0), end - 1);
  const at = (x: number, y: number): number => inside(y, ny) * nx + inside(x, nx);
  const share = new Float64Array(nx * ny);
  for (let y = 0; y < ny; y++) for (let x = 0; x < nx; x++) share[at(x, y)] = phi(x, y);
  const mu = share.map((a, i) => {
    const [x, y] = [i % nx, Math.floor(i / nx)];
    const around = share[at(x + 1, y)] + share[at(x - 1, y)] + share[at(x, y + 1)] + share[at(x, y - 1)] - 4 * a;
    return ((48 * surfaceTension) / W) * a * (a - 1) * (a - 0.5) - 1.5 * surfaceTension * W * around;
  });
  // faces: 1/rho of the mean phi, and what drives flow through them
  const faces: { i: number; j: number; light: number; force: number }[] = [];
  const face = (i: number, j: number, g: number): void => {
    const a = (share[i] + share[j]) / 2;
    const light = 1 / (gas + a * (liquid - gas));
    const weight = (box.buoyancy ?? 1) * (1 - a) * (gas - liquid) * g;
    faces.push({ i, j, light, force: ((mu[i] + mu[j]) / 2) * (share[j] - share[i]) + weight });
  };
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      if (x + 1 < nx) face(at(x, y), at(x + 1, y), gravity.x);
      if (y + 1 < ny) face(at(x, y), at(x, y + 1), gravity.y);
    }
  }
  return solve(nx * ny, faces);
}

/** Conjugate gradients on sum over faces of light (p_j - p_i - force) = 0 at every cell, scaled by its diagonal. */
function solve(size: number, faces: { i: number; j: number; light: number; force: number }[]): Float64Array {
  const p = new Float64Array(size);
  const diagonal = new Float64Array(size);
  const left = new Float64Array(size);
  for (const { i, j, light, force } of faces) {
    diagonal[i] += light;
    diagonal[j] += light;
    left[i] -= light * force;
    left[j] += light * force;
  }
  const dot = (a: Float64Array, b: Float64Array): number => a.reduce((sum, value, n) => sum + value * b[n], 0);
  let scaled = left.map((value, n) => value / diagonal[n]);
  const along = scaled.slice();
  let rest = dot(left, scaled);
  const goal = rest * 1e-20;
  for (let n = 0; n < 20 * Math.sqrt(size) && rest > goal; n++) {
    const image = new Float64Array(size);
    for (const { i, j, light } of faces) {
      const flux = light * (along[j] - along[i]);
      image[i] -= flux;
      image[j] += flux;
    }
    const step = rest / dot(along, image);
    for (let k = 0; k < size; k++) {
      p[k] += step * along[k];
      left[k] -= step * image[k];
    }
    scaled = left.map((value, k) => value / diagonal[k]);
    const next = dot(left, scaled);
    for (let k = 0; k < size; k++) along[k] = scaled[k] + (next / rest) * along[k];
    rest = next;
  }
  const mean = p.reduce((sum, value) => sum + value, 0) / size;
  return p.map((value) => value - mean);
}
