import type { Snapshot, WallSide } from '../../cases/index.ts';
import { type Canvas, type Colour, FIN, INK } from './canvas.ts';
import { colourAt, mix, SPEED_MAP } from './colours.ts';

/**
 * Where the channel lies in a picture. Cells to pixels, tilt a counter-clockwise from upright, X up the channel, Y to its right wall:
 * column = originX + scale (-X sin a + Y cos a), row = originY - scale (X cos a + Y sin a).
 */
export interface Placing {
  originX: number;
  originY: number;
  /** pixels to the cell */
  scale: number;
  tilt_rad: number;
}

export interface Point {
  x: number;
  y: number;
}

/** Picture point of a channel point in cells from the lower left corner. */
export function place(placing: Placing, along: number, across: number): Point {
  const sin = Math.sin(placing.tilt_rad);
  const cos = Math.cos(placing.tilt_rad);
  return {
    x: placing.originX + placing.scale * (across * cos - along * sin),
    y: placing.originY - placing.scale * (along * cos + across * sin),
  };
}

/** Walls are drawn outside the liquid, so thick. */
export const WALL_PIXELS = 5;
const MEMBRANE: Colour = INK;
const PLAIN: Colour = [186, 190, 196];
const GAS: Colour = [250, 251, 252];
const EDGE: Colour = [12, 14, 22];
/** Half the thickness of the line around bubbles, pixels. */
const EDGE_HALF = 0.9;
/** Width of the interface profile phi = 1/2 + 1/2 tanh(2 d / W) from which the distance d to the edge is read; cells. */
const INTERFACE_CELLS = 5;
/** Length of the dashes in the lines where the release band ends and the skim band begins. */
const DASH_PIXELS = 6;

export interface StripStyle {
  membranes: readonly WallSide[];
  /** colour of the map's end */
  speedTop_m_s: number;
  /** dashed lines across the channel, cells from its lower end */
  lines: readonly number[];
}

/** What a pixel's colour is found from. */
interface Scene extends Pick<Snapshot, 'nx' | 'ny' | 'phi' | 'solid'>, Pick<StripStyle, 'speedTop_m_s' | 'lines'> {
  scale: number;
  /** shape (ny, nx) */
  speed: Float32Array;
  leftWall: Colour;
  rightWall: Colour;
  finned: boolean;
  /** from this phi on, and below its mirror image, no edge line is in sight: most pixels are spared the logarithm */
  clear: number;
}

/** Draws the channel itself: speed in the liquid, bubbles as light shapes with a dark edge, fins grey, walls along both sides. */
export function drawStrip(canvas: Canvas, snapshot: Snapshot, placing: Placing, style: StripStyle): void {
  const { nx, ny } = snapshot;
  const { scale } = placing;
  const scene: Scene = {
    nx,
    ny,
    phi: snapshot.phi,
    solid: snapshot.solid,
    scale,
    lines: style.lines,
    speedTop_m_s: style.speedTop_m_s,
    speed: speeds(snapshot),
    leftWall: style.membranes.includes('left') ? MEMBRANE : PLAIN,
    rightWall: style.membranes.includes('right') ? MEMBRANE : PLAIN,
    finned: snapshot.solid.includes(1),
    clear: 0.5 + 0.5 * Math.tanh((2 * (EDGE_HALF + 0.51)) / (INTERFACE_CELLS * scale)),
  };
  const sin = Math.sin(placing.tilt_rad);
  const cos = Math.cos(placing.tilt_rad);
  const wall = WALL_PIXELS / scale;
  const corners = [place(placing, 0, -wall), place(placing, nx, -wall), place(placing, 0, ny + wall), place(placing, nx, ny + wall)];
  const firstRow = Math.max(0, Math.floor(Math.min(...corners.map((c) => c.y))) - 1);
  const lastRow = Math.min(canvas.height - 1, Math.ceil(Math.max(...corners.map((c) => c.y))) + 1);

  for (let row = firstRow; row <= lastRow; row++) {
    const up = (placing.originY - (row + 0.5)) / scale;
    // columns where Y = right cos + up sin lies in the strip: no other pixel of the row is looked at
    const from = placing.originX + (scale * (-wall - up * sin)) / cos;
    const to = placing.originX + (scale * (ny + wall - up * sin)) / cos;
    const lastColumn = Math.min(canvas.width - 1, Math.ceil(to) + 1);
    for (let column = Math.max(0, Math.floor(from) - 1); column <= lastColumn; column++) {
      const right = (column + 0.5 - placing.originX) / scale;
      const along = up * cos - right * sin;
      const across = right * cos + up * sin;
      // share of the pixel inside the strip, walls included
      const inside = cover(Math.min(along, nx - along, across + wall, ny + wall - across) * scale);
      if (inside === 0) continue;
      canvas.blend(column, row, colourOf(scene, along, across), inside);
    }
  }
}

