/**
 * The force of the fluid on each solid body, over every population that a step pulls from it (place j in the solid, fluid cell i,
 * e = e_k from j to i). Without gas by what the populations carry over,
 *
 *   F = -sum e (f that left + f that comes back)
 *
 * With gas it is what the step takes from the momentum of the fluid, rho = that of cell i, e' the direction in which what comes back left:
 *
 *   populations   -rho (e - e') f
 *   pressure      -(1 - rho/rhoLiquid) 3 w e (P_i + P_j): what the gradient of P adds to the populations (forces.ts), over its own links
 *   friction      over the faces of cells, -eta S n, n from i to j: all the viscous flux that forces.ts sends through the face
 *   interface     over the faces, n kappa [((dphi/dn)^2 - (dphi/dt)^2)/2 - Y + ln(1 + bend Y)/bend] + t kappa dphi/dn dphi/dt,
 *                 Y = phi (1 - phi): the pull of surface tension where an interface meets the body, mu grad phi being the
 *                 divergence of this stress
 *
 * In liquid alone nothing but rounding is left over between drive, walls and bodies. p holds neither the hydrostatic pressure of the liquid
 * nor that of a uniform force, so neither has the force.
 * @see Ladd 1994, J. Fluid Mech. 271, 285 (momentum that links carry; from memory)
 */
import type { Touch } from './bodies.ts';
import type { Box } from './box.ts';
import { density, type FlowFields, viscosity, wideIndex } from './forces.ts';
import { indexOf } from './ghosts.ts';
import { ex, ey, w } from './lattice.ts';

/**
 * Force on each body in the last step, x and y in turn; shape (bodies, 2).
 * @param f nine fields of the flow population as the step pulled them, ghosts included
 */
export function bodyForces(box: Box, f: readonly Float64Array[], fields: FlowFields): Float64Array {
  const { count, touches } = box.bodies;
  // entries 0 and 1 take what falls to no body
  const forces = new Float64Array(2 * (count + 1));
  for (const touch of touches) {
    const [x, y] = box.twoPhase ? ofFlow(box, f, fields, touch) : ofLiquid(box, f, touch);
    forces[2 * touch.bodyX] += x;
    forces[2 * touch.bodyY + 1] += y;
  }
  return forces.subarray(2);
}

function ofLiquid(box: Box, f: readonly Float64Array[], { x, y, k, fluidX, fluidY, left }: Touch): [number, number] {
  const both = f[k][indexOf(box, x, y)] + f[left][indexOf(box, fluidX, fluidY)];
  return [-ex[k] * both, -ey[k] * both];
}

function ofFlow(box: Box, f: readonly Float64Array[], fields: FlowFields, { x, y, k, fluidX, fluidY, left }: Touch): [number, number] {
  const { phi, mx, my, P } = fields;
  const [i, j] = [indexOf(box, fluidX, fluidY), indexOf(box, x, y)];
  const rho = density(box, phi[i]);
  const carried = rho * f[k][j];
  const pressed = (1 - rho / box.rhoLiquid) * 3 * w[k] * (P[wideIndex(box, i)] + P[wideIndex(box, j)]);
  const forceX = -(ex[k] - ex[left]) * carried - ex[k] * pressed;
  const forceY = -(ey[k] - ey[left]) * carried - ey[k] * pressed;
  if (k > 4) return [forceX, forceY];
  const alongX = ex[k] !== 0;
  // from a cell to its neighbour along the face; the velocity along the face, and normal to it
  const side = alongX ? box.nx + 2 : 1;
  const [tangent, normal] = alongX ? [my, mx] : [mx, my];
  const outward = -(ex[k] + ey[k]);
  const slope = (field: Float64Array): number => 0.25 * (field[i + side] - field[i - side] + field[j + side] - field[j - side]);
  const face = 0.5 * (phi[i] + phi[j]);
  const thinned = box.setup.liquid.rheology && (alongX ? fields.etaX : fields.etaY)[Math.min(i, j)];
  const eta = viscosity(box, face, thinned);
  const [across, along] = [phi[j] - phi[i], slope(phi)];
  const mixed = face * (1 - face);
  const bulk = mixed - Math.log(1 + box.profile.bend * mixed) / box.profile.bend;
  const pull = box.kappa * (0.5 * (across * across - along * along) - bulk);
  const ofNormal = -2 * eta * (normal[j] - normal[i]) + outward * pull;
  const ofTangent = -eta * (tangent[j] - tangent[i] + outward * slope(normal)) + box.kappa * across * along;
  return alongX ? [forceX + ofNormal, forceY + ofTangent] : [forceX + ofTangent, forceY + ofNormal];
}
