import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { createMeshReader } from '../mesh-reader';
import { MeshError } from '../mesh-error';
import { createDraw, type Draw } from '../testing/draw';
import { findLane } from './compiled-lane';
import { laneLayout, noCorner, windowBytes } from './lane-memory';

const encode = (text: string): Uint8Array<ArrayBuffer> => Uint8Array.from(text, (character) => character.charCodeAt(0));

function getLane(): NonNullable<ReturnType<typeof findLane>> {
  const lane = findLane();
  if (lane === undefined) throw new Error('The compiled lane does not run here.');
  return lane;
}

/** The number that the lane reads in the whole of a text; undefined where it leaves that to the reader. */
function readNumber(text: string): number | undefined {
  const lane = getLane();
  const out = laneLayout.FIRST;
  lane.text.set(encode(`${text}\0`), 1);
  const end = lane.readNumber(laneLayout.WINDOW, out);
  if (end === 0) return undefined;
  expect(end - laneLayout.WINDOW).toBe(text.length);
  return lane.vertices[0];
}

/** Decimal numbers of every shape, those near the middle between two binary ones among them. */
function drawNumber(draw: Draw): string {
  const sign = draw.pick(['', '-', '+']);
  const size = draw.next() * 10 ** draw.whole(-12, 12);
  const some = (most: number): string => Array.from({ length: draw.whole(0, most) }, () => draw.whole(0, 9)).join('');
  switch (draw.whole(0, 6)) {
    case 0:
      return sign + size.toExponential(draw.whole(0, 18));
    case 1:
      return sign + size.toFixed(draw.whole(0, 17));
    case 2:
      return sign + String(size);
    case 3:
      return sign + draw.pick(['', '0', '00', '000000000', some(9)]) + String(draw.whole(0, 9)) + draw.pick(['', '.', `.${some(18)}`, `.000000${some(17)}`]) + draw.pick(['', `e${draw.whole(-60, 38)}`, `E+0${draw.whole(0, 9)}`, `e-00${draw.whole(0, 30)}`]);
    case 4:
      return `${sign}${(2n * BigInt(draw.whole(2 ** 52, 2 ** 53 - 1)) + 1n) * 2n ** BigInt(draw.whole(0, 3)) + BigInt(draw.whole(-1, 1))}${draw.pick(['', `e${draw.whole(-40, 15)}`])}`;
    case 5:
      // Half-way by a power of five: (2 m + 1) / 2 · 5^k.
      return `${sign}${((2n * BigInt(draw.whole(2 ** 52, 2 ** 53 - 1)) + 1n) * 5n ** BigInt(draw.whole(0, 4))).toString().slice(0, 19)}e${draw.whole(-8, 23)}`;
    default:
      return sign + Math.fround(size).toPrecision(draw.whole(1, 17));
  }
}

const floatLimit = 3.4028234663852886e38;

interface Reading {
  facets: number[];
  end: string;
}

/** A reading with its facets' bits and its end in words; without the lane where lines may be no longer than is left to the reader. */
function read(bytes: Uint8Array, cuts: (at: number) => number, withLane: boolean): Reading {
  const facets: number[] = [];
  try {
    const reader = createMeshReader({
      sizeBytes: bytes.length,
      ...(withLane ? {} : { maximumLineBytes: 2 * windowBytes - 1 }),
      onFacets: ({ corners, normals, count }) => {
        for (const corner of corners.subarray(0, 9 * count)) facets.push(corner);
        for (const number of normals.subarray(0, 3 * count)) facets.push(number);
      },
    });
    for (let at = 0; at < bytes.length; ) {
      const next = Math.min(bytes.length, at + cuts(at));
      // A copy in one buffer, whose bytes change from chunk to chunk as those of a stream may.
      reader.push(bytes.slice(at, next));
      at = next;
    }
    const { facets: count, solids, nonPlanarPolygons, foldedPolygons, polygonVolume } = reader.finish();
    return { facets, end: JSON.stringify({ count, solids, nonPlanarPolygons, foldedPolygons, polygonVolume }) };
  } catch (error) {
    if (!(error instanceof MeshError)) throw error;
    return { facets, end: JSON.stringify([error.code, error.message, error.at]) };
  }
}

/** Few texts are longer than the window. */
const drawLength = (draw: Draw, usual: number): number => draw.whole(1, draw.next() < 0.02 ? 40 * usual : usual);

function drawStl(draw: Draw): string {
  const gap = (): string => draw.pick([' ', ' ', ' ', '\n', '\n  ', '\r\n', '\r', '\t', '  \n\n    ', ' \r\r\n ', '        ']);
  const usual = draw.next() < 0.5;
  const number = (): string => (usual ? draw.between(-50, 50).toExponential(6) : draw.next() < 0.01 ? draw.pick(['nan', '1,5', 'inf', '-nan(ind)', '1e60']) : drawNumber(draw));
  const word = (text: string): string => (usual || draw.next() < 0.9 ? text : draw.pick([text.toUpperCase(), `${text}x`, text.slice(1), 'vertex']));
  const words: string[] = [];
  for (let facet = drawLength(draw, 60); facet > 0; facet--) {
    words.push(word('facet'), word('normal'), number(), number(), number(), 'outer', 'loop');
    for (let corner = 0; corner < 3; corner++) words.push('vertex', number(), number(), number());
    words.push('endloop', word('endfacet'));
    if (draw.next() < 0.02) words.push('endsolid', 'a name\n', 'solid', 'another\n');
  }
  return `solid a name\n${[...words, 'endsolid'].map((text) => text + (usual ? '\n' : gap())).join('')}`;
}

