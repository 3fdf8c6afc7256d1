import type { Setup } from './setup.ts';

/** The cell that (x, y) is, wrapped where a side is periodic; undefined beyond a side that is not. */
export function cellAt({ nx, ny, sides }: Setup, x: number, y: number): [number, number] | undefined {
  if ((x < 0 || x >= nx) && sides.bottom !== 'periodic') return undefined;
  if ((y < 0 || y >= ny) && sides.left !== 'periodic') return undefined;
  return [((x % nx) + nx) % nx, ((y % ny) + ny) % ny];
}
