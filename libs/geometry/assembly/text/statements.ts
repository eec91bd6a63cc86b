import { countDigits, countSpaces, joinDigits, pass } from './digits';
import { FIRST, LINES, LONGEST_WORD, NO_CORNER, POLYGONS, POSITION, SECOND, VERTICES, WINDOW } from './layout';
import { readNumber } from './number';

const lineFeed: u32 = 10;
const carriageReturn: u32 = 13;
/** What src/read-obj.ts takes after `v`. */
const mostVertexNumbers = 8;
/** A colour's numbers go nowhere. */
const aside: usize = 32;

@inline function isBlank(code: u32): bool {
  return code == 32 || code == 9 || code == 11 || code == 12;
}

@inline function isLineEnd(code: u32): bool {
  return code == lineFeed || code == carriageReturn;
}

@inline function passBlanks(at: usize): usize {
  let p = at;
  for (let code: u32 = load<u8>(p); isBlank(code); code = load<u8>(p)) p = code == 32 ? pass(p, countSpaces(load<u64>(p))) : p + 1;
  return p;
}

/** The place after the end of a line; 0 where none is, or where the window ends before it is clear whether LF follows CR. */
@inline function passLineEnd(at: usize): usize {
  const code: u32 = load<u8>(at);
  if (code == lineFeed) return at + 1;
  if (code != carriageReturn) return 0;
  const next: u32 = load<u8>(at + 1);
  return next == 0 ? 0 : next == lineFeed ? at + 2 : at + 1;
}

/** The end of a line of which nothing is read; 0 at other control characters and, outside comments, at what may join lines or begin a comment. */
@inline function skipLine(at: usize, comment: bool): usize {
  let p = at;
  while (true) {
    const bytes = v128.load(p);
    let stops = i8x16.lt_u(bytes, i8x16.splat(32));
    if (!comment) stops = v128.or(stops, v128.or(i8x16.eq(bytes, i8x16.splat(35)), i8x16.eq(bytes, i8x16.splat(92))));
    const mask = i8x16.bitmask(stops);
    if (mask == 0) {
      p += 16;
      continue;
    }
    p += ctz<i32>(mask);
    const code: u32 = load<u8>(p);
    if (!isBlank(code)) return passLineEnd(p);
    p += 1;
  }
}

function readVertex(at: usize, target: usize): usize {
  let p = at;
  let numbers = 0;
  while (true) {
    p = passBlanks(p);
    if (isLineEnd(load<u8>(p))) return numbers < 3 ? 0 : passLineEnd(p);
    if (numbers == mostVertexNumbers) return 0;
    p = readNumber(p, numbers < 3 ? target + 8 * <usize>numbers : aside);
    if (p == 0 || load<u8>(p) > 32) return 0;
    numbers += 1;
  }
}

/** The end of a word of digits, slashes and minus signs. */
@inline function passReference(at: usize): usize {
  let p = at;
  while (true) {
    const bytes = v128.load(p);
    const stops = v128.or(i8x16.gt_u(i8x16.sub(bytes, i8x16.splat(45)), i8x16.splat(12)), i8x16.eq(bytes, i8x16.splat(46)));
    const mask = i8x16.bitmask(stops);
    if (mask != 0) return p + ctz<i32>(mask);
    p += 16;
  }
}

/** Three corners counted from the first vertex, a space before each and LF after the last: what most lines are. */
@inline function readTriangle(at: usize, target: usize, vertexCount: u64): usize {
  let p = at;
  for (let corner: usize = 0; corner < 12; corner += 4) {
    if (load<u8>(p) != 32) return 0;
    const word = p + 1;
    const bytes = load<u64>(word);
    const digits = countDigits(bytes);
    if (digits == 0 || digits == 8) return 0;
    const place = joinDigits(bytes, digits) - 1;
    p = pass(word, digits);
    if (load<u8>(p) == 47) p = passReference(p);
    if (place >= vertexCount || p - word > LONGEST_WORD) return 0;
    store<u32>(target + corner, <u32>place);
  }
  store<u32>(target, NO_CORNER, 12);
  return load<u8>(p) == lineFeed ? p + 1 : 0;
}

function readPolygon(at: usize, target: usize, vertexCount: u64): usize {
  const usual = readTriangle(at, target, vertexCount);
  if (usual != 0) return usual;
  let p = at;
  let corners = 0;
  store<u32>(target, NO_CORNER, 12);
  while (true) {
    p = passBlanks(p);
    let code: u32 = load<u8>(p);
    if (isLineEnd(code)) return corners < 3 ? 0 : passLineEnd(p);
    if (corners == 4) return 0;
    const word = p;
    const back = code == 45;
    if (back) p += 1;
    const bytes = load<u64>(p);
    const digits = countDigits(bytes);
    if (digits == 0) return 0;
    let index = joinDigits(bytes, digits);
    p = pass(p, digits);
    code = load<u8>(p);
    // Twelve digits are more than there can be vertices.
    for (let more = digits; code >= 48 && code <= 57; more++) {
      if (more == 12) return 0;
      index = index * 10 + code - 48;
      p += 1;
      code = load<u8>(p);
    }
    if (code == 47) {
      p = passReference(p);
      code = load<u8>(p);
    }
    if (code > 32 || p - word > LONGEST_WORD || index == 0 || index > vertexCount) return 0;
    store<u32>(target + 4 * <usize>corners, <u32>(back ? vertexCount - index : index - 1));
    corners += 1;
  }
}

/** Whether a statement that says nothing about facets begins here: `vn`, `vt`, `g`, `o`, `s` or `usemtl`, with a space. */
@inline function isPassedOver(at: usize): bool {
  const two: u32 = load<u16>(at);
  const three: u32 = two | (<u32>load<u8>(at, 2) << 16);
  return three == 0x206e76 || three == 0x207476 || two == 0x2067 || two == 0x206f || two == 0x2073 || (load<u64>(at) & 0xffffffffffffff) == 0x206c746d657375;
}

/**
 * Reads lines of an OBJ text, from the beginning of a line on: vertices into the first place for what is read, polygons of three and four corners into
 * the second. Stops before the first line that is anything else.
 *
 * @param known vertices before these
 */
export function readStatements(start: i32, known: u32, mostVertices: i32, mostPolygons: i32): void {
  let p = WINDOW + start;
  let vertices = 0;
  let polygons = 0;
  let lines = 0;
  // The end of the line before, of which CR was seen already.
  if (load<u8>(p) == lineFeed && load<u8>(p - 1) == carriageReturn) p += 1;
  while (true) {
    const at = passBlanks(p);
    const code: u32 = load<u8>(at);
    let next: usize = 0;
    if (code == 118 && isBlank(load<u8>(at, 1))) {
      if (vertices == mostVertices) break;
      next = readVertex(at + 1, FIRST + 24 * <usize>vertices);
      if (next == 0) break;
      vertices += 1;
    } else if (code == 102 && isBlank(load<u8>(at, 1))) {
      if (polygons == mostPolygons) break;
      next = readPolygon(at + 1, SECOND + 16 * <usize>polygons, <u64>known + <u64>vertices);
      if (next == 0) break;
      polygons += 1;
    } else {
      if (code == 35) next = skipLine(at, true);
      else if (isLineEnd(code)) next = passLineEnd(at);
      else if (isPassedOver(at)) next = skipLine(at, false);
      if (next == 0) break;
    }
    p = next;
    lines += 1;
  }
  store<i32>(POSITION, <i32>(p - WINDOW));
  store<i32>(LINES, lines);
  store<i32>(VERTICES, vertices);
  store<i32>(POLYGONS, polygons);
}
