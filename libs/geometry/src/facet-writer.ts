import { batchFacets, createFacetBatch, flushFacets, type FacetSink } from './facet-batch';
import { tooManyFacets } from './format-reader';
import type { MeshFormat } from './measurement';
import type { MeshPlace } from './mesh-error';

/** Hands facets on in batches, and counts them. */
export interface FacetWriter {
  /** Adds the facet of three vertices, in that order; `vertices` has three coordinates each. */
  add(vertices: ArrayLike<number>, a: number, b: number, c: number): void;
  /** The same, faster, where the vertices are kept as binary64. */
  addTriangle(vertices: Float64Array, a: number, b: number, c: number): void;
  /** Throws a MeshError where so many more facets would be too many. */
  checkRoom(facets: number): void;
  /** Hands on the last batch. */
  finish(): void;
  readonly count: number;
}

/** A writer for formats that list vertices and let facets name them. Their facets have no normals of their own. `getPlace` says where the file is being read, for a refusal. */
export function createFacetWriter(format: MeshFormat, maximumFacets: number, sink: FacetSink, getPlace: () => MeshPlace): FacetWriter {
  const batch = createFacetBatch();
  const { corners } = batch;
  let count = 0;

  function countFacet(): void {
    batch.count += 1;
    count += 1;
    if (batch.count === batchFacets) flushFacets(batch, sink);
  }

  return {
    add(vertices, a, b, c) {
      const at = 9 * batch.count;
      for (let k = 0; k < 3; k++) {
        corners[at + k] = vertices[3 * a + k] ?? 0;
        corners[at + 3 + k] = vertices[3 * b + k] ?? 0;
        corners[at + 6 + k] = vertices[3 * c + k] ?? 0;
      }
      countFacet();
    },
    addTriangle(vertices, a, b, c) {
      const at = 9 * batch.count, one = 3 * a, two = 3 * b, three = 3 * c;
      corners[at] = vertices[one] ?? 0;
      corners[at + 1] = vertices[one + 1] ?? 0;
      corners[at + 2] = vertices[one + 2] ?? 0;
      corners[at + 3] = vertices[two] ?? 0;
      corners[at + 4] = vertices[two + 1] ?? 0;
      corners[at + 5] = vertices[two + 2] ?? 0;
      corners[at + 6] = vertices[three] ?? 0;
      corners[at + 7] = vertices[three + 1] ?? 0;
      corners[at + 8] = vertices[three + 2] ?? 0;
      countFacet();
    },
    checkRoom(facets) {
      if (count + facets > maximumFacets) throw tooManyFacets(maximumFacets, format, getPlace());
    },
    finish: () => flushFacets(batch, sink),
    get count() {
      return count;
    },
  };
}
