import pc from 'picocolors';
import { SwatheError } from '../solver/index.ts';
import { version } from './version.ts';

/** What is printed of an error, and the exit code that goes with it: 2 usage or case, 3 solver, 4 output, 1 a fault of the tool. */
export function describeFailure(error: unknown): { text: string; exit: number } {
  if (error instanceof SwatheError) return { text: `${pc.red('swathe:')} ${error.message}${cause(error)}`, exit: error.exit };
  const stack = error instanceof Error ? (error.stack ?? error.message) : String(error);
  const request = `This is a fault of swathe ${version()} itself (node ${process.version}). Please report it with these lines and the case file.`;
  return { text: `${stack}\n${pc.red('swathe:')} ${request}`, exit: 1 };
}

/** The message of the system's error below ours, where ours does not quote it already. */
function cause(error: SwatheError): string {
  if (!(error.cause instanceof Error) || error.message.includes(error.cause.message)) return '';
  return ` (${error.cause.message})`;
}
