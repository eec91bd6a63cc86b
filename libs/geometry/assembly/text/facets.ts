import { countSpaces, isWord, pass } from './digits';
import { FIRST, LINES, POSITION, SECOND, WINDOW } from './layout';
import { readNumber } from './number';

let lines: i32 = 0;

/** Passes over white space and counts the ends of lines: LF, CRLF, CR. Gives 0 at any other control character, the end of the window among them. */
@inline function passWhite(at: usize): usize {
  let p = at;
  let code: u32 = load<u8>(p);
  while (code <= 32) {
    if (code == 32) p = pass(p, countSpaces(load<u64>(p)));
    else {
      if (code < 9 || code > 13) return 0;
      if (code == 13 || (code == 10 && load<u8>(p - 1) != 13)) lines += 1;
      p += 1;
    }
    code = load<u8>(p);
  }
  return p;
}

/** The same where one has to be. */
@inline function passGap(at: usize): usize {
  return load<u8>(at) > 32 ? 0 : passWhite(at);
}

@inline function readThree(at: usize, target: usize): usize {
  let p = at;
  for (let k: usize = 0; k < 24; k += 8) {
    p = passGap(p);
    if (p == 0) return 0;
    p = readNumber(p, target + k);
    if (p == 0) return 0;
  }
  return passGap(p);
}

/** Reads a whole facet; gives the place after its last word, or 0 where anything about it is unusual. */
function readFacet(at: usize, corners: usize, normal: usize): usize {
  let p = passWhite(at);
  // "facet", "normal"
  if (p == 0 || !isWord(p, 0xffffffffff, 0x7465636166)) return 0;
  p = passGap(p + 5);
  if (p == 0 || !isWord(p, 0xffffffffffff, 0x6c616d726f6e)) return 0;
  p = readThree(p + 6, normal);
  // "outer", "loop"
  if (p == 0 || !isWord(p, 0xffffffffff, 0x726574756f)) return 0;
  p = passGap(p + 5);
  if (p == 0 || !isWord(p, 0xffffffff, 0x706f6f6c)) return 0;
  p = passGap(p + 4);
  for (let corner: usize = 0; corner < 72; corner += 24) {
    // "vertex"
    if (p == 0 || !isWord(p, 0xffffffffffff, 0x786574726576)) return 0;
    p = readThree(p + 6, corners + corner);
  }
  // "endloop", "endfacet"
  if (p == 0 || !isWord(p, 0xffffffffffffff, 0x706f6f6c646e65)) return 0;
  p = passGap(p + 7);
  if (p == 0 || !isWord(p, 0xffffffffffffffff, 0x7465636166646e65)) return 0;
  p += 8;
  const code: u32 = load<u8>(p);
  return code > 32 || code == 0 ? 0 : p;
}

/** Reads facets of an ASCII STL text, from a place in the window between two words on; gives how many. */
export function readFacets(start: i32, most: i32): i32 {
  let p = WINDOW + start;
  let facets = 0;
  let taken = 0;
  lines = 0;
  while (facets < most) {
    const next = readFacet(p, FIRST + 72 * <usize>facets, SECOND + 24 * <usize>facets);
    if (next == 0) break;
    p = next;
    taken = lines;
    facets += 1;
  }
  store<i32>(POSITION, <i32>(p - WINDOW));
  store<i32>(LINES, taken);
  return facets;
}
