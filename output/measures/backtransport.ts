/**
 * Back-transport: how large a flux through the membrane particles of one size can be carried back from, by the shear felt.
 * Three mechanisms, each with the flux it sustains, for a radius a, shear rate g = |tau| / eta at the wall, length L of membrane along the
 * flow and volume fractions phi_w of particles at the wall and phi_b in the bulk:
 *
 *     Brownian diffusion      0.807 (g D^2 / L)^(1/3) ln(phi_w / phi_b),   D = k T / (6 pi eta a)
 *     shear-induced diffusion 0.072 g (phi_w a^4 / (phi_b L))^(1/3)
 *     inertial lift           0.036 rho g^2 a^3 / eta
 *
 * Each is taken as the mean over the recorded |tau| of a wall (so the quiet times count); their sum is given as well, as is usual, though
 * the formulas are derived one by one. The sum has one least value: the size that is worst protected.
 *
 * An estimate. The formulas are of steady laminar shear, rigid spheres and fully developed layers; they leave out surface forces between
 * particles and membrane, cake, the sudden gusts of a passing bubble, and all that a plane section leaves out.
 *
 * @see Belfort, Davis & Zydney 1994, J. Membr. Sci. 96, 1 (coefficients from memory; 0.807 derived)
 */
import type { Case, Recording } from '../../cases/index.ts';
import { ANY, byMean, type Estimate, meanOf, NO_ESTIMATE, SIZE } from './estimate.ts';
import { type Felt, overElements, samplesOf } from './felt.ts';

/** Radii of the table: ten to the decade. */
const SMALLEST_m = 1e-8;
const LARGEST_m = 1e-4;
const PER_DECADE = 10;

/** J/K, exact by definition of the kelvin. */
const BOLTZMANN_J_K = 1.380649e-23;

/** Of a liquid whose temperature is not told. */
const ROOM_K = 293.15;

/** Fluxes that are sustained, m3/(m2 s). */
interface BackTransport {
  radius_m: number;
  brownian_m_s: number;
  shearInduced_m_s: number;
  inertialLift_m_s: number;
  total_m_s: number;
}

/** Of one wall, or of all membrane walls. */
export interface BackTransportMeasures {
  /** one entry per radius, rising; empty without a wall sample */
  sizes: BackTransport[];
  /** the radius whose total is least; null without shear */
  worst: BackTransport | null;
}

/** What stands before the powers of |tau| in the three fluxes of one radius. */
interface Factors {
  brownian: number;
  shearInduced: number;
  inertialLift: number;
}

export function backTransport(walls: readonly Felt[], panel: Case): BackTransportMeasures {
  const powers = powersOf(walls);
  if (powers === undefined) return { sizes: [], worst: null };
  const means = meansOf(powers);
  const decades = Math.round(Math.log10(LARGEST_m / SMALLEST_m));
  const radii_m = Array.from({ length: decades * PER_DECADE + 1 }, (_, i) => Number((SMALLEST_m * 10 ** (i / PER_DECADE)).toPrecision(6)));
  const worst_m = worstRadius_m(means, panel);
  return {
    sizes: radii_m.map((radius_m) => fluxes(radius_m, means, panel)),
    worst: worst_m === null ? null : fluxes(worst_m, means, panel),
  };
}

/**
 * Total flux sustained at the worst protected radius, m3/(m2 s). The value is least in the radius, so to first order it moves with the shear
 * as the flux at that radius does: its interval is that of a mean over time.
 */
export function worstFlux({ case: panel }: Recording, walls: readonly Felt[]): Estimate {
  const powers = powersOf(walls);
  const radius_m = powers === undefined ? null : worstRadius_m(meansOf(powers), panel);
  if (powers === undefined || radius_m === null) return NO_ESTIMATE;
  const { brownian, shearInduced, inertialLift } = factorsOf(radius_m, panel);
  const { third, first, second } = powers;
  return byMean(
    first.map((tau, i) => brownian * third[i] + shearInduced * tau + inertialLift * second[i]),
    SIZE,
  );
}

/**
 * The worst protected radius a, m. There the slope over ln a, -2/3 B + 4/3 S + 3 I of the three mean fluxes, is zero; where the shear of one
 * sample makes it z instead, ln a moves by -z over the slope's own slope, 4/9 B + 16/9 S + 9 I, to first order.
 */
