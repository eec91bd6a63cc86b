import { findDiagonal, type BoundingBox } from '../bounding-box';
import { integrateBody, turnIntegrals, type BodyIntegrals } from '../integrate-body';
import type { FindingKind, Integrals, Openings, Shell, Soundness, Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { examineShells, type ShellExamination } from './examine-shells';
import { examineSurface } from './examine-surface';
import { findKinds, listShells } from './list-shells';
import { createNotes, type Notes, type Occurrence, type Places } from './notes';
import type { ClosedMesh } from './openings';
import { judgeSoundness } from './verdict';

export interface ExaminationContext {
  /** A point in the box of the mesh, from which centroids are told. */
  origin: Vector3;
  boundingBox: BoundingBox;
  /** What was noticed while the file was read. */
  remarks: Partial<Record<FindingKind, Occurrence>>;
  /** Integrals over all facets as they are stored. */
  body: BodyIntegrals;
  /** Meshes of more facets are not searched for self-intersections. */
  maximumIntersectionFacets?: number;
  /** Shells whose places take more than so many facets on the way of rays are not told apart: which lies in which stays unknown, and no cavities are counted. */
  maximumFacetsMet?: number;
}

export interface Examination {
  soundness: Soundness;
  shells: Shell[];
  /** Null where the mesh is closed. */
  openings: Openings | null;
  /** Null where the mesh is not defensible. */
  volume: Integrals | null;
  /** For each facet 1 where it is read the other way round; null where none is. */
  turned: Uint8Array | null;
  /** Facets that close hairline gaps, as they are read: nine coordinates each. */
  addedFacets: Float64Array | null;
  /** Where a finding is: up to 100 000 facets, and as many lines. */
  places(kind: FindingKind): Places;
}

/** What is examined to the end in a few seconds. */
export const usualIntersectionFacets = 200_000;

/**
 * Examines a whole mesh: its edges, vertices, winding, openings, shells and self-intersections, and what they do to its figures. Nothing is repaired; what is read
 * otherwise than it is stored (facets turned, hairlines closed) is told by the findings.
 */
export function examineMesh(mesh: WeldedMesh, context: ExaminationContext): Examination {
  const { origin, boundingBox, remarks, maximumIntersectionFacets = usualIntersectionFacets, maximumFacetsMet } = context;
  const diagonal = findDiagonal(boundingBox);
  const notes = createNotes(mesh);
  for (const [kind, occurrence] of Object.entries(remarks) as [FindingKind, Occurrence][]) notes.addOccurrence(kind, occurrence);
  const surface = examineSurface(notes, { origin, boundingBox, body: context.body });
  const { closed, oriented, open, shells } = surface;
  const mended = open?.closed;
  const work = mended?.mesh ?? mesh;
  const body = mended?.body ?? context.body;
  const encloses = oriented || mended !== undefined;
  const found = examineShells(notes, work, shells, { ...surface, fileFacets: mesh.facetCount, diagonal, isWholeNegative: encloses && body.volumeSign < 0, maximumIntersectionFacets, maximumFacetsMet });
  const read = readBody(notes, mesh, mended, body, found, origin, diagonal);
  if (encloses && read.volumeSign === 0) notes.add('no-volume');

  const kinds = findKinds(found.judged);
  const soundness = judgeSoundness(notes, {
    closed,
    oriented,
    outward: surface.outward,
    turned: found.turned !== undefined,
    shells: shells.count,
    cavities: found.judged.containers === undefined ? null : kinds.filter((kind) => kind === 'cavity').length,
    selfIntersections: found.selfIntersections,
    defensible: encloses && read.volumeSign !== 0 && notes.count('overlapping-shells') === 0,
  });
  const integrateShell = (facets: Uint32Array): Pick<BodyIntegrals, 'volume' | 'surface'> =>
    // A body of one shell was integrated already.
    closed && facets.length === mesh.facetCount ? { volume: read.volume, surface: body.surface } : integrateBody(work, origin, diagonal, { facets, turned: found.turned });
  return {
    soundness,
    shells: listShells(mesh.facetCount, found.judged, kinds, integrateShell),
    openings: open?.openings ?? null,
    volume: soundness.defensible ? read.volume : null,
    turned: found.turned?.slice(0, mesh.facetCount) ?? null,
    addedFacets: read.added ?? null,
    places: (kind) => notes.findPlaces(kind),
  };
}

interface ReadBody {
  volume: Integrals;
  volumeSign: -1 | 0 | 1;
  added: Float64Array | undefined;
}

/** The integrals of the body as its facets are read. */
function readBody(notes: Notes, mesh: WeldedMesh, mended: ClosedMesh | undefined, body: BodyIntegrals, { turned }: ShellExamination, origin: Vector3, diagonal: number): ReadBody {
  if (turned === undefined) return { volume: body.volume, volumeSign: body.volumeSign, added: mended?.added };
  const added = mended && turnAdded(mended.added, turned.subarray(mesh.facetCount));
  if (notes.count('turned-whole') > 0) return { volume: turnIntegrals(body.volume), volumeSign: (0 - body.volumeSign) as -1 | 0 | 1, added };
  const { volume, volumeSign } = integrateBody(mesh, origin, diagonal, { turned: turned.subarray(0, mesh.facetCount), added });
  return { volume, volumeSign, added };
}

function turnAdded(added: Float64Array, turned: Uint8Array): Float64Array {
  const read = added.slice();
  for (let facet = 0; facet < turned.length; facet++) {
    if (turned[facet] !== 1) continue;
    read.set(added.subarray(9 * facet + 6, 9 * facet + 9), 9 * facet + 3);
    read.set(added.subarray(9 * facet + 3, 9 * facet + 6), 9 * facet + 6);
  }
  return read;
}
