import { describe, expect, it } from 'vitest';
import type { Measurement } from './measurement';
import { measureMesh } from './measurer';
import * as shapes from './testing/shapes';
import { writeAsciiStl } from './write-stl';

/** Of a solid of uniform density and mass 1, axes through the centre of mass: the standard handbook set, from memory. */
interface Solid {
  volume: number;
  centreZ: number;
  inertiaX: number;
  inertiaY?: number;
  inertiaZ: number;
  area?: number;
}

const cylinder = (R: number, h: number): Solid => ({ volume: Math.PI * R * R * h, centreZ: h / 2, inertiaX: (3 * R * R + h * h) / 12, inertiaZ: (R * R) / 2, area: 2 * Math.PI * R * (R + h) });
const tube = (R: number, r: number, h: number): Solid => ({ volume: Math.PI * (R * R - r * r) * h, centreZ: h / 2, inertiaX: (3 * (R * R + r * r) + h * h) / 12, inertiaZ: (R * R + r * r) / 2 });
const sphere = (R: number): Solid => ({ volume: (4 / 3) * Math.PI * R ** 3, centreZ: 0, inertiaX: 0.4 * R * R, inertiaZ: 0.4 * R * R, area: 4 * Math.PI * R * R });
const thickShell = (R: number, r: number): Solid => {
  const inertia = (0.4 * (R ** 5 - r ** 5)) / (R ** 3 - r ** 3);
  return { volume: (4 / 3) * Math.PI * (R ** 3 - r ** 3), centreZ: 0, inertiaX: inertia, inertiaZ: inertia };
};
const cone = (R: number, h: number): Solid => ({ volume: (Math.PI * R * R * h) / 3, centreZ: h / 4, inertiaX: (3 * R * R) / 20 + (3 * h * h) / 80, inertiaZ: 0.3 * R * R, area: Math.PI * R * (R + Math.hypot(R, h)) });
const torus = (c: number, a: number): Solid => ({ volume: 2 * Math.PI ** 2 * c * a * a, centreZ: 0, inertiaX: (c * c) / 2 + (5 * a * a) / 8, inertiaZ: c * c + (3 * a * a) / 4, area: 4 * Math.PI ** 2 * c * a });
const hemisphere = (R: number): Solid => ({ volume: (2 / 3) * Math.PI * R ** 3, centreZ: (3 * R) / 8, inertiaX: (83 / 320) * R * R, inertiaZ: 0.4 * R * R, area: 3 * Math.PI * R * R });
const ellipsoid = (a: number, b: number, c: number): Solid => ({ volume: (4 / 3) * Math.PI * a * b * c, centreZ: 0, inertiaX: (b * b + c * c) / 5, inertiaY: (c * c + a * a) / 5, inertiaZ: (a * a + b * b) / 5 });
const frustum = (R: number, r: number, h: number): Solid => {
  // The transverse moment from the cone's by subtracting the missing tip, each about the base.
  const H = (h * R) / (R - r);
  const whole = cone(R, H);
  const tip = cone(r, H - h);
  const volume = whole.volume - tip.volume;
  const centreZ = (h * (R * R + 2 * R * r + 3 * r * r)) / (4 * (R * R + R * r + r * r));
  const aboutBase = whole.volume * (whole.inertiaX + whole.centreZ ** 2) - tip.volume * (tip.inertiaX + (h + tip.centreZ) ** 2);
  return { volume: (Math.PI * h * (R * R + R * r + r * r)) / 3, centreZ, inertiaX: aboutBase / volume - centreZ ** 2, inertiaZ: (0.3 * (R ** 5 - r ** 5)) / (R ** 3 - r ** 3) };
};
const cap = (R: number, h: number): Pick<Solid, 'volume' | 'centreZ' | 'inertiaZ'> => {
  const volume = (Math.PI * h * h * (3 * R - h)) / 3;
  // ∫ π (R² - z²)²/2 dz from R - h to R.
  const primitive = (z: number): number => R ** 4 * z - (2 / 3) * R * R * z ** 3 + z ** 5 / 5;
  return { volume, centreZ: (3 * (2 * R - h) ** 2) / (4 * (3 * R - h)), inertiaZ: ((Math.PI / 2) * (primitive(R) - primitive(R - h))) / volume };
};

