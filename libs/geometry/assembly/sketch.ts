import { BOX, FACETS, SECRETS, SKETCH } from './layout';

/*
 * A linear sketch of the directed edges. A vertex has three random numbers u, w, t, drawn by secrets from the bits of its coordinates; an edge from a to b adds
 * u(a) w(b) - u(b) w(a), modulo 2⁶⁴, and the same with t. Edges that run as often one way as the other cancel, whatever their order; any other
 * set of edges leaves both sums zero with a probability near 2⁻¹²⁸, for sums modulo 2⁶⁴ of products of random numbers. src/closedness-sketch.ts has the
 * same in plain words.
 */

@inline function finishHash(mixed: u64, place: usize): u64 {
  let hash = (mixed ^ load<u64>(SECRETS + place)) * load<u64>(SECRETS + place + 8);
  hash ^= hash >> 32;
  return hash;
}

@inline function addEdges(ua: u64, ub: u64, uc: u64, place: usize, a: u64, b: u64, c: u64): void {
  store<u64>(SKETCH + place, load<u64>(SKETCH + place) + ua * (b - c) + ub * (c - a) + uc * (a - b));
}

/** From 96 bits: x and y side by side, and z. */
@inline function hashPacked(xy: u64, z: u64, s0: u64, s1: u64, s2: u64, s3: u64): u64 {
  let hash = (xy ^ s0) * s1;
  hash ^= hash >> 32;
  hash = (hash + z * s2) * s3;
  return hash ^ (hash >> 29);
}

/** Adds facets as a binary STL file has them, and extends the box by their coordinates: each of the twelve places in a facet by itself. */
export function sketchStl(count: i32): void {
  const zero = f32x4.splat(0);
  let least0 = v128.load(BOX), least1 = v128.load(BOX, 16), least2 = v128.load(BOX, 32);
  let most0 = v128.load(BOX, 48), most1 = v128.load(BOX, 64), most2 = v128.load(BOX, 80);
  // In locals: loads in the loop would be made anew for every facet.
  const s0 = load<u64>(SECRETS), s1 = load<u64>(SECRETS + 8), s2 = load<u64>(SECRETS + 16), s3 = load<u64>(SECRETS + 24);
  const s4 = load<u64>(SECRETS + 32), s5 = load<u64>(SECRETS + 40), s6 = load<u64>(SECRETS + 48), s7 = load<u64>(SECRETS + 56);
  let one = load<u64>(SKETCH), two = load<u64>(SKETCH + 8);
  let at = FACETS;
  for (let facet = 0; facet < count; facet++, at += 50) {
    // Adding 0 makes +0 of -0 and changes no other number.
    const p = f32x4.add(v128.load(at, 12), zero), q = f32x4.add(v128.load(at, 28), zero), r = f32x4.add(v128.load32_splat(at, 44), zero);
    least0 = f32x4.min(least0, p); least1 = f32x4.min(least1, q); least2 = f32x4.min(least2, r);
    most0 = f32x4.max(most0, p); most1 = f32x4.max(most1, q); most2 = f32x4.max(most2, r);
    const a = hashPacked(<u64>i64x2.extract_lane(p, 0), <u64>(<u32>i32x4.extract_lane(p, 2)), s0, s1, s2, s3);
    const b = hashPacked(<u64>(<u32>i32x4.extract_lane(p, 3)) | ((<u64>(<u32>i32x4.extract_lane(q, 0))) << 32), <u64>(<u32>i32x4.extract_lane(q, 1)), s0, s1, s2, s3);
    const c = hashPacked(<u64>i64x2.extract_lane(q, 1), <u64>(<u32>i32x4.extract_lane(r, 0)), s0, s1, s2, s3);
    let wa = (a ^ s4) * s5, wb = (b ^ s4) * s5, wc = (c ^ s4) * s5;
    wa ^= wa >> 32; wb ^= wb >> 32; wc ^= wc >> 32;
    let ta = (a ^ s6) * s7, tb = (b ^ s6) * s7, tc = (c ^ s6) * s7;
    ta ^= ta >> 32; tb ^= tb >> 32; tc ^= tc >> 32;
    one += a * (wb - wc) + b * (wc - wa) + c * (wa - wb);
    two += a * (tb - tc) + b * (tc - ta) + c * (ta - tb);
  }
  store<u64>(SKETCH, one);
  store<u64>(SKETCH + 8, two);
  v128.store(BOX, least0); v128.store(BOX, least1, 16); v128.store(BOX, least2, 32);
  v128.store(BOX, most0, 48); v128.store(BOX, most1, 64); v128.store(BOX, most2, 80);
}

/** From three binary64 coordinates. */
@inline function hashVertex(at: usize): u64 {
  const x = reinterpret<u64>(load<f64>(at) + 0), y = reinterpret<u64>(load<f64>(at, 8) + 0), z = reinterpret<u64>(load<f64>(at, 16) + 0);
  let hash = (x ^ load<u64>(SECRETS)) * load<u64>(SECRETS + 8);
  hash ^= hash >> 32;
  hash = (hash + y) * load<u64>(SECRETS + 16);
  hash ^= hash >> 29;
  hash = (hash + z) * load<u64>(SECRETS + 24);
  return hash ^ (hash >> 29);
}

/** Adds facets of nine binary64 coordinates. */
export function sketchCorners(count: i32): void {
  let at = FACETS;
  for (let facet = 0; facet < count; facet++, at += 72) {
    const a = hashVertex(at), b = hashVertex(at + 24), c = hashVertex(at + 48);
    addEdges(a, b, c, 0, finishHash(a, 32), finishHash(b, 32), finishHash(c, 32));
    addEdges(a, b, c, 8, finishHash(a, 48), finishHash(b, 48), finishHash(c, 48));
  }
}
