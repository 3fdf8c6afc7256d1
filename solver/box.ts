import { type Bodies, bodies } from './bodies.ts';
import { CS2 } from './constants.ts';
import { type Geometry, geometry } from './geometry.ts';
import { type Profile, profileOf } from './profile.ts';
import { NU_LIMIT } from './rheology.ts';
import type { Drive, Fluid, Setup, Side } from './setup.ts';
import { type Walls, walls } from './walls.ts';

/** A setup with every default filled in and every derived number worked out, as both implementations of the step read it. */
export interface Box {
  setup: Setup;
  nx: number;
  ny: number;
  twoPhase: boolean;
  rhoLiquid: number;
  rhoGas: number;
  /** 1 / eta of both phases: 1/eta is linear in phi (harmonic mixing) */
  fluidityLiquid: number;
  fluidityGas: number;
  /** relaxation of the shear moments in a box without gas; with a rheology that of the start */
  omegaLiquid: number;
  /** mu = kappa (2 bend phi (phi - 1) (phi - 1/2)/(1 + bend phi (1 - phi)) - lap phi), see profile.ts */
  kappa: number;
  profile: Profile;
  W: number;
  mobility: number;
  omegaPhi: number;
  /** (4 / W) cos(theta): slope of phi at a wall over phi (1 - phi) */
  wetting: number;
  sigma: number;
  /** force on all cells */
  forceX: number;
  forceY: number;
  /** force per (rho - rhoLiquid): gravity times the buoyancy factor */
  gravityX: number;
  gravityY: number;
  drive: Drive | undefined;
  /** skimmed share per step and x; shape (nx) */
  skim: Float64Array;
  soundDamping: number;
  /** kinematic viscosity that the populations carry in a box with gas; forces.ts adds the rest */
  nu0: number;
  speedLimit: number;
  /** 1 / (gas speed limit)^2 */
  gasLimit: number;
  geometry: Geometry;
  walls: Walls;
  bodies: Bodies;
}

/** 18 populations of four bytes: less than any cell takes, so that a box far too big is refused before anything is made for it */
const LEAST_BYTES = 72;

/** nu0 over the kinematic viscosity of the liquid */
const NU0_SHARE = 0.01;

const fail = (what: string): never => {
  throw new RangeError(`setup: ${what}`);
};

const positive = (name: string, value: number): number =>
  value > 0 && Number.isFinite(value) ? value : fail(`${name} is ${value}; it must be positive and finite`);

const within = (name: string, value: number, low: number, high: number, range: string): number =>
  value >= low && value <= high ? value : fail(`${name} is ${value}; it must lie in ${range}`);

const positiveOrInfinite = (name: string, value: number): number =>
  value > 0 ? value : fail(`${name} is ${value}; it must be positive (Infinity for none)`);

const finite = (name: string, value: number): number => (Number.isFinite(value) ? value : fail(`${name} is ${value}; it must be finite`));

/**
 * Checks a setup and fills in its defaults.
 * @throws {RangeError} naming the entry, its value and what it must be
 */
