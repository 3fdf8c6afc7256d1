import { expect, it } from 'vitest';
import * as header from '../../solver/header.ts';

it('gives every entry of the header a place of its own, inside the header', () => {
  const { VERSION: _, HEADER_BYTES, ...entries } = header;
  const places = Object.values(entries);
  expect(new Set(places).size).toBe(places.length);
  expect(Math.max(...places)).toBeLessThan(HEADER_BYTES / 8);
});
