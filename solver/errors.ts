/**
 * The four kinds of failure, each with the data its message is made from and the exit code it ends a command with.
 * A message names the object, the value, the limit and the next thing to try.
 */

/** Base of all errors the tool raises on purpose; `exit` is the process exit code. */
export abstract class SwatheError extends Error {
  abstract readonly exit: number;
}

/** A command was called wrongly. */
export class UsageError extends SwatheError {
  override readonly name = 'UsageError';
  readonly exit = 2;
  readonly option: string;
  constructor(option: string, message: string) {
    super(message);
    this.option = option;
  }
}

/** Where and what a {@link CaseError} found: 1-based line and column, key path such as `gas.bubble.diameter`. */
export interface CaseFault {
  file: string;
  line: number;
  column: number;
  path: string;
  value: string;
  problem: string;
  allowed?: string;
  remedy?: string;
}

/** A case text that cannot be computed. One error carries every fault found. */
export class CaseError extends SwatheError {
  override readonly name = 'CaseError';
  readonly exit = 2;
  readonly faults: readonly CaseFault[];
  constructor(faults: readonly CaseFault[]) {
    super(faults.map(describeFault).join('\n'));
    this.faults = faults;
  }
}

function describeFault(fault: CaseFault): string {
  const place = `${fault.file}:${fault.line}:${fault.column}`;
  const what = fault.path === '' ? fault.problem : `${fault.path}: ${fault.problem}`;
  const read = fault.value === '' ? '' : ` (read: ${fault.value})`;
  const allowed = fault.allowed === undefined ? '' : `; allowed: ${fault.allowed}`;
  const remedy = fault.remedy === undefined ? '' : `. ${fault.remedy}`;
  return `${place}: ${what}${read}${allowed}${remedy}`;
}

/** The computation left the range it is valid in. `step` counts from the start, `x` and `y` are cells. */
export class SolverError extends SwatheError {
  override readonly name = 'SolverError';
  readonly exit = 3;
  readonly status: 'nonFinite' | 'tooFast';
  readonly step: number;
  readonly x: number;
  readonly y: number;
  constructor(message: string, status: 'nonFinite' | 'tooFast', step: number, x: number, y: number) {
    super(message);
    this.status = status;
    this.step = step;
    this.x = x;
    this.y = y;
  }
}

/** A result could not be written or a run folder not be read. */
export class OutputError extends SwatheError {
  override readonly name = 'OutputError';
  readonly exit = 4;
  readonly path: string;
  constructor(path: string, message: string, options?: ErrorOptions) {
    super(message, options);
    this.path = path;
  }
}
