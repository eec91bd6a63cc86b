import { findingKinds, type FindingKind, type LineSegment } from '../measurement';
import type { WeldedMesh } from '../weld-corners';

/** How often something occurs, and some of the facets concerned: what is noticed while a file is read. */
export interface Occurrence {
  count: number;
  facets: number[];
}

export const noOccurrence = (): Occurrence => ({ count: 0, facets: [] });

/** Where something is: facets ascending, and lines. */
export interface Places {
  facets: number[];
  lines: LineSegment[];
}

/** The most facets, and the most lines, that are kept of one kind for a viewer. */
export const keptPlaces = 100_000;

/** What is found in a mesh, and where, while it is examined. */
export interface Notes {
  readonly mesh: WeldedMesh;
  count(kind: FindingKind): number;
  add(kind: FindingKind, count?: number): void;
  mark(kind: FindingKind, facet: number): void;
  isMarked(kind: FindingKind, facet: number): boolean;
  addLine(kind: FindingKind, line: LineSegment): void;
  /** A line between two vertices. */
  addEdge(kind: FindingKind, from: number, to: number): void;
  /** Takes over what was noticed elsewhere. */
  addOccurrence(kind: FindingKind, occurrence: Occurrence): void;
  /** The first of the facets and lines, as many of each as are wanted. */
  findPlaces(kind: FindingKind, most?: number): Places;
}

export function createNotes(mesh: WeldedMesh): Notes {
  const counts = new Map<FindingKind, number>();
  const lines = new Map<FindingKind, LineSegment[]>();
  const listed = new Map<FindingKind, number[]>();
  // A bit a kind for each facet, made when the first facet is marked.
  let marks: Uint32Array | undefined;
  const bitOf = (kind: FindingKind): number => 1 << findingKinds.indexOf(kind);

  function addLine(kind: FindingKind, line: LineSegment): void {
    const kept = lines.get(kind) ?? [];
    if (kept.length === 0) lines.set(kind, kept);
    if (kept.length < keptPlaces) kept.push(line);
  }

  function listFacets(kind: FindingKind, most: number): number[] {
    const known = listed.get(kind);
    if (known !== undefined) return known.slice(0, most);
    const facets: number[] = [];
    if (marks === undefined) return facets;
    const bit = bitOf(kind);
    for (let facet = 0; facet < mesh.facetCount && facets.length < most; facet++) if (((marks[facet] ?? 0) & bit) !== 0) facets.push(facet);
    return facets;
  }

  return {
    mesh,
    count: (kind) => counts.get(kind) ?? 0,
    add: (kind, count = 1) => void counts.set(kind, (counts.get(kind) ?? 0) + count),
    mark(kind, facet) {
      // Facets that were added to close a gap are none of the file's.
      if (facet >= mesh.facetCount) return;
      marks ??= new Uint32Array(mesh.facetCount);
      marks[facet] = (marks[facet] ?? 0) | bitOf(kind);
    },
    isMarked: (kind, facet) => ((marks?.[facet] ?? 0) & bitOf(kind)) !== 0,
    addLine,
    addEdge: (kind, from, to) => addLine(kind, [...pointOf(mesh, from), ...pointOf(mesh, to)]),
    addOccurrence(kind, occurrence) {
      counts.set(kind, occurrence.count);
      listed.set(kind, occurrence.facets);
    },
    findPlaces(kind, most = keptPlaces) {
      const facets = listFacets(kind, most);
      const known = lines.get(kind)?.slice(0, most);
      return { facets, lines: known ?? outline(mesh, facets, most) };
    },
  };
}

export function pointOf({ coordinates }: WeldedMesh, vertex: number): [number, number, number] {
  return [coordinates[3 * vertex] ?? 0, coordinates[3 * vertex + 1] ?? 0, coordinates[3 * vertex + 2] ?? 0];
}

/** The sides of facets, where a finding has no lines of its own. */
function outline(mesh: WeldedMesh, facets: readonly number[], most: number): LineSegment[] {
  const lines: LineSegment[] = [];
  for (const facet of facets) {
    for (let k = 0; k < 3 && lines.length < most; k++) {
      lines.push([...pointOf(mesh, mesh.corners[3 * facet + k] ?? 0), ...pointOf(mesh, mesh.corners[3 * facet + ((k + 1) % 3)] ?? 0)]);
    }
  }
  return lines;
}
