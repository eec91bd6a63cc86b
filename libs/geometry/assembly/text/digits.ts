/* Eight bytes of text at a time. A byte that is no digit ends what is counted; what follows it may be anything. */

const zeros: u64 = 0x3030303030303030;
const spaces: u64 = 0x2020202020202020;
const highBits: u64 = 0x8080808080808080;

/** The high bits of those of eight bytes that are no digits, up to the first; 0 where all are. A sum runs over into the next byte only from one that is none itself. */
@inline export function findNoDigits(bytes: u64): u64 {
  const values = bytes ^ zeros;
  return ((values + 0x7676767676767676) | values) & highBits;
}

/** How many of eight bytes are digits, before the first that is none. */
@inline export function countDigits(bytes: u64): i32 {
  return <i32>(ctz<u64>(findNoDigits(bytes)) >> 3);
}

/** The number that the first 1 to 8 of eight bytes write, digits all of them. */
@inline export function joinDigits(bytes: u64, count: i32): u64 {
  let values = (bytes << (64 - 8 * <u64>count)) & 0x0f0f0f0f0f0f0f0f;
  values = (values * 2561) >> 8;
  values = ((values & 0x00ff00ff00ff00ff) * 6553601) >> 16;
  return ((values & 0x0000ffff0000ffff) * 42949672960001) >> 32;
}

/** How many of eight bytes are spaces, before the first that is none. */
@inline export function countSpaces(bytes: u64): i32 {
  return <i32>(ctz<u64>(bytes ^ spaces) >> 3);
}

/** Whether the bytes under a mask are these small letters, or the same capitals: setting bit 5 maps those, and no other byte, onto them. */
@inline export function isWord(at: usize, mask: u64, word: u64): bool {
  return ((load<u64>(at) | spaces) & mask) == word;
}

/**
 * The place after so many bytes. Texts are regular: where a usual length is guessed rightly, the processor goes on from there at once and need not wait for
 * the counting, which is most of the time that reading takes.
 */
@inline export function pass(at: usize, count: i32): usize {
  if (count == 6) return at + 6;
  if (count == 5) return at + 5;
  if (count == 4) return at + 4;
  if (count == 2) return at + 2;
  if (count == 1) return at + 1;
  return at + <usize>count;
}
