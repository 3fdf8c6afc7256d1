import { describe, expect, it } from 'vitest';
import { describeFailure } from '../../cli/failure.ts';
import { CaseError, OutputError, SolverError, UsageError } from '../../solver/index.ts';

describe('a failure', () => {
  it('has the exit code of its kind', () => {
    const fault = { file: 'a.yaml', line: 3, column: 7, path: 'channel.gap', value: '8', problem: 'the unit is missing' };
    expect(describeFailure(new UsageError('out', 'm')).exit).toBe(2);
    expect(describeFailure(new CaseError([fault])).exit).toBe(2);
    expect(describeFailure(new SolverError('m', 'tooFast', 100, 3, 4)).exit).toBe(3);
    expect(describeFailure(new OutputError('runs/a', 'm')).exit).toBe(4);
    expect(describeFailure(new Error('m')).exit).toBe(1);
    expect(describeFailure('not even an error').exit).toBe(1);
  });

  it('of our own prints its message and the cause, without a stack', () => {
    const { text } = describeFailure(new OutputError('runs/a', 'cannot write runs/a', { cause: new Error('ENOSPC: no space left') }));
    expect(text).toContain('cannot write runs/a (ENOSPC: no space left)');
    expect(text).not.toMatch(/\n\s+at /);
  });

  it('of another kind prints the stack and asks for a report', () => {
    const { text } = describeFailure(new TypeError('x is undefined'));
    expect(text).toContain('TypeError: x is undefined');
    expect(text).toMatch(/\n\s+at /);
    expect(text).toContain('Please report it');
  });
});
