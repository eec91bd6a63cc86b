import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import process from 'node:process';
import { describe, expect, it } from 'vitest';
import { measuringVersion, type Integrals, type Measurement, type Symmetric3 } from './measurement';
import { measureMesh } from './measurer';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

/*
 * The bits of a measuring version. Where one changes, whoever has the same bytes would get other figures under the same name: give the version a new name
 * (measurement.ts), and write its bits by RECORD_BITS=1 npx vitest run recorded-bits; those of earlier versions stay as they are.
 */

const far = (mesh: shapes.Corners, by: number): shapes.Corners => shapes.move(mesh, [by, -by / 3, 7]);

/** No cosine is on the way to these: engines may round it differently. */
function makeLattice(): shapes.Corners {
  const blocks: shapes.Corners[] = [];
  for (let i = 0; i < 5; i++) for (let j = 0; j < 4; j++) blocks.push(shapes.makeBlock([3 * i, 3 * j, (i * j) / 8], [3 * i + 1.5 + j / 16, 3 * j + 2, 1 + i / 4]));
  return shapes.join(...blocks);
}

/** Exact in binary64, and the same everywhere: a turn by the rational angle with sine 3/5. */
const turn = (mesh: shapes.Corners): shapes.Corners => mesh.map((_, at) => {
  const k = at % 3;
  const [x = 0, y = 0, z = 0] = mesh.subarray(at - k, at - k + 3);
  return k === 0 ? 0.8 * x - 0.6 * y : k === 1 ? 0.6 * x + 0.8 * y : z;
});

const block = shapes.makeBlock([0, 0, 0], [3, 2, 1]);
const housing = shapes.makeHousing();
const corpus: Record<string, Uint8Array> = {
  'a block, binary': writeBinaryStl(block),
  'a turned block, binary': writeBinaryStl(turn(block)),
  'a turned block, text': writeAsciiStl(turn(block)),
  'a block far away, text': writeAsciiStl(far(turn(block), 1e7)),
  'a thin plate, text': writeAsciiStl(turn(shapes.makeBlock([0, 0, 0], [1000, 1000, 0.001]))),
  'a needle, text': writeAsciiStl(turn(shapes.makeBlock([0, 0, 0], [1e5, 1, 1]))),
  'a housing, binary': writeBinaryStl(turn(housing)),
  'a housing inside out, text': writeAsciiStl(shapes.turn(turn(housing))),
  'twenty blocks, binary': writeBinaryStl(turn(makeLattice())),
  'an open block, text': writeAsciiStl(turn(block).slice(9)),
  'a pyramid, binary': writeBinaryStl(turn(shapes.makePyramid(4, 3, 5))),
};

const hexOf = (values: readonly number[]): string => Buffer.from(Float64Array.from(values).buffer).toString('hex');
const elementsOf = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): number[] => [xx, yy, zz, xy, yz, zx];
const listOf = (integrals: Integrals | null): number[] =>
  integrals === null ? [] : [integrals.content, ...integrals.centreFromOrigin, ...elementsOf(integrals.second), integrals.errorBound];
const bitsOf = ({ origin, boundingBox, volume, surface, facetDoubt }: Measurement): string[] => [
  hexOf([...origin, ...boundingBox.min, ...boundingBox.max]),
  hexOf(listOf(volume)),
  hexOf(listOf(surface)),
  hexOf(facetDoubt === null ? [] : [facetDoubt.body.correction.content, ...facetDoubt.body.correction.first, ...elementsOf(facetDoubt.body.correction.second), facetDoubt.area.correction]),
];

const file = path.join(import.meta.dirname, `testing/bits-${measuringVersion}.json`);
const found = Object.fromEntries(Object.entries(corpus).map(([name, bytes]) => [name, bitsOf(measureMesh(bytes))]));
if (process.env['RECORD_BITS'] === '1' && !existsSync(file)) writeFileSync(file, `${JSON.stringify(found, null, 2)}\n`);

describe(`measuring version ${measuringVersion}`, () => {
  const recorded = JSON.parse(readFileSync(file, 'utf8')) as Record<string, string[]>;

  it('has bits of its own on record, for every file of the corpus', () => {
    expect(Object.keys(recorded)).toEqual(Object.keys(corpus));
  });

  it.each(Object.keys(corpus))('%s: the bits on record', (name) => {
    expect(found[name]).toEqual(recorded[name]);
  });
});
