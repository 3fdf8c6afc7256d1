import { Compiled } from './compiled.ts';
import { kernelModule } from './module.ts';
import { Reference } from './reference.ts';
import type { Setup } from './setup.ts';
import type { Simulation } from './simulation.ts';

export { CaseError, type CaseFault, OutputError, SolverError, SwatheError, UsageError } from './errors.ts';
export type { Drive, Fluid, Setup, Side, Vector } from './setup.ts';
export type { Field, Rows, Samples, Simulation, Status } from './simulation.ts';

/**
 * A simulation of the box on the compiled kernel (f32 unless the setup says f64).
 * @param threads most threads to compute with; the result has the same bits for any number
 * @throws {RangeError} on a setup that cannot be computed
 */
export const createSimulation = async (setup: Setup, threads = 1): Promise<Simulation> =>
  Compiled.create(setup, await kernelModule(), threads);

/** The slow, plain twin of `createSimulation`: scalar f64, one step after another as reference.ts reads. */
export const createReference = (setup: Setup): Simulation => new Reference(setup);
