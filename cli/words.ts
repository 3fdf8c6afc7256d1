import { closest, distance } from 'fastest-levenshtein';
import { UsageError } from '../solver/index.ts';
import { commandNames, optionNames } from './options.ts';

/** The nearest of `known` to `word`, when it is near enough to be a slip: two letters (one in a short word), or a third of a long one. */
export function nearMiss(word: string, known: readonly string[]): string | undefined {
  if (known.length === 0 || word === '') return undefined;
  const near = closest(word.toLowerCase(), known);
  const most = Math.max(word.length < 3 ? 1 : 2, Math.floor(near.length / 3));
  return distance(word.toLowerCase(), near) <= most ? near : undefined;
}

/** `; did you mean run?` or nothing. */
export function suggestion(word: string, known: readonly string[], prefix = ''): string {
  const near = nearMiss(word, known);
  return near === undefined ? '' : `; did you mean ${prefix}${near}?`;
}

/** Our words for what the parser of the command line complains about. */
export function rewordComplaint(message: string, words: readonly string[]): UsageError {
  const command = words.find((word) => commandNames.includes(word));
  const help = command === undefined ? 'swathe --help lists what there is' : `swathe ${command} --help lists the options`;
  if (message === 'no command given') {
    return new UsageError('', `no command given, try: swathe run tilted-panel. ${help}`);
  }
  const unknown = /^Unknown (?:argument|command)s?: (.*)$/s.exec(message);
  if (unknown) {
    const complaint = unknownWord(unknown[1].split(', ')[0], command, words);
    return new UsageError(unknown[1], `${complaint}${complaint.endsWith('?') ? '' : '.'} ${help}`);
  }
  const valueless = /^(?:Not enough arguments following|Missing argument values?): (.*)$/s.exec(message);
  if (valueless) return new UsageError(valueless[1], `--${valueless[1]} needs a value. ${help}`);
  return new UsageError('', `${message}. ${help}`);
}

function unknownWord(word: string, command: string | undefined, words: readonly string[]): string {
  const option = words.find((given) => given.replace(/^--?/, '').split('=')[0] === word && given.startsWith('-'));
  if (option !== undefined) {
    const where = command === undefined ? 'swathe' : command;
    return `${where} has no option ${option.split('=')[0]}${suggestion(word, optionNames(command), '--')}`;
  }
  if (command !== undefined) return `one word too many: ${word}; put values with spaces in quotes`;
  if (/\.ya?ml$/.test(word)) return `no command given before ${word}; to run it: swathe run ${word}`;
  return `${word} is no command${suggestion(word, commandNames)}`;
}

/** The value of an option that may stand once. */
export function single(option: string, value: string | string[] | undefined): string | undefined {
  if (Array.isArray(value)) throw new UsageError(option, `--${option} is given ${value.length} times (${value.join(', ')}); give it once`);
  if (value === '') throw new UsageError(option, `--${option} needs a value`);
  return value;
}

/** A positional word that must be there. */
export function required(command: string, word: string | undefined): string {
  if (word !== undefined && word !== '') return word;
  if (command === 'sweep') throw new UsageError('plan', 'sweep needs a plan: a file that names a base case and what to vary');
  throw new UsageError(
    'case',
    `${command} needs a case: a file, or a name that swathe gallery lists, as in swathe ${command} tilted-panel`,
  );
}

/** A number written in plain digits, within limits, both allowed. */
export function numberWithin(option: string, text: string, limits: { least: number; most: number; whole: boolean }): number {
  const value = (limits.whole ? /^\d+$/ : /^\d+(\.\d+)?$/).test(text) ? Number(text) : Number.NaN;
  if (value >= limits.least && value <= limits.most) return value;
  throw new UsageError(option, `--${option} ${text}: not a ${limits.whole ? 'whole ' : ''}number from ${limits.least} to ${limits.most}`);
}

/** A word as a shell takes it back: quoted where it has to be. */
export function shellWord(word: string): string {
  return /^[\w./:=@%+-]+$/.test(word) ? word : `'${word.replaceAll("'", "'\\''")}'`;
}

/** The command as it was given, for the shell it was given in, but for starting over. */
export function commandToGoOn(words: readonly string[]): string {
  const program = process.env.npm_command === 'exec' ? 'npx swathe' : 'swathe';
  return [program, ...words.filter((word) => !/^--again(=|$)/.test(word)).map(shellWord)].join(' ');
}
