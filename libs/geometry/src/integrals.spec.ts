import { describe, expect, it } from 'vitest';
import { measureMesh } from './measurer';
import { compareExactly } from './testing/compare-exactly';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

const tilt = shapes.makeRotation(0.3, 0.7, 1.1);
const plate = shapes.makeBlock([0, 0, 0], [1000, 1000, 0.001]);
const needle = shapes.makeCylinder(0.5, 1e5, 24);
const torus = shapes.makeTorus(5, 1, 48);
const torusDiagonal = Math.hypot(12, 12, 2);
const shell = (gap: number): shapes.Corners => shapes.makeThickShell(10, 10 - gap, 40);

const meshes: Record<string, shapes.Corners> = {
  'a sphere': shapes.makeSphere(10, 64),
  'a tilted torus': shapes.rotate(torus, tilt),
  'a torus 1e5 diagonals away': shapes.move(torus, [1e5 * torusDiagonal, -1e5 * torusDiagonal, 1e5 * torusDiagonal]),
  'a torus 1e6 diagonals away': shapes.move(torus, [1e6 * torusDiagonal, 3, 0]),
  'a thin plate': plate,
  'a tilted thin plate': shapes.rotate(plate, tilt),
  'a needle': needle,
  'a tilted needle': shapes.rotate(needle, tilt),
  'a shell with a gap of 1e-4': shell(1e-3),
  'a shell with a gap of 2e-6': shell(2e-5),
  'a tilted shell with a gap of 2e-6, far away': shapes.move(shapes.rotate(shell(2e-5), tilt), [1e6, 1e6, -1e6]),
  'a mesh of 1e-9': shapes.stretch(torus, [1e-9, 1e-9, 1e-9]),
  'a mesh of 1e12': shapes.stretch(torus, [1e12, 1e12, 1e12]),
  'a mesh inside out': shapes.turn(shapes.makeFrustum(5, 3, 10, 30)),
  'the two-box housing': shapes.makeHousing(),
};

describe('integrals against exact rational arithmetic', () => {
  it.each(Object.entries(meshes))('%s with binary64 coordinates is right to 1e-13', (_name, corners) => {
    const errors = compareExactly(measureMesh(writeAsciiStl(corners)), corners);
    if (process.env['SHOW_ERRORS']) console.log(_name, errors);
    expect(errors.volume).toBeLessThan(1e-13);
    expect(errors.centre).toBeLessThan(1e-13);
    expect(errors.second).toBeLessThan(1e-13);
  });
});