function findProperties(corners: shapes.Corners): Solid & { products: number } {
  const { volume, origin, surface }: Measurement = measureMesh(writeAsciiStl(corners));
  if (volume === null) throw new Error('The mesh has no volume.');
  const { xx, yy, zz, xy, yz, zx } = volume.second;
  return {
    volume: volume.content,
    centreZ: origin[2] + volume.centreFromOrigin[2],
    inertiaX: (yy + zz) / volume.content,
    inertiaY: (zz + xx) / volume.content,
    inertiaZ: (xx + yy) / volume.content,
    area: surface.content,
    products: Math.max(Math.abs(xy), Math.abs(yz), Math.abs(zx)) / volume.content,
  };
}

const [R, r, h, c, a] = [0.05, 0.03, 0.1, 0.05, 0.01];
const curved: [name: string, make: (segments: number) => shapes.Corners, exact: Partial<Solid>][] = [
  ['a disc', (n) => shapes.makeCylinder(R, 0.002, n), cylinder(R, 0.002)],
  ['a cylinder', (n) => shapes.makeCylinder(R, h, n), cylinder(R, h)],
  ['a hollow cylinder', (n) => shapes.makeTube(R, r, h, n), tube(R, r, h)],
  ['a thin hoop', (n) => shapes.makeTube(R, 0.0499, 0.0002, n), tube(R, 0.0499, 0.0002)],
  ['a sphere', (n) => shapes.makeSphere(R, n), sphere(R)],
  ['a thick shell', (n) => shapes.makeThickShell(R, r, n), thickShell(R, r)],
  ['a cone', (n) => shapes.makeCone(R, h, n), cone(R, h)],
  ['a frustum', (n) => shapes.makeFrustum(R, r, h, n), frustum(R, r, h)],
  ['a torus', (n) => shapes.makeTorus(c, a, n), torus(c, a)],
  ['a hemisphere', (n) => shapes.makeHemisphere(R, n), hemisphere(R)],
  ['a spherical cap', (n) => shapes.makeCap(R, 0.02, n), cap(R, 0.02)],
  ['an ellipsoid', (n) => shapes.stretch(shapes.makeSphere(1, n), [0.03, 0.04, 0.05]), ellipsoid(0.03, 0.04, 0.05)],
];

describe('curved solids of the handbook, by refinement', () => {
  it.each(curved)('%s: every error falls with the square of the segments', (_name, make, exact) => {
    const [coarse, fine] = [findProperties(make(40)), findProperties(make(80))];
    for (const key of ['volume', 'centreZ', 'inertiaX', 'inertiaY', 'inertiaZ', 'area'] as const) {
      const truth = exact[key] ?? (key === 'inertiaY' ? exact.inertiaX : undefined);
      if (truth === undefined) continue;
      const scale = key === 'centreZ' ? R : truth;
      const [before, after] = [Math.abs((coarse[key] ?? NaN) - truth) / scale, Math.abs((fine[key] ?? NaN) - truth) / scale];
      expect(after, key).toBeLessThan(4e-3);
      // Symmetry makes some of them exact at any refinement.
      if (after < 1e-12) continue;
      const order = Math.log2(before / after);
      expect(order, key).toBeGreaterThan(1.95);
      expect(order, key).toBeLessThan(2.05);
    }
    expect(fine.products).toBeLessThan(1e-15);
  });

  it('a thin shell: the surface of a sphere has 2/3 m R²', () => {
    const errors = [40, 80].map((segments) => {
      const { surface } = measureMesh(writeAsciiStl(shapes.makeSphere(R, segments)));
      return Math.abs((surface.second.xx + surface.second.yy) / surface.content / ((2 / 3) * R * R) - 1);
    });
    expect(Math.log2((errors[0] ?? NaN) / (errors[1] ?? NaN))).toBeCloseTo(2, 1);
  });

  it('worked numbers of the handbook set agree with the formulas used here (m = 2)', () => {
    expect(2 * tube(R, r, h).inertiaZ).toBeCloseTo(0.0034, 12);
    expect(2 * tube(R, r, h).inertiaX).toBeCloseTo(0.00336667, 8);
    expect([2 * cone(R, h).inertiaZ, 2 * cone(R, h).inertiaX]).toEqual([expect.closeTo(0.0015, 12), expect.closeTo(0.0015, 12)]);
    expect(frustum(R, r, h).volume).toBeCloseTo(5.131268e-4, 10);
    expect(frustum(R, r, h).centreZ).toBeCloseTo(0.0418367, 7);
    expect(2 * frustum(R, r, h).inertiaZ).toBeCloseTo(0.00176449, 8);
    expect([torus(c, a).volume, 2 * torus(c, a).inertiaZ, 2 * torus(c, a).inertiaX]).toEqual([expect.closeTo(9.869604e-5, 11), expect.closeTo(0.00515, 12), expect.closeTo(0.002625, 12)]);
    expect([hemisphere(R).centreZ, 2 * hemisphere(R).inertiaZ, 2 * hemisphere(R).inertiaX]).toEqual([expect.closeTo(0.01875, 12), expect.closeTo(0.002, 12), expect.closeTo(0.001296875, 12)]);
    expect([cap(R, 0.02).volume, cap(R, 0.02).centreZ, cap(R, 0.02).volume * cap(R, 0.02).inertiaZ]).toEqual([expect.closeTo(5.445427e-5, 11), expect.closeTo(0.0369231, 7), expect.closeTo(3.032684e-8, 14)]);
    const e = ellipsoid(0.03, 0.04, 0.05);
    expect([e.volume, 2 * e.inertiaX, 2 * (e.inertiaY ?? NaN), 2 * e.inertiaZ]).toEqual([expect.closeTo(2.513274e-4, 10), expect.closeTo(0.00164, 12), expect.closeTo(0.00136, 12), expect.closeTo(0.001, 12)]);
  });
});

