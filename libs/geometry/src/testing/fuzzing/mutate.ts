import { encode } from '../obj-files';
import type { Random } from './random';

/** Beyond this nothing is made longer. */
const longest = 100_000;

const numbers = ['0', '-0', '-1', '1', '3', '255', '256', '65535', '65536', '2147483648', '4294967295', '4294967296', '9007199254740993', '99999999999999999999', '1e309', '-1e39', '1e-400', '0.1e', '.', '1,5', 'NaN', 'inf', '0x10', '1e5', '20000001', `0.${'3'.repeat(600)}`];
const words = ['#', '\\\n', '\n', '\r', ' ', '\0', '"', '<', '>', '/>', '&lt;', '&x;', '{', '}', '[', ']', ',', ':', 'null', 'true', '"__proto__"', '<!DOCTYPE a [<!ENTITY b "c">]>', '<!--', ']]>', 'v', 'f', 'solid', 'facet', 'endsolid', 'element x 9\n', 'property list uchar int y\n', 'end_header\n', '../', '\u00ff\u00fe'].map((word) => encode(word));
const extremes = [0, 1, 2, 0x7f, 0x80, 0xff, 0x7fff, 0xffff, 0x7fffffff, 0x80000000, 0xfffffffe, 0xffffffff, 0x7f800000, 0x7fc00000, 0xff800000];

function join(...pieces: Uint8Array[]): Uint8Array {
  const length = Math.min(longest, pieces.reduce((sum, piece) => sum + piece.length, 0));
  const joined = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    joined.set(piece.subarray(0, length - at), at);
    at = Math.min(length, at + piece.length);
  }
  return joined;
}

/** A stretch of bytes, short as a rule. */
function drawStretch(bytes: Uint8Array, random: Random): [start: number, end: number] {
  const start = random.below(bytes.length + 1);
  return [start, Math.min(bytes.length, start + random.below(random.oneIn(4) ? bytes.length + 1 : 24))];
}

type Mutation = (bytes: Uint8Array, random: Random, other: Uint8Array) => Uint8Array;

const mutations: Mutation[] = [
  function flipBits(bytes, random) {
    const changed = Uint8Array.from(bytes);
    for (let k = random.below(4); k >= 0; k--) changed[random.below(bytes.length)] = (changed[random.below(bytes.length)] ?? 0) ^ (1 << random.below(8));
    return changed;
  },
  function setBytes(bytes, random) {
    const changed = Uint8Array.from(bytes);
    for (let k = random.below(4); k >= 0; k--) changed[random.below(bytes.length)] = random.below(256);
    return changed;
  },
  function setNumber(bytes, random) {
    const changed = Uint8Array.from(bytes);
    const size = random.pick([1, 2, 4]);
    if (bytes.length < size) return bytes;
    const view = new DataView(changed.buffer);
    const at = random.below(bytes.length - size + 1);
    const value = random.pick(extremes);
    const littleEndian = !random.oneIn(4);
    if (size === 1) view.setUint8(at, value);
    else if (size === 2) view.setUint16(at, value, littleEndian);
    else view.setUint32(at, value, littleEndian);
    return changed;
  },
  function swapWrittenNumber(bytes, random) {
    // The next run of digits from some place on.
    const isDigit = (at: number): boolean => (bytes[at] ?? 0) >= 48 && (bytes[at] ?? 0) <= 57;
    let start = random.below(bytes.length + 1);
    while (start < bytes.length && !isDigit(start)) start += 1;
    let end = start;
    while (end < bytes.length && (isDigit(end) || bytes[end] === 46)) end += 1;
    return join(bytes.subarray(0, start), encode(random.pick(numbers)), bytes.subarray(end));
  },
  function insertWord(bytes, random) {
    const [start] = drawStretch(bytes, random);
    return join(bytes.subarray(0, start), random.pick(words), bytes.subarray(start));
  },
  function truncate(bytes, random) {
    return bytes.subarray(0, random.below(bytes.length + 1));
  },
  function removeStretch(bytes, random) {
    const [start, end] = drawStretch(bytes, random);
    return join(bytes.subarray(0, start), bytes.subarray(end));
  },
  function repeatStretch(bytes, random) {
    const [start, end] = drawStretch(bytes, random);
    const times = random.pick([1, 2, 10, 1000]);
    const stretch = bytes.subarray(start, end);
    return join(bytes.subarray(0, start), ...Array.from({ length: Math.min(times, Math.ceil(longest / Math.max(1, stretch.length))) }, () => stretch), bytes.subarray(start));
  },
  function swapStretches(bytes, random) {
    const [start, middle] = drawStretch(bytes, random);
    const end = Math.min(bytes.length, middle + random.below(64));
    return join(bytes.subarray(0, start), bytes.subarray(middle, end), bytes.subarray(start, middle), bytes.subarray(end));
  },
  function splice(bytes, random, other) {
    const [start, end] = drawStretch(bytes, random);
    const [from, to] = drawStretch(other, random);
    return join(bytes.subarray(0, start), other.subarray(from, to), bytes.subarray(end));
  },
];

/** Damages bytes in one to five ways; never longer than a hundred thousand. */
export function mutate(bytes: Uint8Array, random: Random, other: Uint8Array): Uint8Array {
  let changed = bytes;
  for (let k = random.pick([0, 0, 0, 1, 2, 4]); k >= 0; k--) {
    if (changed.length === 0) return changed;
    changed = random.pick(mutations)(changed, random, other);
  }
  return changed;
}
