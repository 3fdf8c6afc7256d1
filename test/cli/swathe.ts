import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** The built command line. */
export const MAIN = join(import.meta.dirname, '../../.build/cli/main.js');

/** How a command ended. */
export interface Ended {
  exit: number | null;
  signal: NodeJS.Signals | null;
  out: string;
  error: string;
}

/** A folder of its own for a test file; `remove` when done. */
export class Bench {
  readonly folder = mkdtempSync(join(tmpdir(), 'swathe-cli-'));

  /** Writes a file and returns its name, relative to the folder. */
  file(name: string, text: string): string {
    writeFileSync(join(this.folder, name), text);
    return name;
  }

  path(...parts: string[]): string {
    return join(this.folder, ...parts);
  }

  read(...parts: string[]): string {
    return readFileSync(this.path(...parts), 'utf8');
  }

  bytes(...parts: string[]): Buffer {
    return readFileSync(this.path(...parts));
  }

  json(...parts: string[]): Record<string, unknown> {
    return JSON.parse(this.read(...parts)) as Record<string, unknown>;
  }

  /** The tables of a run folder by name. */
  tables(run: string): Record<string, string> {
    const names = readdirSync(this.path(run)).filter((name) => name.endsWith('.csv'));
    return Object.fromEntries(names.map((name) => [name, this.read(run, name)]));
  }

  /** The pictures of the channel in a run folder, in order. */
  frames(run: string): Buffer[] {
    const names = readdirSync(this.path(run, 'frames')).sort();
    return names.map((name) => readFileSync(this.path(run, 'frames', name)));
  }

  /** Starts `swathe` in the folder. */
  start(...words: string[]): { child: ChildProcess; ended: Promise<Ended>; printed: () => string } {
    const child = spawn(process.execPath, [MAIN, ...words], { cwd: this.folder, env: { ...process.env, NO_COLOR: '1', npm_command: '' } });
    let out = '';
    let error = '';
    child.stdout.on('data', (chunk: Buffer) => {
      out += chunk.toString();
    });
    child.stderr.on('data', (chunk: Buffer) => {
      error += chunk.toString();
    });
    const ended = new Promise<Ended>((resolve, reject) => {
      child.on('error', reject);
      child.on('close', (exit, signal) => resolve({ exit, signal, out, error }));
    });
    return { child, ended, printed: () => out + error };
  }

  /** Runs `swathe` in the folder to its end. */
  swathe(...words: string[]): Promise<Ended> {
    return this.start(...words).ended;
  }

  remove(): void {
    rmSync(this.folder, { recursive: true, force: true });
  }
}

/** A case that takes about a second: a short and coarse piece of a panel, two bubbles in it from the start. */
export const TINY = `title: Short piece for tests
channel:
  gap: 8 mm
  height: 36 mm
  tilt: 10 deg
  membranes: [left, right]
gas:
  supply: 0.8 m3/(m2 h)
  serves: 1 m
  bubble: {diameter: 4 mm, spread: 10 %}
  softened: {density: 200 kg/m3, viscosity: 1e-3 Pa s}
  start:
    - {across: 4 mm, along: 14 mm, diameter: 4 mm}
grid: {across: 16}
record: {settle: 10 ms, span: 40 ms, every: 1 ms}
swept: {above: 0.1 Pa, within: 20 ms}
`;
