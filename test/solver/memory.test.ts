import { expect, it } from 'vitest';
import { createSimulation } from '../../solver/index.ts';
import { MILD_PAIR } from './boxes.ts';

it('takes at most 160 bytes a cell for a standard panel of two phases in f32, room for samples included', async () => {
  const [nx, ny] = [2000, 80];
  const sides = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' } as const;
  const simulation = await createSimulation({ nx, ny, sides, ...MILD_PAIR });
  // 154.5 when this was written: 72 of populations, 72 of fields, 3.3 of room for samples, the rest edges and lists
  expect(simulation.phi.data.buffer.byteLength / (nx * ny)).toBeLessThanOrEqual(160);
});
