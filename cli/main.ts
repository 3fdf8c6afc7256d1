#!/usr/bin/env node
import { commandLine } from './commands.ts';
import { describeFailure } from './failure.ts';

/** The one place that prints an error and sets the exit code. */
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  // a reader such as `head` has enough
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});
try {
  process.exitCode = await commandLine(process.argv.slice(2));
} catch (error) {
  const failure = describeFailure(error);
  process.stderr.write(`${failure.text}\n`);
  process.exitCode = failure.exit;
}
