import type { Integrals, Measurement, Setting, Symmetric3, Vector3 } from '@masswright/contracts';
import fc from 'fast-check';
import type { RigidBody } from '../axis-moment';
import type { Rotation, Tensor } from '../tensor';

/** A tensor with nothing off its diagonal. */
export const makeDiagonal = (xx: number, yy: number, zz: number): Tensor => ({ xx, yy, zz, xy: 0, yz: 0, zx: 0 });

export const makePoint = (massKg: number, centreOfMassM: Vector3): RigidBody => ({ massKg, centreOfMassM, inertiaAtCentreOfMassKgM2: makeDiagonal(0, 0, 0) });

/** A thin rod along x, m L²/12. */
export const makeRod = (massKg: number, lengthM: number, centreOfMassM: Vector3): RigidBody => {
  const inertia = (massKg * lengthM * lengthM) / 12;
  return { massKg, centreOfMassM, inertiaAtCentreOfMassKgM2: makeDiagonal(0, inertia, inertia) };
};

/** A disc about z, m R²/2. */
export const makeDisc = (massKg: number, radiusM: number): RigidBody => {
  const polar = (massKg * radiusM * radiusM) / 2;
  return { massKg, centreOfMassM: [0, 0, 0], inertiaAtCentreOfMassKgM2: makeDiagonal(polar / 2, polar / 2, polar) };
};

/** A ball, 2/5 m R². */
export const makeBall = (massKg: number, radiusM: number, centreOfMassM: Vector3): RigidBody => {
  const inertia = 0.4 * massKg * radiusM * radiusM;
  return { massKg, centreOfMassM, inertiaAtCentreOfMassKgM2: makeDiagonal(inertia, inertia, inertia) };
};

/** A block, m (b² + c²)/12. */
export const makeBlock = (massKg: number, [a, b, c]: Vector3, centreOfMassM: Vector3): RigidBody => ({
  massKg,
  centreOfMassM,
  inertiaAtCentreOfMassKgM2: makeDiagonal((massKg * (b * b + c * c)) / 12, (massKg * (c * c + a * a)) / 12, (massKg * (a * a + b * b)) / 12),
});

/**
 * A measurement of a sound mesh with these integrals. Its surface is that of a ball of the same volume, for lack of anything better;
 * nothing of it is in doubt but the digits of its coordinates.
 */
export function makeMeasurement(content: number, centreFromOrigin: Vector3, second: Symmetric3, origin: Vector3 = [0, 0, 0]): Measurement {
  const volume: Integrals = { content, centreFromOrigin, second, errorBound: 1e-15 };
  const radius = Math.cbrt((3 * content) / (4 * Math.PI));
  const area = 4 * Math.PI * radius * radius;
  const third = (area * radius * radius) / 3;
  return {
    measuringVersion: 'm2',
    format: 'stl-binary',
    compression: null,
    declaredUnit: null,
    declaredMaterials: [],
    examined: 'whole',
    facets: 12,
    origin,
    boundingBox: { min: [-1, -2, -3], max: [1, 2, 3] },
    volume,
    surface: { content: area, centreFromOrigin, second: { xx: third, yy: third, zz: third, xy: 0, yz: 0, zx: 0 }, errorBound: 1e-15 },
    soundness: {
      closed: true,
      oriented: true,
      outward: true,
      turned: false,
      boundaryEdges: 0,
      nonManifoldEdges: 0,
      nonManifoldVertices: 0,
      degenerateFacets: 0,
      duplicateFacets: 0,
      shells: 1,
      cavities: 0,
      selfIntersections: 0,
      defensible: true,
      findings: [],
    },
    shells: null,
    openings: null,
    polygonVolume: 0,
    facetDoubt: null,
  };
}

export const plainSetting: Setting = { lengthUnit: 'm', densityKgM3: 1, densitySpreadKgM3: null, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };

export const anyNumber = fc.double({ min: -10, max: 10, noNaN: true });
export const anyVector: fc.Arbitrary<Vector3> = fc.tuple(anyNumber, anyNumber, anyNumber);

/** A rotation from a quaternion. */
export const anyRotation: fc.Arbitrary<Rotation> = fc
  .tuple(anyNumber, anyNumber, anyNumber, anyNumber)
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q) => {
    const size = Math.hypot(...q);
    const [w, x, y, z] = q.map((element) => element / size) as [number, number, number, number];
    return [
      [1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
      [2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
      [2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
    ];
  });

/** Moments that a body can have, ascending. */
export const anyMoments: fc.Arbitrary<Vector3> = fc
  .tuple(fc.double({ min: 1e-3, max: 10, noNaN: true }), fc.double({ min: 1e-3, max: 10, noNaN: true }), fc.double({ min: 1e-3, max: 10, noNaN: true }))
  .map(([x, y, z]) => [y + z, z + x, x + y].sort((one, two) => one - two) as Vector3);

export const toMatrix = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): [Vector3, Vector3, Vector3] => [[xx, xy, zx], [xy, yy, yz], [zx, yz, zz]];

/** Largest difference of two tensors, relative to the largest element. */
export function compareTensors(one: Tensor, two: Tensor): number {
  const [a, b] = [toMatrix(one).flat(), toMatrix(two).flat()];
  return Math.max(...a.map((element, k) => Math.abs(element - (b[k] ?? NaN)))) / Math.max(...a.map(Math.abs), ...b.map(Math.abs), Number.MIN_VALUE);
}

/** Numbers in [0, 1), the same for the same seed (mulberry32). */
export function createDraw(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let word = Math.imul(state ^ (state >>> 15), 1 | state);
    word = (word + Math.imul(word ^ (word >>> 7), 61 | word)) ^ word;
    return ((word ^ (word >>> 14)) >>> 0) / 4_294_967_296;
  };
}
