// Looks numbers up in the table of rheology.ts, one by one, since lanes cannot gather: entry over rate^2, 64 to a doubling.
import * as H from '../header';
import { address } from './rows';

/** steps between two updates of the viscosity */
export const EVERY: i64 = 8;
const LOWEST: i32 = -60;

/** Puts what the table holds in place of `count` squares of rates; what is not a number counts as the lowest. */
export function lookUp<T>(at: usize, count: i32): void {
  const table = address(H.AT_TABLE);
  const least: f64 = 2.0 ** -60.0;
  const most: f64 = 16.0 * (1.0 - 2.0 ** -40.0);
  const end = at + <usize>count * sizeof<T>();
  do {
    const square = <f64>load<T>(at);
    const bits = reinterpret<u64>(square > least ? (square < most ? square : most) : least);
    // 11 bits of exponent, 6 bits choose among the 64 entries of a doubling, 46 lie between two of them
    const place = table + <usize>((<i32>(bits >> 46) - ((1023 + LOWEST) << 6)) << 3);
    const between = <f64>(<i64>(bits & 0x3fffffffffff)) * 2.0 ** -46.0;
    const here = load<f64>(place);
    store<T>(at, <T>(here + between * (load<f64>(place, 8) - here)));
    at += sizeof<T>();
  } while (at < end);
}
