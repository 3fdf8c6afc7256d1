import { existsSync, readFileSync } from 'node:fs';
import { csvParse, type DSVRowString } from 'd3-dsv';
import type { Bench } from './swathe.ts';

/** A case of about a second of computing, two bubbles in it from the start. */
export const PIECE = `title: Short piece for sweeps
channel: {gap: 8 mm, height: 36 mm, tilt: 10 deg, membranes: [left, right]}
gas:
  supply: 0.8 m3/(m2 h)
  serves: 1 m
  bubble: {diameter: 3 mm}
  softened: {density: 200 kg/m3, viscosity: 1e-3 Pa s}
  start:
    - {across: 4 mm, along: 14 mm, diameter: 3 mm}
grid: {across: 16}
record: {settle: 10 ms, span: 40 ms, every: 1 ms}
swept: {above: 0.1 Pa, within: 20 ms}
`;

/** Six points of it. */
export const PLAN = `title: Brackenfold, gap by tilt
base: piece.yaml
vary:
  - {key: channel.gap, values: [7 mm, 8 mm, 9 mm]}
  - {key: channel.tilt, from: 0 deg, to: 20 deg, step: 20 deg}
`;

/** Twenty-four points of a piece with a fin: gap by tilt by angle. */
export const FINNED = PIECE.replace(
  'grid:',
  'fins:\n  - {from: 20 mm, across: 2.4 mm, length: 4 mm, thickness: 1.2 mm, angle: 20 deg}\ngrid:',
);
export const PLAN24 = `title: Brackenfold, gap by tilt by fin angle
base: finned.yaml
vary:
  - {key: channel.gap, values: [7 mm, 8 mm, 9 mm]}
  - {key: channel.tilt, from: 0 deg, to: 30 deg, step: 10 deg}
  - {key: fins.0.angle, values: [0 deg, 30 deg]}
`;

/** Long tests, on the plan of twenty-four points. */
export const SLOW = process.env.SWATHE_SLOW === '1';

/** The rows of a sweep's table. */
export function rowsOf(bench: Bench, folder: string): DSVRowString[] {
  return [...csvParse(bench.read(folder, 'results.csv'))];
}

/** The table without what depends on the clock. */
export function timeless(bench: Bench, folder: string): string {
  return JSON.stringify(rowsOf(bench, folder).map(({ timeTaken_s, ...rest }) => rest));
}

/** Processes that run a case of a sweep in this folder. */
export function childrenOf(bench: Bench, folder: string, points: number): number[] {
  const found: number[] = [];
  for (let point = 1; point <= points; point++) {
    const file = bench.path(folder, 'points', String(point).padStart(4, '0'), 'run.json');
    if (!existsSync(file)) continue;
    const { status, process: owner } = JSON.parse(readFileSync(file, 'utf8')) as { status: string; process: { pid: number } };
    if (status === 'running' && isAlive(owner.pid)) found.push(owner.pid);
  }
  return found;
}

export function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

export async function until(condition: () => boolean, most_ms = SLOW ? 600_000 : 60_000, every_ms = 10): Promise<void> {
  const end = performance.now() + most_ms;
  while (!condition()) {
    if (performance.now() > end) throw new Error(`waited ${most_ms} ms in vain`);
    await new Promise((resolve) => setTimeout(resolve, every_ms));
  }
}
