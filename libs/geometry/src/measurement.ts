/**
 * Names the way in which a file is read and integrated. The same bytes and the same version give the same bits;
 * whatever could change a bit of a measurement needs a new version.
 */
export const measuringVersion = 'm2';

export type MeshFormat = 'stl-binary' | 'stl-ascii' | 'obj' | 'ply-ascii' | 'ply-binary' | 'off' | '3mf' | 'gltf' | 'glb';

/** Units that a mesh file can state of itself. */
export type DeclaredUnit = 'micron' | 'mm' | 'cm' | 'm' | 'inch' | 'foot';

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
  'hairline-gaps',
  'crowded-edges',
  'unbalanced-edges',
  'turned-facets',
  'crowded-vertices',
  'degenerate-facets',
  'duplicate-facets',
  'turned-whole',
  'turned-shells',
  'overlapping-shells',
  'self-intersections',
  'no-volume',
  'trailing-bytes',
  'several-solids',
  'nonzero-attributes',
  'contradicting-normals',
  'non-planar-polygons',
  'folded-polygons',
] as const;
export type FindingKind = (typeof findingKinds)[number];

/** A straight line of the mesh: x, y, z of its two ends, mesh frame. */
export type LineSegment = [number, number, number, number, number, number];

/**
 * Something noticed in a mesh. `count` counts what the kind names: edges, vertices, facets, shells, pairs of facets (`self-intersections`),
 * loops (`hairline-gaps`), bytes (`trailing-bytes`), solids, polygons; it is 1 for `turned-whole` and `no-volume`.
 * `facets` holds at most 20 of the facets concerned, from 0, ascending; `lines` at most 20 of the lines where it is: edges, or where facets meet.
 */
export interface Finding {
  kind: FindingKind;
  count: number;
  facets: number[];
  lines: LineSegment[];
}

/** The most facets, and the most lines, that one finding lists. */
export const findingFacets = 20;

/**
 * The verdict on a whole mesh. Null is what was not examined.
 * closed: every undirected edge has an even number of facets.
 * oriented: as many facets run along every edge one way as the other. An edge with an odd number cannot balance, so a mesh
 * that is not closed is not oriented either; whether its other edges balance is told by the finding `unbalanced-edges`.
 * outward: the signed volume of the file as stored is positive (of a mesh that is not closed: its volume about the middle of the box).
 * turned: closed, oriented and of negative volume, so every facet was read the other way round; or one of its shells was.
 * shells: pieces whose facets hang together by edges, cavities among them.
 * selfIntersections: pairs of facets that pass through each other.
 * defensible: closed and oriented, or open by hairlines alone; of a volume that can be told from zero; and no shell overlaps another,
 * as far as that was examined.
 */
export interface Soundness {
  closed: boolean | null;
  oriented: boolean;
  outward: boolean;
  turned: boolean;
  boundaryEdges: number | null;
  nonManifoldEdges: number | null;
  nonManifoldVertices: number | null;
  degenerateFacets: number | null;
  duplicateFacets: number | null;
  shells: number | null;
  cavities: number | null;
  selfIntersections: number | null;
  defensible: boolean;
  findings: Finding[];
}

/**
 * Integrals over a body or over its surface at unit density, in the mesh's own unit.
 * content: ∫1. centreFromOrigin: the centroid less the measurement's origin.
 * second: ∫x², …, ∫xy, … about the centroid along the axes of the mesh frame, every one with a plus sign.
 * errorBound: what rounding may have done at most: to the content relative to it, to the centroid relative to the diagonal of the box, to the second
 * moments relative to content times diagonal². 1 where the content may be zero.
 */
export interface Integrals {
  content: number;
  centreFromOrigin: Vector3;
  second: Symmetric3;
  errorBound: number;
}

/** Changes of ∫1, ∫x…, ∫x²…, ∫xy… in the mesh's own unit, all about the centroid that was measured: adding them gives the integrals of another body about that same point. */
export interface IntegralChange {
  content: number;
  first: Vector3;
  second: Symmetric3;
}

/**
 * What became of one shell, a piece of the mesh whose facets hang together by edges.
 * solid: the body with the largest volume. detached: another body beside it, or loose in a cavity. cavity: the wall of a hollow, read as it should be: its volume is negative.
 * overlapping: it passes through another shell, or lies within a body and yet adds to it. open: it has boundary edges, and no volume.
 */
export type ShellKind = 'solid' | 'detached' | 'cavity' | 'overlapping' | 'open';

export interface Shell {
  kind: ShellKind;
  facets: number;
  /** Index of its first facet in the file. */
  firstFacet: number;
  /** Place in the list of the smallest shell around it; null where there is none, or it was not examined. */
  inside: number | null;
  /** Its facets were read the other way round. */
  turned: boolean;
  boundingBox: { min: Vector3; max: Vector3 };
  area: number;
  /** Signed as it counts in the whole: negative for a cavity. Null where it is open. */
  volume: Integrals | null;
}

/** The most shells that are listed; the count in the soundness has no limit. */
export const listedShells = 200;

/** A closed run of edges with one facet only. */
export interface BoundaryLoop {
  edges: number;
  length: number;
  centre: Vector3;
  /** Largest distance of two of its vertices across the gap: what would have to be moved to close it. */
  width: number;
}

/** The most loops that are listed, the longest first. */
export const listedLoops = 20;

/**
 * The openings of a mesh that is not closed.
 * volumes: about the middle of the box, and with every loop fanned to its centre; far apart where the number says nothing. Never a figure of the part.
 * lostVolume: where all loops are hairlines, the most that the volume can be wrong by for having fanned them; otherwise null.
 */
export interface Openings {
  loops: BoundaryLoop[];
  loopCount: number;
  volumes: { aboutMiddle: number; fanned: number };
  lostVolume: number | null;
}

/**
 * What stands in for the curved surfaces behind the facets: predicted changes from the mesh to the smooth body, never mixed into the integrals.
 * spread: differences to what other ways of weighing the normals predict, each a vector of its own.
 */
export interface FacetDoubt {
  body: { correction: IntegralChange; spread: IntegralChange[] };
  /** Of the area. */
  area: { correction: number; spread: number[] };
}

/** integrals: figures and closedness stand, nothing else was examined yet. whole: everything was. limited: the mesh is too large for the rest. */
export type Examined = 'integrals' | 'whole' | 'limited';

/** What was found in a mesh file, in its own unit at unit density. `origin` is the first corner of the first facet, exactly. */
export interface Measurement {
  measuringVersion: string;
  format: MeshFormat;
  /** Null where the file is the mesh itself. */
  compression: MeshCompression | null;
  /** Null where the file states none. */
  declaredUnit: DeclaredUnit | null;
  /** Names of materials that the file gives its bodies, in its order, at most 20; it states no density. */
  declaredMaterials: string[];
  examined: Examined;
  facets: number;
  origin: Vector3;
  boundingBox: { min: Vector3; max: Vector3 };
  /** Null where the mesh is not defensible. */
  volume: Integrals | null;
  surface: Integrals;
  soundness: Soundness;
  /** Null where they were not examined; at most 200. */
  shells: Shell[] | null;
  /** Null where the mesh is closed, or was not examined. */
  openings: Openings | null;
  /** Largest part of the volume that hangs on how polygons that are not flat were cut; 0 where all are. */
  polygonVolume: number;
  /** Null where it was not examined, or the mesh is not defensible. */
  facetDoubt: FacetDoubt | null;
}
