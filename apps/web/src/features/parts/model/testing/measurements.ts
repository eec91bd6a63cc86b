import { measuringVersion, type Measurement, type Shell } from '@masswright/contracts';

/** A block of 30 × 20 × 10 units with a corner at the origin, measured and examined: volume 6000, second moments V·a²/12. */
export function makeMeasurement(change: Partial<Measurement> = {}): Measurement {
  return {
    measuringVersion,
    format: 'stl-binary',
    compression: null,
    declaredUnit: null,
    declaredMaterials: [],
    examined: 'whole',
    facets: 12,
    origin: [0, 0, 0],
    boundingBox: { min: [0, 0, 0], max: [30, 20, 10] },
    volume: { content: 6000, centreFromOrigin: [15, 10, 5], second: { xx: 6000 * 75, yy: (6000 * 400) / 12, zz: (6000 * 100) / 12, xy: 0, yz: 0, zx: 0 }, errorBound: 1e-15 },
    surface: { content: 2200, centreFromOrigin: [15, 10, 5], second: { xx: 225_000, yy: 340_000 / 3, zz: 115_000 / 3, xy: 0, yz: 0, zx: 0 }, errorBound: 1e-15 },
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
    ...change,
  };
}

/** A shell that is a block beside the origin; `sign` -1 for the wall of a hollow. */
export function makeShell(kind: Shell['kind'], [a, b, c]: readonly [number, number, number], { inside = null, sign = 1 }: { inside?: number | null; sign?: 1 | -1 } = {}): Shell {
  const content = sign * a * b * c;
  return {
    kind,
    facets: 12,
    firstFacet: 0,
    inside,
    turned: false,
    boundingBox: { min: [0, 0, 0], max: [a, b, c] },
    area: 2 * (a * b + b * c + c * a),
    volume: { content, centreFromOrigin: [a / 2, b / 2, c / 2], second: { xx: (content * a * a) / 12, yy: (content * b * b) / 12, zz: (content * c * c) / 12, xy: 0, yz: 0, zx: 0 }, errorBound: 1e-15 },
  };
}
