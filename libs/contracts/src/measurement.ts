import { z } from 'zod';
import { symmetric3, vector3 } from './common';
import { lengthUnit } from './setting';

export const meshFormat = z.enum(['stl-binary', 'stl-ascii', 'obj', 'ply-ascii', 'ply-binary', 'off', '3mf', 'gltf', 'glb']);
export type MeshFormat = z.infer<typeof meshFormat>;

/** How the stored file wraps the mesh. */
export const meshCompression = z.enum(['gzip']);
export type MeshCompression = z.infer<typeof meshCompression>;

/** The version that files are measured by now; the same as geometry's own, to which a test of the worker holds it. */
export const measuringVersion = 'm2';

const count = z.number().int().nonnegative();
const box = z.object({ min: vector3, max: vector3 });

/** Something noticed in a mesh: a fact that a reader of the figures should know, with how often it occurs. */
export const finding = z.object({
  kind: z.enum([
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
  ]),
  count,
  /** Indices (from 0, in the order of the file) of some of the facets concerned, at most 20. */
  facets: z.array(count).max(20),
  /** Some of the lines where it is, at most 20: x, y, z of both ends in the mesh frame and unit. */
  lines: z.array(z.tuple([z.number(), z.number(), z.number(), z.number(), z.number(), z.number()])).max(20),
});
export type Finding = z.infer<typeof finding>;

/**
 * The verdict on a whole mesh. Null is what was not examined.
 * closed: every undirected edge has an even number of facets.
 * oriented: as many facets run along every edge one way as the other. An edge with an odd number cannot balance, so a mesh that is not closed
 * is not oriented either; whether its other edges balance is told by the finding `unbalanced-edges`.
 * outward: the signed volume of the file as stored is positive (of a mesh that is not closed: its volume about the middle of the box).
 * turned: closed, oriented and of negative volume, so every facet was read the other way round; or one of its shells was.
 */
export const soundness = z.object({
  closed: z.boolean().nullable(),
  oriented: z.boolean(),
  outward: z.boolean(),
  turned: z.boolean(),
  /** Undirected edges with an odd number of facets. */
  boundaryEdges: count.nullable(),
  /** Undirected edges with more than two facets. */
  nonManifoldEdges: count.nullable(),
  /** Vertices at which more than one fan of facets meets. */
  nonManifoldVertices: count.nullable(),
  /** Facets with two equal corners or with three on a line: no area. */
  degenerateFacets: count.nullable(),
  /** Facets whose three corners another facet has too, counted beyond the first. */
  duplicateFacets: count.nullable(),
  /** Pieces whose facets hang together by edges, cavities among them. */
  shells: count.nullable(),
  cavities: count.nullable(),
  /** Pairs of facets that pass through each other. */
  selfIntersections: count.nullable(),
  /** The figures can be stood behind: closed and oriented, or open by hairlines alone; a volume other than zero; no shell that overlaps another, as far as that was examined. */
  defensible: z.boolean(),
  findings: z.array(finding),
});
export type Soundness = z.infer<typeof soundness>;

/**
 * Integrals over a body or its surface at unit density, in the mesh's own unit.
 * `content` is ∫1 (volume: unit³, area: unit²); `centreFromOrigin` is the centroid less the measurement's `origin` (unit);
 * `second` holds ∫x²…, ∫xy… about the centroid, axes of the mesh frame, all with a plus sign (unit⁵ over a body, unit⁴ over a surface).
 * `errorBound` is what rounding may have done at most: to the content relative to it, to the centroid relative to the diagonal of the box,
 * to the second moments relative to content times diagonal². 1 where the content may be zero.
 */
export const integrals = z.object({
  content: z.number(),
  centreFromOrigin: vector3,
  second: symmetric3,
  errorBound: z.number().nonnegative(),
});
export type Integrals = z.infer<typeof integrals>;

/** Changes of ∫1, ∫x…, ∫x²…, ∫xy… in the mesh's own unit, all about the centroid that was measured. */
export const integralChange = z.object({ content: z.number(), first: vector3, second: symmetric3 });
export type IntegralChange = z.infer<typeof integralChange>;

