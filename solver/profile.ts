/**
 * The interface's profile phi(d) = 1/2 + 1/2 tanh(2 d/W) on a grid of cells, made to hold there and not only in the limit of many
 * cells a width. With s = 4/W and Y = phi (1 - phi):
 *
 *   phi(d + 1) + phi(d - 1) - 2 phi = bend Y (1 - 2 phi)/(1 + bend Y), bend = 2 cosh s - 2: what the grid's Laplacian makes of the profile
 *   theta = 2 tanh(D/2) phi = s Y [1 - s^2/12 (1 - 6 Y) + s^4/120 (1 - 30 Y + 120 Y^2)], D = d/dd: what sharpens it, so that the
 *   fluxes between cells, differences of phi less means of theta, vanish
 *
 *   h(phi): the share of the surface's pull, int phi'^2, that lies on the gas side of phi, as the grid's gradients feel it:
 *              dh/dphi ~ Y [1 + s^2/3 (1 - 6 Y)]. Buoyancy goes with 1 - h: where gravity acts along an interface, surface tension answers
 *              with the gradient of its pull along it, and only where both are spread alike does neither drive a current (with
 *              1 - phi a tilted interface kept a shear flow)
 *
 * Then mu of a flat interface along the grid is 0, and the profile neither widens (2.4 % at W = 5 with theta = s Y) nor pulls less
 * than asked.
 */

export interface Profile {
  /** of the grid's Laplacian, see above */
  bend: number;
  /** theta = Y (theta[0] + theta[1] Y + theta[2] Y^2) */
  theta: [number, number, number];
  /** h = phi^2 (weight[0] + weight[1] phi + weight[2] phi^2 + weight[3] phi^3) */
  weight: [number, number, number, number];
  /** sum over the profile of (gradient of the grid) (slope as the grid's Laplacian sees it along a bent interface): sigma = kappa pull */
  pull: number;
}

export function profileOf(W: number): Profile {
  const s = 4 / W;
  const bend = 2 * Math.cosh(s) - 2;
  const steep = (n: number): number => {
    const phi = 1 / (1 + Math.exp(-s * n));
    return phi * (1 - phi);
  };
  let pull = 0;
  for (let n = Math.ceil(-10 * W); n <= 10 * W; n++) {
    const Y = steep(n);
    pull += ((Y * Math.sinh(s)) / (1 + bend * Y)) * s * ((4 * Y + steep(n - 1) + steep(n + 1)) / 6);
  }
  const a = s ** 2 / 3;
  const norm = 1 / (1 / 6 - a / 30);
  const weight: Profile['weight'] = [(norm * (1 + a)) / 2, (-norm * (1 + 7 * a)) / 3, 3 * norm * a, -1.2 * norm * a];
  return { weight, bend, theta: [s - s ** 3 / 12 + s ** 5 / 120, s ** 3 / 2 - s ** 5 / 4, s ** 5], pull };
}

/** theta at Y = phi (1 - phi). */
export const sharpening = ({ theta }: Profile, Y: number): number => Y * (theta[0] + Y * (theta[1] + Y * theta[2]));

/** h at phi. */
export const pulled = ({ weight }: Profile, phi: number): number =>
  phi ** 2 * (weight[0] + phi * (weight[1] + phi * (weight[2] + phi * weight[3])));
