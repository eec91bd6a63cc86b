/* Arithmetic in two lanes: facets at even and at odd places of a block. Every operation is one of binary64, rounded as everywhere. */

@inline export function add(a: v128, b: v128): v128 { return f64x2.add(a, b); }
@inline export function sub(a: v128, b: v128): v128 { return f64x2.sub(a, b); }
@inline export function mul(a: v128, b: v128): v128 { return f64x2.mul(a, b); }
@inline export function abs(a: v128): v128 { return f64x2.abs(a); }