export function resolve(setup: Setup): Box {
  const { nx, ny, sides } = setup;
  if (!Number.isInteger(nx) || nx < 1) fail(`nx is ${nx}; it must be a whole number of at least 1`);
  if (!Number.isInteger(ny) || ny < 1) fail(`ny is ${ny}; it must be a whole number of at least 1`);
  const leastMiB = (nx * ny * LEAST_BYTES) / 2 ** 20;
  if (leastMiB > 2048) fail(`${nx} x ${ny} cells need ${Math.round(leastMiB)} MiB; the limit is 2048 MiB`);
  checkPair('left', sides.left, 'right', sides.right);
  checkPair('bottom', sides.bottom, 'top', sides.top);
  if (setup.solid && setup.solid.length !== nx * ny) fail(`solid has ${setup.solid.length} entries; nx * ny = ${nx * ny} are needed`);
  if (setup.bodies && setup.bodies.length !== nx * ny) fail(`bodies has ${setup.bodies.length} entries; nx * ny = ${nx * ny} are needed`);
  if (setup.skim && setup.skim.length !== nx) fail(`skim has ${setup.skim.length} entries; nx = ${nx} are needed`);
  const twoPhase = setup.gas !== undefined;
  if (twoPhase && setup.surfaceTension === undefined) fail('surfaceTension is missing; a box with gas needs it (0 is allowed)');
  const sigma = finite('surfaceTension', setup.surfaceTension ?? 0);
  if (sigma < 0) fail(`surfaceTension is ${sigma}; it must not be negative`);
  checkRheology(setup);
  const gas = setup.gas ?? setup.liquid;
  const W = positive('interfaceWidth', setup.interfaceWidth ?? 5);
  if (W <= 2) fail(`interfaceWidth is ${W}; it must be more than 2 cells`);
  const mobility = positive('mobility', setup.mobility ?? 0.1);
  const profile = profileOf(W);
  const solids = geometry(setup);
  const boxWalls = walls(setup, solids.fluid);
  const buoyancy = finite('buoyancy', setup.buoyancy ?? 1);
  return {
    setup,
    nx,
    ny,
    twoPhase,
    rhoLiquid: positive('liquid.density', setup.liquid.density),
    rhoGas: positive('gas.density', gas.density),
    fluidityLiquid: 1 / positive('liquid.viscosity', setup.liquid.viscosity),
    fluidityGas: 1 / positive('gas.viscosity', gas.viscosity),
    omegaLiquid: 1 / (setup.liquid.viscosity / (setup.liquid.density * CS2) + 0.5),
    kappa: sigma / profile.pull,
    profile,
    W,
    mobility,
    omegaPhi: 1 / (mobility / CS2 + 0.5),
    wetting: Math.exp((4 / W) * Math.cos(within('contactAngle', setup.contactAngle ?? Math.PI / 2, 0, Math.PI, '0 to pi'))),
    sigma,
    forceX: finite('force.x', setup.force?.x ?? 0),
    forceY: finite('force.y', setup.force?.y ?? 0),
    gravityX: buoyancy * finite('gravity.x', setup.gravity?.x ?? 0),
    gravityY: buoyancy * finite('gravity.y', setup.gravity?.y ?? 0),
    drive: checkedDrive(setup.drive),
    skim: Float64Array.from({ length: nx }, (_, x) => share(setup.skim?.[x] ?? 0)),
    soundDamping: within('soundDamping', setup.soundDamping ?? 0, 0, 0.1, '0 to 0.1'),
    gasLimit: 1 / positiveOrInfinite('gasSpeedLimit', setup.gasSpeedLimit ?? 0.2) ** 2,
    speedLimit: positive('speedLimit', setup.speedLimit ?? 0.4),
    nu0: twoPhase ? sharedViscosity(setup.liquid, gas) : 0,
    geometry: solids,
    walls: boxWalls,
    bodies: bodies(setup, solids, boxWalls),
  };
}

/** nu0 of a box with gas, whose viscous force is explicit: neighbours overshoot beyond a kinematic viscosity of 1/6. */
function sharedViscosity(liquid: Fluid, gas: Fluid): number {
  for (const [name, { density, viscosity }] of Object.entries({ liquid, gas })) {
    const nu = viscosity / density;
    if (nu > NU_LIMIT) fail(`${name}.viscosity / ${name}.density is ${nu}; it must be at most ${NU_LIMIT} in a box with gas`);
  }
  return (NU0_SHARE * liquid.viscosity) / liquid.density;
}

function checkRheology({ liquid, gas }: Setup): void {
  if (gas?.rheology !== undefined) fail('gas.rheology is given; only a liquid has one');
  if (liquid.rheology === undefined) return;
  const { consistency, index, yieldStress, least, most = NU_LIMIT } = liquid.rheology;
  positive('liquid.rheology.consistency', consistency);
  within('liquid.rheology.index', index, 0.1, 1, '0.1 to 1');
  if (finite('liquid.rheology.yieldStress', yieldStress) < 0)
    fail(`liquid.rheology.yieldStress is ${yieldStress}; it must not be negative`);
  within('liquid.rheology.most', positive('liquid.rheology.most', most), 0, NU_LIMIT, `0 to ${NU_LIMIT}`);
  within('liquid.rheology.least', positive('liquid.rheology.least', least), 0, most * liquid.density, `0 to ${most * liquid.density}`);
}

function share(value: number): number {
  return value >= 0 && value < 1 ? value : fail(`skim holds ${value}; a share lies in 0 to 1`);
}

function checkedDrive(drive: Drive | undefined): Drive | undefined {
  if (drive?.kind === 'upflow') finite('drive.target', drive.target);
  if (drive?.kind === 'loss' && finite('drive.coefficient', drive.coefficient) < 0) {
    fail(`drive.coefficient is ${drive.coefficient}; it must not be negative`);
  }
  return drive;
}

function checkPair(nameA: string, a: Side, nameB: string, b: Side): void {
  if ((a === 'periodic') !== (b === 'periodic')) fail(`${nameA} and ${nameB} must both be periodic or neither`);
  for (const side of [a, b]) if (typeof side === 'object') finite(`speed of a moving wall`, side.speed);
}

/** Uniform x-force of the drive for a mean velocity `now` that was `before` one step ago. */
export function driveForce(drive: Drive | undefined, rhoLiquid: number, previousForce: number, now: number, before: number): number {
  if (drive === undefined) return 0;
  if (drive.kind === 'loss') return -drive.coefficient * now * Math.abs(now);
  return previousForce + 0.05 * rhoLiquid * (drive.target - 2 * now + before);
}