describe('solids with flat faces are exact', () => {
  const close = (found: number, truth: number): void => expect(Math.abs(found / truth - 1)).toBeLessThan(1e-14);

  it('a thin rod: m L²/12 about the centre, and m L²/3 about its end', () => {
    const rod = findProperties(shapes.makeBlock([0, 0, 0], [1e-5, 1e-5, 2]));
    close(rod.inertiaX, (4 + 1e-10) / 12);
    close(rod.inertiaX + rod.centreZ ** 2, 4 / 3 + 1e-10 / 12);
  });
  it('a block: m (b² + c²)/12', () => {
    const block = findProperties(shapes.makeBlock([1, 2, 3], [2, 4, 6]));
    close(block.inertiaX, 13 / 12);
    close(block.inertiaY ?? NaN, 10 / 12);
    close(block.inertiaZ, 5 / 12);
  });
  it('a regular tetrahedron: a³/(6√2), m a²/20', () => {
    const s = 1 / (2 * Math.SQRT2);
    const found = findProperties(shapes.makeTetrahedron([s, s, s], [-s, s, -s], [s, -s, -s], [-s, -s, s]));
    close(found.volume, 0.1178511301977579);
    for (const inertia of [found.inertiaX, found.inertiaY ?? NaN, found.inertiaZ]) close(inertia, 0.05);
  });
  it('a rectangular pyramid: Iz = m (a² + b²)/20, Ix = m (b²/20 + 3h²/80)', () => {
    const found = findProperties(shapes.makePyramid(0.06, 0.04, 0.1));
    close(found.volume, 8e-5);
    close(found.centreZ, 0.025);
    close(2 * found.inertiaZ, 0.00052);
    close(2 * found.inertiaX, 0.00091);
    close(2 * (found.inertiaY ?? NaN), 0.00111);
  });
  it('a right-angled wedge, its product of inertia -m a b/36 included', () => {
    const { volume, origin } = measureMesh(writeAsciiStl(shapes.makePrism([[0, 0], [0.06, 0], [0, 0.04]], 0, 0.1)));
    if (volume === null) throw new Error('The wedge has no volume.');
    const perMass = 2 / volume.content;
    close(origin[0] + volume.centreFromOrigin[0], 0.02);
    close(origin[1] + volume.centreFromOrigin[1], 0.04 / 3);
    close(perMass * (volume.second.yy + volume.second.zz), 2 * (0.04 ** 2 / 18 + 0.01 / 12));
    close(perMass * (volume.second.zz + volume.second.xx), 2 * (0.06 ** 2 / 18 + 0.01 / 12));
    close(perMass * (volume.second.xx + volume.second.yy), (2 * (0.06 ** 2 + 0.04 ** 2)) / 18);
    close(perMass * volume.second.xy, (-2 * 0.06 * 0.04) / 36);
  });
  it('the two-box housing', () => {
    // Computed from the two boxes; digits as far as they were written down.
    const { volume, origin } = measureMesh(writeAsciiStl(shapes.makeHousing()));
    if (volume === null) throw new Error('The housing has no volume.');
    const { xx, yy, zz, xy, yz, zx } = volume.second;
    expect(volume.content).toBe(39000);
    expect(volume.centreFromOrigin.map((offset, k) => offset + (origin[k] ?? 0))).toEqual([20.3846153846, 18.0769230769, 16.5384615385].map((centre) => expect.closeTo(centre, 9) as number));
    expect([yy + zz, zz + xx, xx + yy, -xy, -zx, -yz]).toEqual([16188461.538, 24726923.077, 17650000, -1153846.154, 6923076.923, 1384615.385].map((moment) => expect.closeTo(moment, 2) as number));
  });
});