function drawObj(draw: Draw): string {
  const usual = draw.next() < 0.5;
  const number = (): string => (usual ? draw.between(-50, 50).toExponential(6) : drawNumber(draw));
  const end = draw.pick(['\n', '\r\n', '\r']);
  const lines: string[] = [];
  let vertices = 0;
  for (let line = drawLength(draw, 250); line > 0; line--) {
    const kind = draw.next();
    if (vertices < 4 || kind < 0.4) {
      lines.push(`v ${number()} ${number()}  ${number()}${draw.pick(['', '', '', ' 1.0', ' .5 .5 .5', ' ', '\t'])}`);
      vertices += 1;
    } else if (kind < 0.8) {
      const corner = (): string => {
        const index = draw.next() < 0.003 ? draw.pick([0, vertices + 1, -vertices - 1]) : draw.pick([draw.whole(1, vertices), -draw.whole(1, vertices)]);
        return `${index}${draw.pick(['', '', '/1', '/2/3', '//-4', '/123456/1234567', draw.next() < 0.01 ? '/x' : ''])}`;
      };
      lines.push(`f${Array.from({ length: draw.pick([3, 3, 3, 4, 4, 5, draw.next() < 0.02 ? 2 : 3]) }, () => ` ${corner()}`).join('')}${draw.pick(['', '', ' ', ' # four'])}`);
    } else {
      lines.push(draw.pick(['', '  ', '# a comment \\', '# a # comment\twith tabs and more than sixteen bytes', 'vn 0 0 1', 'vt .5 .5', 'vn 0 \\\n 0 1', 'g a b c', 'o thing # named', 's off', 'usemtl grey', 'mtllib a.mtl', 'l 1 2', '\\', 'v 1 2 \\\n 3', ...(draw.next() < 0.02 ? ['nonsense', 'v 1 2', 'call it'] : [])]));
      if (lines.at(-1)?.startsWith('v ') === true) vertices += 1;
    }
  }
  return lines.join(end) + draw.pick(['', end]);
}

/** A text with some bytes changed, lost, or there twice; or as it is. */
function damage(draw: Draw, text: string): string {
  let damaged = text;
  for (let times = draw.pick([0, 0, 1, 2]); times > 0; times--) {
    const at = draw.whole(0, damaged.length - 1);
    const piece = draw.pick(['', ' ', '\n', '\r', '9', '-', '.', 'e', '#', '\\', '/', '\0', '\x01', '\x80', 'x', '\t', damaged.slice(at, at + 40) + damaged.slice(at, at + 40), ' '.repeat(600), '0'.repeat(600)]);
    damaged = damaged.slice(0, at) + piece + damaged.slice(at + draw.whole(0, 3));
  }
  return damaged;
}

const draw = createDraw();

describe(`the lane for texts of the usual shape (FC_SEED=${draw.seed})`, () => {
  it('has its memory laid out as the module has', () => {
    const layout = readFileSync(path.join(import.meta.dirname, '../../assembly/text/layout.ts'), 'utf8');
    const stated = Object.fromEntries([...layout.matchAll(/export const (\w+): (?:usize|u32) = (\w+);/g)].map(([, name = '', value]) => [name, Number(value)]));
    expect(stated).toMatchObject({ ...laneLayout, NO_CORNER: noCorner });
    expect(laneLayout.FIRST - laneLayout.WINDOW).toBeGreaterThan(windowBytes);
  });
  it('reads numbers to the last bit, or leaves them to the reader', () => {
    let left = 0;
    const numbers = 100_000;
    for (let k = 0; k < numbers; k++) {
      const text = drawNumber(draw);
      const value = readNumber(text);
      if (value === undefined) left += 1;
      else if (!Object.is(value, Number(text))) throw new Error(`${text} is read as ${value}.`);
    }
    expect(left / numbers).toBeLessThan(0.2);
  });
  it.each(['18446744073709551616', '36893488147419103232.5', '0.00000000000000000000000000000', '9007199254740993', '9007199254740992.5', '1e23', '8.5e22', '-0', '0e-99', '3.4028234663852886e38', '1.7976931348623157e-30', '00000000000000000000001.5'])('%s is not misread', (text) => {
    const value = readNumber(text);
    if (value !== undefined) expect(Object.is(value, Number(text))).toBe(true);
  });
  it.each(['', '-', '.', '-.', 'e5', '1e', '1e+', 'x', '--1', '+-1', '3.5e38', '1e300'])('"%s" is left to the reader', (text) => {
    expect(readNumber(text)).toBeUndefined();
    expect(Math.abs(readNumber('3.4028234663852886e38') ?? 0)).toBe(floatLimit);
  });
  for (const [format, make] of [['ASCII STL', drawStl], ['OBJ', drawObj]] as const) {
    it(`gives what the reader alone gives of ${format}, bit for bit and word for word, whole or damaged, in chunks of any size`, { timeout: 120_000 }, () => {
      const ends = new Set<boolean>();
      for (let k = 0; k < 400; k++) {
        const text = damage(draw, make(draw));
        const bytes = encode(text);
        const alone = read(bytes, () => Infinity, false);
        ends.add(alone.end.startsWith('['));
        const sizes = [1, 7, 100, 150, 200, 333, 1000, 5000];
        for (const cuts of [() => Infinity, () => draw.whole(1, 700), () => draw.pick(sizes)]) {
          const reading = read(bytes, cuts, true);
          if (reading.end === alone.end && reading.facets.length === alone.facets.length && reading.facets.every((number, place) => Object.is(number, alone.facets[place]))) continue;
          throw new Error(`Text ${k} is read another way with the lane: ${reading.end} after ${reading.facets.length} numbers, not ${alone.end} after ${alone.facets.length}.\n${JSON.stringify(text)}`);
        }
      }
      expect(ends).toEqual(new Set([true, false]));
    });
  }
});
