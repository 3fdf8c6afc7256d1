import { rgb } from 'd3-color';
import { interpolatePuOr, interpolateViridis } from 'd3-scale-chromatic';
import type { Colour } from './canvas.ts';

/** A colour map as a table: entry i stands for i / (size - 1). */
export type ColourMap = readonly Colour[];

/** Entries of a table: finer than the eye and the PNG can tell. */
const SIZE = 512;

/** Speed: dark slow, bright fast, readable with any colour vision. */
export const SPEED_MAP: ColourMap = tabulate((t) => interpolateViridis(0.04 + 0.91 * t));
/** Signed quantities: violet below zero, white at zero, orange above, readable with any colour vision. */
export const SIGNED_MAP: ColourMap = tabulate(interpolatePuOr);

function tabulate(interpolate: (t: number) => string): ColourMap {
  return Array.from({ length: SIZE }, (_, i): Colour => {
    const { r, g, b } = rgb(interpolate(i / (SIZE - 1)));
    return [r, g, b];
  });
}

/** The colour at `share` of the map, 0 to 1; beyond its ends the end's colour. */
export function colourAt(map: ColourMap, share: number): Colour {
  const i = Math.round(share * (map.length - 1));
  return map[i < 0 ? 0 : i >= map.length ? map.length - 1 : i];
}

/** Between two colours; 0 is the first. The ends are handed back as they are: most pixels of a picture are no mixture. */
export function mix(first: Colour, second: Colour, share: number): Colour {
  if (share === 0) return first;
  if (share === 1) return second;
  return [first[0] + share * (second[0] - first[0]), first[1] + share * (second[1] - first[1]), first[2] + share * (second[2] - first[2])];
}