/** A piece of the mesh whose facets hang together by edges. */
export const shell = z.object({
  /** solid: the body with the largest volume. detached: another body beside it, or loose in a cavity. cavity: the wall of a hollow. overlapping: it passes through another shell, or lies within a body and yet adds to it. open: it has boundary edges. */
  kind: z.enum(['solid', 'detached', 'cavity', 'overlapping', 'open']),
  facets: count,
  /** Index of its first facet in the file. */
  firstFacet: count,
  /** Place in the list of the smallest shell around it. */
  inside: count.nullable(),
  /** Its facets were read the other way round. */
  turned: z.boolean(),
  boundingBox: box,
  area: z.number(),
  /** Signed as it counts in the whole: negative for a cavity. Null where it is open. */
  volume: integrals.nullable(),
});
export type Shell = z.infer<typeof shell>;

/** A closed run of edges with one facet only: its length, its middle, and the largest distance across it, in the mesh's unit. */
export const boundaryLoop = z.object({ edges: count, length: z.number(), centre: vector3, width: z.number() });
export type BoundaryLoop = z.infer<typeof boundaryLoop>;

/**
 * The openings of a mesh that is not closed; at most 20 loops, the longest first. `volumes` are the one about the middle of the box and the one with every loop
 * fanned to its centre: an indication of the doubt, never a figure of the part. `lostVolume` is null unless all loops are hairlines.
 */
export const openings = z.object({
  loops: z.array(boundaryLoop).max(20),
  loopCount: count,
  volumes: z.object({ aboutMiddle: z.number(), fanned: z.number() }),
  lostVolume: z.number().nonnegative().nullable(),
});
export type Openings = z.infer<typeof openings>;

/** Predicted changes from the mesh to the smooth body behind it, never mixed into the integrals; `spread` holds the differences to other predictions. */
export const facetDoubt = z.object({
  body: z.object({ correction: integralChange, spread: z.array(integralChange) }),
  area: z.object({ correction: z.number(), spread: z.array(z.number()) }),
});
export type FacetDoubt = z.infer<typeof facetDoubt>;

/**
 * What was found in a mesh file, in its own unit at unit density. Immutable once it is whole, and the same bits for the same bytes and measuring version.
 * Lengths far from the mesh frame's origin would lose digits as one number, so positions are given as `origin` + an offset:
 * `origin` is a vertex of the mesh, exactly.
 */
export const measurement = z.object({
  measuringVersion: z.string(),
  format: meshFormat,
  compression: meshCompression.nullable(),
  /** The unit that the file states of itself; null where it states none. */
  declaredUnit: lengthUnit.nullable(),
  /** Names of materials that the file gives its bodies; it states no density. */
  declaredMaterials: z.array(z.string()).max(20),
  /** integrals: figures and closedness stand, the rest is examined yet. whole: everything was examined. limited: the mesh is too large for the rest. */
  examined: z.enum(['integrals', 'whole', 'limited']),
  facets: z.number().int().positive(),
  origin: vector3,
  boundingBox: box,
  /** Null where the mesh has no inside that could be integrated: it is not defensible. */
  volume: integrals.nullable(),
  surface: integrals,
  soundness,
  /** Null where they were not examined. */
  shells: z.array(shell).max(200).nullable(),
  /** Null where the mesh is closed, or was not examined. */
  openings: openings.nullable(),
  /** Largest part of the volume that hangs on how polygons that are not flat were cut; 0 where all are. */
  polygonVolume: z.number().nonnegative(),
  /** Null where it was not examined, or the mesh is not defensible. */
  facetDoubt: facetDoubt.nullable(),
});
export type Measurement = z.infer<typeof measurement>;

/** Why a file could not be measured. `at` is a byte (from 0) or a line (from 1) of the mesh, unpacked; where the message is about the archive, a byte of that. */
export const measuringErrorCodes = [
  'file-empty',
  'format-unknown',
  'file-truncated',
  'count-contradicts-size',
  'number-invalid',
  'number-not-finite',
  'syntax-invalid',
  'facets-none',
  'size-differs',
  'too-many-facets',
  'too-many-vertices',
  'polygon-too-large',
  'vertex-missing',
  'archive-damaged',
  'too-large-expanded',
  'file-missing',
  'gave-up',
  'took-too-long',
] as const;
export const measuringError = z.object({
  code: z.enum(measuringErrorCodes),
  message: z.string(),
  at: z.object({ byte: z.number().int().nonnegative().optional(), line: z.number().int().positive().optional() }).nullable(),
});
export type MeasuringError = z.infer<typeof measuringError>;
