import { findingFacets, findingKinds, type Soundness } from '../measurement';
import type { Notes } from './notes';

/** What is said of the mesh as a whole, beside what the notes count. */
export type Verdict = Pick<Soundness, 'closed' | 'oriented' | 'outward' | 'turned' | 'shells' | 'cavities' | 'selfIntersections' | 'defensible'>;

/** The record of what was found: counts, and the findings in their order with the first of their places. */
export function judgeSoundness(notes: Notes, verdict: Verdict): Soundness {
  return {
    closed: verdict.closed,
    oriented: verdict.oriented,
    outward: verdict.outward,
    turned: verdict.turned,
    boundaryEdges: notes.count('boundary-edges'),
    nonManifoldEdges: notes.count('crowded-edges'),
    nonManifoldVertices: notes.count('crowded-vertices'),
    degenerateFacets: notes.count('degenerate-facets'),
    duplicateFacets: notes.count('duplicate-facets'),
    shells: verdict.shells,
    cavities: verdict.cavities,
    selfIntersections: verdict.selfIntersections,
    defensible: verdict.defensible,
    findings: findingKinds.flatMap((kind) => (notes.count(kind) === 0 ? [] : [{ kind, count: notes.count(kind), ...notes.findPlaces(kind, findingFacets) }])),
  };
}
