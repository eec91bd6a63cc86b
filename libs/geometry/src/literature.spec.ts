import { describe, expect, it } from 'vitest';
import type { Measurement } from './measurement';
import { measureMesh } from './measurer';
import * as shapes from './testing/shapes';
import { writeAsciiStl } from './write-stl';

/** Volume, centre, and inertia matrix about the centre with off-diagonals -∫xy dm, at unit density. */
function describeBody({ volume, origin, surface }: Measurement) {
  if (volume === null) throw new Error('The mesh has no volume.');
  const { xx, yy, zz, xy, yz, zx } = volume.second;
  return {
    volume: volume.content,
    area: surface.content,
    centre: volume.centreFromOrigin.map((offset, k) => offset + (origin[k] ?? 0)),
    matrix: [yy + zz, zz + xx, xx + yy, -xy, -zx, -yz],
  };
}

const relative = (digits: number) => (value: number): number => expect.closeTo(value, digits - 1 - Math.floor(Math.log10(Math.abs(value)))) as number;

describe('polyhedra from the literature', () => {
  it('Tonon 2004, worked example: the tetrahedron with the vertices as printed', () => {
    // J. Math. Stat. 1(1); exact for the printed vertices, computed with rational numbers outside this project. The printed results
    // agree to some 2e-8, since the vertices are rounded.
    const body = describeBody(measureMesh(writeAsciiStl(shapes.makeTetrahedron([8.3322, -11.86875, 0.93355], [0.75523, 5, 16.37072], [52.61236, 5, -5.3858], [2, 5, 3]))));
    expect(body.volume).toBeCloseTo(1873.2333642165, 9);
    expect(body.area).toBeCloseTo(1458.0438023, 6);
    expect(body.matrix).toEqual([43520.33328539, 194711.29259079, 191168.76488608, -11996.20139323, 46343.16738139, -4417.66156969].map(relative(12)));
    // As printed, secondary.
    expect(body.centre).toEqual([15.92492, 0.78281, 3.72962].map((centre) => expect.closeTo(centre, 4) as number));
    for (const [k, printed] of [43520.33257, 194711.28938, 191168.76173].entries()) expect(Math.abs((body.matrix[k] ?? 0) / printed - 1)).toBeLessThan(3e-8);
  });

  it('Mirtich 1996: the cube of side 20', () => {
    const body = describeBody(measureMesh(writeAsciiStl(shapes.makeBlock([-10, -10, -10], [10, 10, 10]))));
    expect(body).toMatchObject({ volume: 8000, area: 2400, centre: [0, 0, 0] });
    expect(body.matrix.map((element) => element + 0)).toEqual([533333.3333333334, 533333.3333333334, 533333.3333333334, 0, 0, 0]);
  });

  it('Mirtich 1996: the right-angled tetrahedron', () => {
    const body = describeBody(measureMesh(writeAsciiStl(shapes.makeTetrahedron([0, 0, 0], [0, 4, 0], [5, 0, 0], [0, 0, 3]))));
    expect(body.volume).toBe(10);
    expect(body.centre).toEqual([1.25, 1, 0.75]);
    // The products of inertia are +2.5, … with the matrix's sign, since the body leans away from the diagonal.
    expect(body.matrix).toEqual([9.375, 12.75, 15.375, 2.5, 1.875, 1.5]);
  });

  it('Mirtich 1996: the icosahedron on the unit sphere', () => {
    const [s, l] = [Math.sqrt((5 - Math.sqrt(5)) / 10), Math.sqrt((5 + Math.sqrt(5)) / 10)];
    const vertices: shapes.Point[] = [-s, s].flatMap((u) => [-l, l].flatMap((v): shapes.Point[] => [[0, u, v], [u, v, 0], [v, 0, u]]));
    const edge = 2 * s;
    const near = (p: shapes.Point, q: shapes.Point): boolean => Math.abs(Math.hypot(p[0] - q[0], p[1] - q[1], p[2] - q[2]) - edge) < 1e-9;
    const facets: number[] = [];
    for (const p of vertices) for (const q of vertices) for (const r of vertices) {
      const first = vertices.indexOf(p) < Math.min(vertices.indexOf(q), vertices.indexOf(r));
      const outward = p[0] * (q[1] * r[2] - q[2] * r[1]) + p[1] * (q[2] * r[0] - q[0] * r[2]) + p[2] * (q[0] * r[1] - q[1] * r[0]) > 0;
      if (first && near(p, q) && near(q, r) && near(r, p) && outward) facets.push(...p, ...q, ...r);
    }
    const measurement = measureMesh(writeAsciiStl(Float64Array.from(facets)));
    const body = describeBody(measurement);
    expect(measurement.facets).toBe(20);
    expect(body.volume).toBeCloseTo(2.5361507101, 10);
    expect(body.matrix.slice(0, 3)).toEqual([0.7340703576, 0.7340703576, 0.7340703576].map((inertia) => expect.closeTo(inertia, 10) as number));
  });
});
