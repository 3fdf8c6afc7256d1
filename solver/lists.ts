/** The fixed lists in the kernel's memory, each in the order of the rows that see to its entries; see header.ts for their layout. */
import type { Box } from './box.ts';
import * as H from './header.ts';

/** A place in the kernel's memory: cell (x, y), a row of ghosts around included. */
interface Place {
  x: number;
  y: number;
}

/** Bytes that each list takes at most. */
export function listBytes({ ny, geometry, walls, bodies }: Box): [number, number][] {
  const neighbours = geometry.ghosts.reduce((n, ghost) => n + ghost.neighbours.length, 0);
  const rows = 4 * (ny + 1);
  return [
    [H.AT_LINKS, 48 * geometry.links.length],
    [H.AT_RUNS, 12 * geometry.runs.length],
    [H.AT_GHOSTS, 32 * geometry.ghosts.length + 24 * neighbours],
    [H.AT_TOUCHES, 32 * bodies.touches.length],
    [H.AT_FORCES, 16 * (bodies.count + 1)],
    [H.AT_RETURNS, 16 * walls.returns.length],
    [H.AT_WALL_GHOSTS, 8 * walls.ghosts.reduce((n, ghost) => n + 2 + 6 * ghost.faces.length, 0)],
    ...[H.AT_GHOST_ROWS, H.AT_RETURN_ROWS, H.AT_WALL_GHOST_ROWS].map((at): [number, number] => [at, rows]),
  ];
}

/** Writes the lists where the header says. */
export function writeLists(box: Box, header: Float64Array, bytesPerNumber: number): void {
  const { geometry, bodies } = box;
  const { buffer } = header;
  header[H.LINKS] = geometry.links.length;
  header[H.RUNS] = geometry.runs.length;
  header[H.TOUCHES] = bodies.touches.length;
  header[H.BODIES] = bodies.count;
  const touches = bodies.touches.flatMap((t) => [t.x, t.y, t.k, t.fluidX, t.fluidY, t.left, t.bodyX, t.bodyY]);
  new Int32Array(buffer, header[H.AT_TOUCHES], touches.length).set(touches);
  geometry.links.forEach(({ x, y, k, fluidX, fluidY, second, weight }, n) => {
    const link = header[H.AT_LINKS] + 48 * n;
    new Int32Array(buffer, link, 8).set([x, y, k, fluidX, fluidY, second.x, second.y, second.k]);
    new Float64Array(buffer, link + 32, 2).set(weight);
  });
  new Int32Array(buffer, header[H.AT_RUNS], 3 * geometry.runs.length).set(geometry.runs.flat());
  const ghosts = geometry.ghosts.map(({ x, y, neighbours, path }) => ({
    row: y,
    numbers: [x, y, neighbours.length, box.wetting ** path, ...neighbours.flatMap((n) => [n.x, n.y, n.weight])],
  }));
  writeByRow(box, header, H.AT_GHOSTS, H.AT_GHOST_ROWS, true, ghosts);
  if (!box.twoPhase) return;
  writeByRow(box, header, H.AT_RETURNS, H.AT_RETURN_ROWS, false, returns(box, header, bytesPerNumber));
  const place = (at: Place): number => at.y * header[H.STRIDE] + at.x * bytesPerNumber;
  const wallGhosts = box.walls.ghosts.map((ghost) => ({
    row: seenToBy(box, ghost.y),
    numbers: [
      ...[place(ghost), ghost.faces.length],
      ...ghost.faces.flatMap((face) => [place(face), place(face.behind ?? face), ...face.weight, face.ux, face.uy]),
    ],
  }));
  writeByRow(box, header, H.AT_WALL_GHOSTS, H.AT_WALL_GHOST_ROWS, true, wallGhosts);
}

/** The row of the box that sees to what lies at row y, which may be a row beyond a side. */
function seenToBy({ ny, setup }: Box, y: number): number {
  return setup.sides.left === 'periodic' ? (y + ny) % ny : Math.min(Math.max(y, 0), ny - 1);
}

interface Entry {
  row: number;
  numbers: number[];
}

function writeByRow({ ny }: Box, header: Float64Array, listAt: number, rowsAt: number, wide: boolean, entries: Entry[]): void {
  const sorted = entries.toSorted((a, b) => a.row - b.row);
  const rows = new Int32Array(header.buffer, header[rowsAt], ny + 1);
  let at = header[listAt];
  let next = 0;
  for (let y = 0; y <= ny; y++) {
    rows[y] = at;
    for (; next < sorted.length && sorted[next].row === y; next++) {
      const { numbers } = sorted[next];
      const view = wide ? new Float64Array(header.buffer, at, numbers.length) : new Int32Array(header.buffer, at, numbers.length);
      view.set(numbers);
      at += view.byteLength;
    }
  }
}

/** What walls return: neighbours along x whose stand-ins are neighbours too are copied together. */
function returns(box: Box, header: Float64Array, bytesPerNumber: number): Entry[] {
  // with gas the rows of populations stay in their places
  const address = (at: Place & { k: number }): number =>
    header[H.AT_POPULATIONS] + ((at.y + 1) * 18 + at.k) * header[H.STRIDE] + at.x * bytesPerNumber;
  const single = box.walls.returns.map((item) => ({
    row: seenToBy(box, item.y),
    numbers: [address(item), address(item.flow), address(item.interface), bytesPerNumber],
  }));
  single.sort((a, b) => a.numbers[0] - b.numbers[0]);
  const runs: Entry[] = [];
  for (const entry of single) {
    const last = runs.at(-1);
    const bytes = last?.numbers[3] ?? 0;
    const follows = last !== undefined && last.row === entry.row && [0, 1, 2].every((n) => entry.numbers[n] === last.numbers[n] + bytes);
    if (follows) last.numbers[3] += bytesPerNumber;
    else runs.push(entry);
  }
  return runs;
}
