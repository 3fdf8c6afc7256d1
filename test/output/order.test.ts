import fc from 'fast-check';
import { expect, test } from 'vitest';
import { ascending } from '../../output/measures/order.ts';

test('any magnitudes come out in the order the language sorts them, and the input stays', () => {
  const magnitude = fc.float({ min: 0, noNaN: true });
  fc.assert(
    fc.property(fc.float32Array({ min: 0, noNaN: true }), fc.array(magnitude), (values, more) => {
      const all = Float32Array.from([...values, ...more], Math.abs);
      const before = all.slice();
      expect(ascending(all)).toEqual(all.slice().sort());
      expect(all).toEqual(before);
    }),
  );
});

test('a part of a larger array is sorted alone', () => {
  const part = Float32Array.from([9, 3, 1, 2, 0]).subarray(1, 4);
  expect([...ascending(part)]).toEqual([1, 2, 3]);
});
