import { expect, it } from 'vitest';
import { rowsOf } from './checks/findings.ts';

it('the full tool shows that more air shears the walls more', async () => {
  const [row] = await rowsOf('finding-supply', { settle_s: 0.25, span_s: 0.5, seeds: [1, 2] }, 1);
  expect(row.ours[0].value).toBeGreaterThan(0.3);
});
