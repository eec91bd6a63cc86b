import { z } from 'zod';
import { symmetric3, vector3 } from './common';

export const meshFormat = z.enum(['stl-binary', 'stl-ascii', 'obj']);
export type MeshFormat = z.infer<typeof meshFormat>;

/** How the stored file wraps the mesh. */
export const meshCompression = z.enum(['gzip']);
export type MeshCompression = z.infer<typeof meshCompression>;

/** Something noticed in a mesh: a fact that a reader of the figures should know, with how often it occurs. */
export const finding = z.object({
  kind: z.enum([
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
  ]),
  count: z.number().int().nonnegative(),
  /** Indices (from 0, in the order of the file) of some of the facets concerned, at most 20. */
  facets: z.array(z.number().int().nonnegative()).max(20),
});
export type Finding = z.infer<typeof finding>;

/**
 * The verdict on a whole mesh.
 * closed: every undirected edge has an even number of facets.
 * oriented: as many facets run along every edge one way as the other. An edge with an odd number cannot balance, so a mesh that is not closed
 * is not oriented either; whether its other edges balance is told by the finding `unbalanced-edges`.
 * outward: the signed volume of the file as stored is positive (of a mesh that is not closed: its volume about the middle of the box).
 * turned: closed, oriented and of negative volume, so every facet was read the other way round.
 */
export const soundness = z.object({
  closed: z.boolean(),
  oriented: z.boolean(),
  outward: z.boolean(),
  turned: z.boolean(),
  /** Undirected edges with an odd number of facets. */
  boundaryEdges: z.number().int().nonnegative(),
  /** Undirected edges with more than two facets. */
  nonManifoldEdges: z.number().int().nonnegative(),
  /** Facets with two equal corners or with three on a line: no area. */
  degenerateFacets: z.number().int().nonnegative(),
  /** Facets whose three corners another facet has too, counted beyond the first. */
  duplicateFacets: z.number().int().nonnegative(),
  /** The figures can be stood behind: closed, oriented and a volume other than zero. */
  defensible: z.boolean(),
  findings: z.array(finding),
});
export type Soundness = z.infer<typeof soundness>;

/**
 * Integrals over a body or its surface at unit density, in the mesh's own unit.
 * `content` is ∫1 (volume: unit³, area: unit²); `centreFromOrigin` is the centroid less the measurement's `origin` (unit);
 * `second` holds ∫x²…, ∫xy… about the centroid, axes of the mesh frame, all with a plus sign (unit⁵ over a body, unit⁴ over a surface).
 */
export const integrals = z.object({
  content: z.number(),
  centreFromOrigin: vector3,
  second: symmetric3,
});
export type Integrals = z.infer<typeof integrals>;

/**
 * What was found in a mesh file, in its own unit at unit density. Immutable, and the same bits for the same bytes and measuring version.
 * Lengths far from the mesh frame's origin would lose digits as one number, so positions are given as `origin` + an offset:
 * `origin` is a vertex of the mesh, exactly.
 */
export const measurement = z.object({
  measuringVersion: z.string(),
  format: meshFormat,
  compression: meshCompression.nullable(),
  facets: z.number().int().positive(),
  origin: vector3,
  boundingBox: z.object({ min: vector3, max: vector3 }),
  /** Null where the mesh has no inside that could be integrated: it is not defensible. */
  volume: integrals.nullable(),
  surface: integrals,
  soundness,
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
