import { afterAll, describe, expect, it } from 'vitest';
import { commandNames, OPTIONS } from '../../cli/options.ts';
import { Bench, TINY } from './swathe.ts';

const bench = new Bench();
afterAll(() => bench.remove());

describe('help and version', () => {
  it('name every command', async () => {
    const { exit, out } = await bench.swathe('--help');
    expect(exit).toBe(0);
    for (const command of commandNames) expect(out).toMatch(new RegExp(`swathe ${command} `));
    expect(out).toMatch(/Compressed air, chemicals and lifting\s+modules can hurt\s+people/);
  });

  it('name every option of a command', async () => {
    for (const [command, options] of Object.entries(OPTIONS)) {
      const { exit, out } = await bench.swathe(command, '--help');
      expect(exit).toBe(0);
      for (const option of Object.keys(options)) expect(out, command).toContain(`--${option} `);
    }
  });

  it('come fast, since the work of a command is loaded with it', async () => {
    const start = performance.now();
    await bench.swathe('--help');
    // 0.2 s seen on an idle machine; loading every room takes more than a second
    expect(performance.now() - start).toBeLessThan(2000);
  });

  it('give the version of package.json', async () => {
    const { exit, out } = await bench.swathe('--version');
    expect(exit).toBe(0);
    expect(out.trim()).toMatch(/^\d+\.\d+\.\d+$/);
  });
});

describe('a command line that is wrong', () => {
  bench.file('tiny.yaml', TINY);
  bench.file('words.yaml', 'title: 5\nchannel: {gap: 8}\n');
  bench.file('bytes.yaml', '');
  const wrong: [string[], string][] = [
    [[], 'no command given, try: swathe run tilted-panel. swathe --help lists what there is'],
    [['rnu', 'tilted-panel'], 'rnu is no command; did you mean run? swathe --help lists what there is'],
    [['tiny.yaml'], 'no command given before tiny.yaml; to run it: swathe run tiny.yaml'],
    [['run'], 'run needs a case: a file, or a name that swathe gallery lists, as in swathe run tilted-panel'],
    [['run', 'tiny.yaml', '--quite'], 'run has no option --quite; did you mean --quiet? swathe run --help lists the options'],
    [['run', 'tiny.yaml', '--wobble=3'], 'run has no option --wobble. swathe run --help lists the options'],
    [['run', 'tiny.yaml', '-q'], 'run has no option -q'],
    [['run', 'tiny.yaml', 'other.yaml'], 'one word too many: other.yaml; put values with spaces in quotes'],
    [['run', 'tiny.yaml', '--out'], '--out needs a value'],
    [['run', 'tiny.yaml', '--out', ''], '--out needs a value'],
    [['run', 'tiny.yaml', '--out', 'a', '--out', 'b'], '--out is given 2 times (a, b); give it once'],
    [['run', 'tiny.yaml', '--frames', 'many'], '--frames many: not a whole number from 2 to 10000'],
    [['run', 'tiny.yaml', '--frames', '0'], '--frames 0: not a whole number from 2 to 10000'],
    [['run', 'tiny.yaml', '--frames', '1e9'], '--frames 1e9: not a whole number from 2 to 10000'],
    [['run', 'tiny.yaml', '--checkpoint', '-1'], '--checkpoint'],
    [
      ['run', 'tilted-pannel'],
      'tilted-pannel: no such file, and no ready-made case has that name (swathe gallery lists them). Did you mean tilted-panel?',
    ],
    [['check', 'tyni.yaml'], 'Did you mean tiny.yaml?'],
    [['check', '.'], '. is a folder, not a case file'],
    [['gallery', 'single-buble'], 'single-buble is no ready-made case; did you mean single-bubble?'],
    [['check', 'tiny.yaml', '--set', 'channel.tilt'], 'channel.tilt'],
    [['check', 'tiny.yaml', '--set', 'channel.tlit=5 deg'], 'tilt'],
    [['check', 'tiny.yaml', '--set', 'channel.gap=8 kg'], 'channel.gap'],
  ];
  it.each(wrong)('%j ends with exit code 2 and says what to do', async (words, message) => {
    const { exit, out, error } = await bench.swathe(...words);
    expect(error).toContain(message);
    expect(error).not.toMatch(/\n\s+at /);
    expect(out).toBe('');
    expect(exit).toBe(2);
  });

  it('names the file, the line and every fault of a wrong case', async () => {
    const { exit, error } = await bench.swathe('run', 'words.yaml');
    expect(exit).toBe(2);
    expect(error).toMatch(/words\.yaml:\d+:\d+: .*channel\.gap/);
  });
});
