import type { Snapshot } from '../../cases/index.ts';

/** A made state: a parabola of speed, round bubbles with the tanh profile, and optionally a slanting fin. */
export function makeSnapshot(
  nx: number,
  ny: number,
  bubbles: { x: number; y: number; radius: number }[],
  fin = false,
  time_s = 1.25,
): Snapshot {
  const n = nx * ny;
  const snapshot: Snapshot = {
    time_s,
    nx,
    ny,
    phi: new Float32Array(n).fill(1),
    ux_m_s: new Float32Array(n),
    uy_m_s: new Float32Array(n),
    solid: new Uint8Array(n),
  };
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      const i = y * nx + x;
      const across = (y + 0.5) / ny;
      snapshot.ux_m_s[i] = 0.8 * across * (1 - across);
      for (const bubble of bubbles) {
        const distance = Math.hypot(x - bubble.x, y - bubble.y) - bubble.radius;
        snapshot.phi[i] = Math.min(snapshot.phi[i], 0.5 + 0.5 * Math.tanh((2 * distance) / 5));
        snapshot.ux_m_s[i] += 0.25 * Math.exp(-((distance / 12) ** 2)) * Math.cos(y / 9);
        snapshot.uy_m_s[i] += 0.15 * Math.exp(-((distance / 12) ** 2)) * Math.sin(x / 9);
      }
      if (fin && Math.abs(x - nx / 2 - 0.5 * (y - 12)) < 4 && y > 5 && y < 22) snapshot.solid[i] = 1;
    }
  }
  return snapshot;
}