export function worstRadius({ case: panel }: Recording, walls: readonly Felt[]): Estimate {
  const powers = powersOf(walls);
  const means = powers && meansOf(powers);
  const radius_m = means === undefined ? null : worstRadius_m(means, panel);
  if (powers === undefined || means === undefined || radius_m === null) return NO_ESTIMATE;
  const { brownian, shearInduced, inertialLift } = factorsOf(radius_m, panel);
  const curvature = (4 / 9) * brownian * means.third + (16 / 9) * shearInduced * means.first + 9 * inertialLift * means.second;
  const { third, first, second } = powers;
  const slope = first.map((tau, i) => (-2 / 3) * brownian * third[i] + (4 / 3) * shearInduced * tau + 3 * inertialLift * second[i]);
  const centre = Math.log(radius_m) + meanOf(slope) / curvature;
  return { value: radius_m, series: slope.map((z) => centre - z / curvature), range: ANY, at: Math.exp };
}

function fluxes(radius_m: number, means: Means, panel: Case): BackTransport {
  const factors = factorsOf(radius_m, panel);
  const brownian_m_s = factors.brownian * means.third;
  const shearInduced_m_s = factors.shearInduced * means.first;
  const inertialLift_m_s = factors.inertialLift * means.second;
  return { radius_m, brownian_m_s, shearInduced_m_s, inertialLift_m_s, total_m_s: brownian_m_s + shearInduced_m_s + inertialLift_m_s };
}

function factorsOf(radius_m: number, { liquid, particles }: Case): Factors {
  const { viscosity_Pa_s: eta_Pa_s, density_kg_m3, temperature_K = ROOM_K } = liquid;
  const diffusivity_m2_s = (BOLTZMANN_J_K * temperature_K) / (6 * Math.PI * eta_Pa_s * radius_m);
  return {
    brownian: 0.807 * Math.cbrt(diffusivity_m2_s ** 2 / (eta_Pa_s * particles.length_m)) * Math.log(particles.wallToBulk),
    shearInduced: (0.072 / eta_Pa_s) * Math.cbrt((particles.wallToBulk * radius_m ** 4) / particles.length_m),
    inertialLift: (0.036 * density_kg_m3 * radius_m ** 3) / eta_Pa_s ** 3,
  };
}

/**
 * Where B a^(-2/3) + S a^(4/3) + I a^3 is least: the slope over ln a, -2/3 B a^(-2/3) + 4/3 S a^(4/3) + 3 I a^3, rises all the way, so
 * halving finds its one zero. Null without shear.
 */
function worstRadius_m(means: Means, panel: Case): number | null {
  if (!(means.first > 0)) return null;
  const slope = (radius_m: number): number => {
    const { brownian_m_s, shearInduced_m_s, inertialLift_m_s } = fluxes(radius_m, means, panel);
    return (-2 / 3) * brownian_m_s + (4 / 3) * shearInduced_m_s + 3 * inertialLift_m_s;
  };
  let [low, high] = [Math.log(1e-12), Math.log(1)];
  while (high - low > 1e-12) {
    const middle = (low + high) / 2;
    if (slope(Math.exp(middle)) < 0) low = middle;
    else high = middle;
  }
  return Math.exp(low);
}

/** Means of |tau|^(1/3), |tau| and tau^2 over all (element, sample) pairs. */
interface Means {
  third: number;
  first: number;
  second: number;
}

function meansOf({ third, first, second }: Powers): Means {
  return { third: meanOf(third), first: meanOf(first), second: meanOf(second) };
}

/** The same means sample by sample, over the elements alone; shape (samples). */
type Powers = Record<keyof Means, Float64Array>;

/** Of each wall, made on first use: cube roots are dear. */
const made = new WeakMap<Felt, Powers>();

/** Over the open elements of all walls; undefined where there is no value. */
function powersOf(walls: readonly Felt[]): Powers | undefined {
  const open = walls.filter(({ surface }) => surface.elements.length > 0 && surface.samples > 0);
  if (open.length === 0) return undefined;
  const elements = open.reduce((sum, { surface }) => sum + surface.elements.length, 0);
  const over = (power: keyof Means): Float64Array => {
    const sums = new Float64Array(samplesOf(open));
    for (const wall of open) {
      const weight = wall.surface.elements.length / elements;
      wallPowers(wall)[power].forEach((mean, i) => {
        sums[i] += weight * mean;
      });
    }
    return sums;
  };
  return { third: over('third'), first: over('first'), second: over('second') };
}

function wallPowers(wall: Felt): Powers {
  const held = made.get(wall);
  if (held !== undefined) return held;
  const over = (power: (magnitude_Pa: number) => number): Float64Array =>
    overElements([wall], wall.surface.samples, (sums, { magnitude_Pa }) => {
      for (let i = 0; i < sums.length; i++) sums[i] += power(magnitude_Pa[i]);
    });
  const powers = { third: over(Math.cbrt), first: over((tau) => tau), second: over((tau) => tau * tau) };
  made.set(wall, powers);
  return powers;
}
