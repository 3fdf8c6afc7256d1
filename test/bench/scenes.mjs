// The scenes of the bench, all seeded: the panel's numbers at 80 cells across 8 mm, air and water, both walls, a loop.

const seeded = (seed) => {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
};

/** Places of round bubbles, one in each `pitch` cells of the channel, off the middle by chance. */
function bubbles(nx, ny, radius, pitch) {
  const next = seeded(7);
  const count = Math.max(1, Math.round(nx / pitch));
  return Array.from({ length: count }, (_, n) => ({
    x: ((n + 0.5) * nx) / count,
    y: ny / 2 + (next() - 0.5) * (ny - 2 * radius - 12) * 0.5,
  }));
}

/** phi of the nearest bubble along the periodic channel. */
function phiOf(nx, radius, places) {
  return (x, y) => {
    const distance = places.reduce((least, place) => {
      const along = Math.abs(x - place.x);
      return Math.min(least, Math.hypot(Math.min(along, nx - along), y - place.y));
    }, Number.POSITIVE_INFINITY);
    return 0.5 + 0.5 * Math.tanh((2 * (distance - radius)) / 5);
  };
}

/** pure: a box without gas; one: a single bubble; panel: 5 % of gas; everything: as the panel, with no tile left alone. */
export const KINDS = ['pure', 'one', 'panel', 'everything'];

export function scene(kind, nx, ny) {
  const radius = 0.25 * ny;
  const places = bubbles(nx, ny, radius, kind === 'one' ? nx : 4 * ny);
  const gas = {
    gas: { density: 1.2e-3, viscosity: 1.2e-5 },
    surfaceTension: 3.2e-3,
    gravity: { x: -4.4e-6, y: 0 },
    soundDamping: 0.01,
    tiles: kind !== 'everything',
  };
  return {
    nx,
    ny,
    sides: { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' },
    liquid: { density: 1, viscosity: 6.7e-4 },
    ...(kind === 'pure' ? {} : gas),
    drive: { kind: 'loss', coefficient: 1e-4 },
    force: { x: 1e-8, y: 0 },
    initial: {
      ...(kind === 'pure' ? {} : { phi: phiOf(nx, radius, places) }),
      velocity: (_, y) => ({ x: (0.06 * (y + 0.5) * (ny - 0.5 - y)) / ny ** 2, y: 0 }),
    },
  };
}
