// The verbs of the kernel: one 16-byte group of lanes of T (four f32, two f64). v128 takes no operators, and a class around
// it would live on the heap; inlined functions cost nothing.

// @ts-ignore: decorator
@inline export function add<T>(a: v128, b: v128): v128 { return v128.add<T>(a, b); }
// @ts-ignore: decorator
@inline export function sub<T>(a: v128, b: v128): v128 { return v128.sub<T>(a, b); }
// @ts-ignore: decorator
@inline export function mul<T>(a: v128, b: v128): v128 { return v128.mul<T>(a, b); }
// @ts-ignore: decorator
@inline export function div<T>(a: v128, b: v128): v128 { return v128.div<T>(a, b); }
/** a b + c */
// @ts-ignore: decorator
@inline export function mad<T>(a: v128, b: v128, c: v128): v128 { return v128.add<T>(v128.mul<T>(a, b), c); }
/** c - a b */
// @ts-ignore: decorator
@inline export function nmad<T>(a: v128, b: v128, c: v128): v128 { return v128.sub<T>(c, v128.mul<T>(a, b)); }
// @ts-ignore: decorator
@inline export function root<T>(a: v128): v128 { return v128.sqrt<T>(a); }
/** b where a < b, else a: one instruction, where `v128.max` takes seven for its care of what is not a number */
// @ts-ignore: decorator
@inline export function atLeast<T>(a: v128, b: v128): v128 { return v128.pmax<T>(a, b); }
/** b where b < a, else a */
// @ts-ignore: decorator
@inline export function atMost<T>(a: v128, b: v128): v128 { return v128.pmin<T>(a, b); }
// @ts-ignore: decorator
@inline export function splat<T>(a: f64): v128 { return v128.splat<T>(<T>a); }
// @ts-ignore: decorator
@inline export function get(at: usize): v128 { return v128.load(at); }
// @ts-ignore: decorator
@inline export function put(at: usize, a: v128): void { v128.store(at, a); }

/** Sum of the lanes. */
export function total<T>(a: v128): f64 {
  let sum: f64 = <f64>v128.extract_lane<T>(a, 0) + <f64>v128.extract_lane<T>(a, 1);
  if (sizeof<T>() == 4) sum += <f64>v128.extract_lane<T>(a, 2) + <f64>v128.extract_lane<T>(a, 3);
  return sum;
}

/** Largest lane of `top`; not a number where a lane of `sum`, which such numbers stick to, is none. */
export function largest<T>(top: v128, sum: v128): f64 {
  let most = f64.max(<f64>v128.extract_lane<T>(top, 0), <f64>v128.extract_lane<T>(top, 1));
  if (sizeof<T>() == 4) most = f64.max(most, f64.max(<f64>v128.extract_lane<T>(top, 2), <f64>v128.extract_lane<T>(top, 3)));
  return most + 0 * total<T>(sum);
}
