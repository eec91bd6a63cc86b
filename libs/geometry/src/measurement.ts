/**
 * Names the way in which a file is read and integrated. The same bytes and the same version give the same bits;
 * whatever could change a bit of a measurement needs a new version.
 */
export const measuringVersion = 'm1';

export type MeshFormat = 'stl-binary' | 'stl-ascii' | 'obj';

/** How the stored file wraps the mesh. */
export type MeshCompression = 'gzip';

/** Numbers along x, y and z of the mesh frame. */
export type Vector3 = [number, number, number];

export interface Symmetric3 {
  xx: number;
  yy: number;
  zz: number;
  xy: number;
  yz: number;
  zx: number;
}

/** What can be noticed in a mesh, in the order in which it is reported. */
export const findingKinds = [
  'boundary-edges',
  'crowded-edges',
  'unbalanced-edges',
  'degenerate-facets',
  'duplicate-facets',
  'turned-whole',
  'no-volume',
  'trailing-bytes',
  'several-solids',
  'nonzero-attributes',
  'contradicting-normals',
  'non-planar-polygons',
  'folded-polygons',
] as const;
export type FindingKind = (typeof findingKinds)[number];

/**
 * Something noticed in a mesh. `count` counts what the kind names: edges, facets, bytes (`trailing-bytes`), solids, polygons;
 * it is 1 for `turned-whole` and `no-volume`. `facets` holds at most 20 of the facets concerned, from 0, ascending.
 */
export interface Finding {
  kind: FindingKind;
  count: number;
  facets: number[];
}

/** The most facets that one finding lists. */
export const findingFacets = 20;

/**
 * The verdict on a whole mesh.
 * closed: every undirected edge has an even number of facets.
 * oriented: as many facets run along every edge one way as the other. An edge with an odd number cannot balance, so a mesh
 * that is not closed is not oriented either; whether its other edges balance is told by the finding `unbalanced-edges`.
 * outward: the signed volume of the file as stored is positive (of a mesh that is not closed: its volume about the middle of the box).
 * turned: closed, oriented and of negative volume, so every facet was read the other way round.
 * defensible: closed, oriented and of a volume that can be told from zero.
 */
export interface Soundness {
  closed: boolean;
  oriented: boolean;
  outward: boolean;
  turned: boolean;
  boundaryEdges: number;
  nonManifoldEdges: number;
  degenerateFacets: number;
  duplicateFacets: number;
  defensible: boolean;
  findings: Finding[];
}

/**
 * Integrals over a body or over its surface at unit density, in the mesh's own unit.
 * content: ∫1. centreFromOrigin: the centroid less the measurement's origin.
 * second: ∫x², …, ∫xy, … about the centroid along the axes of the mesh frame, every one with a plus sign.
 */
export interface Integrals {
  content: number;
  centreFromOrigin: Vector3;
  second: Symmetric3;
}

/** What was found in a mesh file, in its own unit at unit density. `origin` is the first corner of the first facet, exactly. */
export interface Measurement {
  measuringVersion: string;
  format: MeshFormat;
  /** Null where the file is the mesh itself. */
  compression: MeshCompression | null;
  facets: number;
  origin: Vector3;
  boundingBox: { min: Vector3; max: Vector3 };
  /** Null where the mesh is not defensible. */
  volume: Integrals | null;
  surface: Integrals;
  soundness: Soundness;
}