/** Colour at a place in cells. Outside of the drawing, for a function made anew for each frame is compiled anew, which took as long as the drawing. */
function colourOf(scene: Scene, along: number, across: number): Colour {
  const { nx, ny, phi, solid, speed, scale, leftWall, rightWall, clear } = scene;
  if (cover(-across * scale) === 1) return leftWall;
  if (cover((across - ny) * scale) === 1) return rightWall;
  // bilinear between the four nearest cell centres, held at the edges of the box
  const cx = Math.min(Math.max(along - 0.5, 0), nx - 1);
  const cy = Math.min(Math.max(across - 0.5, 0), ny - 1);
  const x = Math.min(Math.floor(cx), Math.max(0, nx - 2));
  const y = Math.min(Math.floor(cy), Math.max(0, ny - 2));
  const fx = cx - x;
  const fy = cy - y;
  const i = y * nx + x;
  const right = nx > 1 ? 1 : 0;
  const up = ny > 1 ? nx : 0;
  const w00 = (1 - fx) * (1 - fy);
  const w10 = fx * (1 - fy);
  const w01 = (1 - fx) * fy;
  const w11 = fx * fy;
  const j = i + up;
  const liquid = w00 * phi[i] + w10 * phi[i + right] + w01 * phi[j] + w11 * phi[j + right];

  let colour = GAS;
  if (liquid > 1 - clear) {
    const fast = w00 * speed[i] + w10 * speed[i + right] + w01 * speed[j] + w11 * speed[j + right];
    colour = colourAt(SPEED_MAP, fast / scene.speedTop_m_s);
    for (const line of scene.lines) {
      const off = Math.abs(along - line) * scale;
      if (off < 0.75 && Math.floor((across * scale) / DASH_PIXELS) % 2 === 0) colour = mix(colour, GAS, 0.75);
    }
    if (liquid < clear) {
      const toEdge = 0.5 * INTERFACE_CELLS * Math.atanh(2 * liquid - 1) * scale;
      colour = mix(colour, GAS, cover(-toEdge));
      colour = mix(colour, EDGE, cover(EDGE_HALF - Math.abs(toEdge)));
    }
  }
  if (scene.finned && solid[i] + solid[i + right] + solid[j] + solid[j + right] > 0) {
    const within = w00 * solid[i] + w10 * solid[i + right] + w01 * solid[j] + w11 * solid[j + right];
    colour = mix(colour, FIN, cover((within - 0.5) * scale));
  }
  if (across < 1 / scale) colour = mix(colour, leftWall, cover(-across * scale));
  if (across > ny - 1 / scale) colour = mix(colour, rightWall, cover((across - ny) * scale));
  return colour;
}

/** How much of a pixel lies inside, `depth` pixels from the edge to its centre. */
function cover(depth: number): number {
  return depth <= -0.5 ? 0 : depth >= 0.5 ? 1 : depth + 0.5;
}

function speeds(snapshot: Snapshot): Float32Array {
  const { ux_m_s, uy_m_s } = snapshot;
  const speed = new Float32Array(ux_m_s.length);
  for (let i = 0; i < speed.length; i++) speed[i] = Math.sqrt(ux_m_s[i] * ux_m_s[i] + uy_m_s[i] * uy_m_s[i]);
  return speed;
}

/** The wall colours named in a key. */
export function wallKey(membranes: readonly WallSide[]): { colour: Colour; name: string }[] {
  const key: { colour: Colour; name: string }[] = [];
  if (membranes.length > 0) key.push({ colour: MEMBRANE, name: 'membrane' });
  if (membranes.length < 2) key.push({ colour: PLAIN, name: 'plain wall' });
  return key;
}
