import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { asciiBlock, block, objBlock, sphere, type Point } from './meshes';

/** mesh: becomes a part with figures. open: a part without them. bad: a part that says why it could not be measured. other: left out. */
export type FileKind = 'mesh' | 'open' | 'bad' | 'other';

export interface FolderFile {
  /** Below the folder, with slashes. */
  place: string;
  kind: FileKind;
  bytes: Uint8Array;
  /** Sides in the file's own unit, where it is a block. */
  sides?: Point;
}

const origin: Point = [0, 0, 0];
const text = (content: string): Uint8Array => new TextEncoder().encode(content);

/** Blocks of many shapes in every format that is read; no two have the same sides. */
function listBlocks(): FolderFile[] {
  const writers: [string, number, (sides: Point) => Uint8Array][] = [
    ['bracket_#.stl', 12, (sides) => block(origin, sides)],
    ['ribs/rib_#.stl', 8, (sides) => asciiBlock(origin, sides)],
    ['housings/housing_#.obj', 8, (sides) => objBlock(origin, sides)],
    ['packed/cover_#.stl.gz', 6, (sides) => gzipSync(block(origin, sides))],
    ['packed/yoke_#.obj.gz', 4, (sides) => gzipSync(objBlock(origin, sides))],
    ['left/lever.stl', 1, (sides) => block(origin, sides)],
    ['right/lever.stl', 1, (sides) => block(origin, sides)],
    ['spin\u200fdle\u202e.stl', 1, (sides) => block(origin, sides)],
    [`${'n'.repeat(246)}.stl`, 1, (sides) => block(origin, sides)],
  ];
  let shape = 0;
  return writers.flatMap(([name, count, write]) =>
    Array.from({ length: count }, (_, index) => {
      shape += 1;
      const sides: Point = [10 + shape, 20 + (shape % 7), 5 + (shape % 3)];
      return { place: name.replace('#', String(index + 1).padStart(2, '0')), kind: 'mesh', bytes: write(sides), sides } as const;
    }),
  );
}

function listBad(): FolderFile[] {
  const good = block(origin, [7, 8, 9]);
  const endless = new Uint8Array(1_000_020).fill(0x37);
  endless.set(text('v 0 0 0\nv 1 0 0\nv '));
  return Object.entries({
    'bad/empty.stl': new Uint8Array(),
    'bad/cut.stl': good.slice(0, 400),
    'bad/letter.stl': text('Dear Sir or Madam,\nplease find attached the drawings.\n'),
    'bad/digits.obj': endless,
    'bad/archive.stl': Uint8Array.from([0x50, 0x4b, 3, 4, ...Array.from({ length: 400 }, (_, index) => index % 251)]),
    'bad/half.stl.gz': gzipSync(asciiBlock(origin, [7, 8, 10])).slice(0, -30),
    'bad/cut-text.stl': asciiBlock(origin, [7, 8, 11]).slice(0, 700),
    'bad/index.obj': text('v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 9\n'),
  }).map(([place, bytes]) => ({ place, bytes, kind: 'bad' }));
}

/** Sixty files as a person's folder has them: 46 good meshes, one open, eight that can't be measured, and five that are no meshes. */
export function listMixedFiles(): FolderFile[] {
  const twin = block(origin, [31, 37, 41]);
  const open = block(origin, [3, 4, 5]).slice(0, -50);
  new DataView(open.buffer).setUint32(80, 11, true);
  return [
    ...listBlocks(),
    { place: 'twin_a.stl', kind: 'mesh', bytes: twin, sides: [31, 37, 41] },
    { place: 'twin_b.stl', kind: 'mesh', bytes: twin, sides: [31, 37, 41] },
    // Two parts and three parts on their way to the storage.
    { place: 'large/drum.stl', kind: 'mesh', bytes: sphere(120, 190_000) },
    { place: 'large/flywheel.stl', kind: 'mesh', bytes: sphere(300, 360_000) },
    { place: 'open.stl', kind: 'open', bytes: open },
    ...listBad(),
    ...['notes.txt', 'drawings/sheet-1.pdf', 'drawings/sheet-2.dxf', 'photo.png', 'read me.md'].map((place): FolderFile => ({ place, kind: 'other', bytes: text(`This is ${place}.`) })),
  ];
}

/** Writes the files below a new folder. */
export function writeFolder(folder: string, files: readonly FolderFile[]): void {
  rmSync(folder, { recursive: true, force: true });
  for (const { place, bytes } of files) {
    mkdirSync(path.dirname(path.join(folder, place)), { recursive: true });
    writeFileSync(path.join(folder, place), bytes);
  }
}
