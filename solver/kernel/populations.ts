// The eight moving populations of a cell from its raw moments (fromMoments of collide.ts), each stored where it leaves from.
import { stride } from './rows';
import { add, mul, put, splat, sub } from './vector';

/** `rest`: where the population at rest lies; the others follow it, a stride apart. */
@inline export function send<T>(rest: usize, q10: v128, q01: v128, q20: v128, q02: v128, q11: v128, q21: v128, q12: v128, q22: v128): void {
  const half = splat<T>(0.5);
  const quarter = splat<T>(0.25);
  const evenX = mul<T>(half, sub<T>(q20, q22));
  const oddX = mul<T>(half, sub<T>(q10, q12));
  put(rest + stride, add<T>(evenX, oddX));
  put(rest + 3 * stride, sub<T>(evenX, oddX));
  const evenY = mul<T>(half, sub<T>(q02, q22));
  const oddY = mul<T>(half, sub<T>(q01, q21));
  put(rest + 2 * stride, add<T>(evenY, oddY));
  put(rest + 4 * stride, sub<T>(evenY, oddY));
  const even57 = mul<T>(quarter, add<T>(q22, q11));
  const odd57 = mul<T>(quarter, add<T>(q12, q21));
  put(rest + 5 * stride, add<T>(even57, odd57));
  put(rest + 7 * stride, sub<T>(even57, odd57));
  const even68 = mul<T>(quarter, sub<T>(q22, q11));
  const odd68 = mul<T>(quarter, sub<T>(q12, q21));
  put(rest + 6 * stride, sub<T>(even68, odd68));
  put(rest + 8 * stride, add<T>(even68, odd68));
}
