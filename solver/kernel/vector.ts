// The verbs of the kernel: one 16-byte group of lanes of T (four f32, two f64). v128 takes no operators, and a class around
// it would live on the heap; inlined functions cost nothing.

/** phi this close to 0 or 1 is pure, see forces.ts */
export const PURE: f64 = 0.002;

@inline export function add<T>(a: v128, b: v128): v128 { return v128.add<T>(a, b); }
@inline export function sub<T>(a: v128, b: v128): v128 { return v128.sub<T>(a, b); }
@inline export function mul<T>(a: v128, b: v128): v128 { return v128.mul<T>(a, b); }
@inline export function div<T>(a: v128, b: v128): v128 { return v128.div<T>(a, b); }
/** a b + c */
@inline export function mad<T>(a: v128, b: v128, c: v128): v128 { return v128.add<T>(v128.mul<T>(a, b), c); }
/** c - a b */
@inline export function nmad<T>(a: v128, b: v128, c: v128): v128 { return v128.sub<T>(c, v128.mul<T>(a, b)); }
@inline export function root<T>(a: v128): v128 { return v128.sqrt<T>(a); }
/** the larger of two that are not negative, not a number where one is not: the bits of such numbers are in their order */
@inline export function max<T>(a: v128, b: v128): v128 { return sizeof<T>() == 4 ? v128.max<u32>(a, b) : v128.max<T>(a, b); }
/** a, or b where that is beyond it: one instruction where `max` takes many; a b that is no number counts for nothing */
@inline export function atLeast<T>(a: v128, b: v128): v128 { return v128.pmax<T>(a, b); }
@inline export function atMost<T>(a: v128, b: v128): v128 { return v128.pmin<T>(a, b); }
@inline export function splat<T>(a: f64): v128 { return v128.splat<T>(<T>a); }
@inline export function get(at: usize): v128 { return v128.load(at); }
@inline export function put(at: usize, a: v128): void { v128.store(at, a); }

/** every lane of a at least that of b */
@inline export function noneBelow<T>(a: v128, b: v128): bool {
  const yes = v128.ge<T>(a, b);
  return sizeof<T>() == 8 ? i64x2.all_true(yes) : i32x4.all_true(yes);
}

/** Share of liquid at z = phi - 1, see forces.ts. */
@inline export function share<T>(z: v128): v128 {
  const one = splat<T>(1);
  return atMost<T>(atLeast<T>(mad<T>(z, splat<T>(1 / (1 - 2 * PURE)), splat<T>((1 - PURE) / (1 - 2 * PURE))), splat<T>(0)), one);
}

/** Sum of the lanes. */
export function total<T>(a: v128): f64 {
  let sum: f64 = <f64>v128.extract_lane<T>(a, 0) + <f64>v128.extract_lane<T>(a, 1);
  if (sizeof<T>() == 4) sum += <f64>v128.extract_lane<T>(a, 2) + <f64>v128.extract_lane<T>(a, 3);
  return sum;
}

/** Largest lane; not a number where one is not. */
export function largest<T>(a: v128): f64 {
  let top = f64.max(<f64>v128.extract_lane<T>(a, 0), <f64>v128.extract_lane<T>(a, 1));
  if (sizeof<T>() == 4) top = f64.max(top, f64.max(<f64>v128.extract_lane<T>(a, 2), <f64>v128.extract_lane<T>(a, 3)));
  return top;
}

/** Least product of the numbers of two rows, from byte `from` to byte `end`. */
export function least<T>(a: usize, b: usize, from: usize, end: usize): f64 {
  let low = splat<T>(0);
  for (let i = from; i < end; i += 16) low = atMost<T>(low, mul<T>(get(a + i), get(b + i)));
  let value = f64.min(<f64>v128.extract_lane<T>(low, 0), <f64>v128.extract_lane<T>(low, 1));
  if (sizeof<T>() == 4) value = f64.min(value, f64.min(<f64>v128.extract_lane<T>(low, 2), <f64>v128.extract_lane<T>(low, 3)));
  return value;
}
