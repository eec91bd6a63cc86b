import { checkDuplicates } from './duplicate-facets';
import { checkEdges } from './edge-table';
import { findingKinds, type Finding, type FindingKind, type Soundness } from './measurement';
import type { WeldedMesh } from './weld-corners';

/** How often something occurs, and some of the facets concerned. */
export interface Occurrence {
  count: number;
  facets: number[];
}

export const noOccurrence = (): Occurrence => ({ count: 0, facets: [] });

/** What the edges and corners of a mesh say; the volume has its own say in `judgeSoundness`. */
export interface Connections {
  closed: boolean;
  oriented: boolean;
  occurrences: Partial<Record<FindingKind, Occurrence>>;
}

export function checkConnections(mesh: WeldedMesh): Connections {
  const edges = checkEdges(mesh);
  const closed = edges['boundary-edges'].count === 0;
  return {
    closed,
    oriented: closed && edges['unbalanced-edges'].count === 0,
    occurrences: { ...edges, 'duplicate-facets': checkDuplicates(mesh) },
  };
}

/**
 * The verdict.
 *
 * @param volumeSign of the file as stored; 0 where the volume cannot be told from zero
 * @param others what was noticed beside the connections
 */
export function judgeSoundness(connections: Connections, volumeSign: -1 | 0 | 1, others: Partial<Record<FindingKind, Occurrence>>): Soundness {
  const { closed, oriented } = connections;
  const integrable = closed && oriented;
  const turned = integrable && volumeSign < 0;
  const once = (holds: boolean): Occurrence => ({ count: holds ? 1 : 0, facets: [] });
  const occurrences: Partial<Record<FindingKind, Occurrence>> = {
    ...connections.occurrences,
    ...others,
    'turned-whole': once(turned),
    'no-volume': once(integrable && volumeSign === 0),
  };
  const count = (kind: FindingKind): number => occurrences[kind]?.count ?? 0;
  return {
    closed,
    oriented,
    outward: volumeSign > 0,
    turned,
    boundaryEdges: count('boundary-edges'),
    nonManifoldEdges: count('crowded-edges'),
    nonManifoldVertices: null,
    shells: null,
    cavities: null,
    selfIntersections: null,
    degenerateFacets: count('degenerate-facets'),
    duplicateFacets: count('duplicate-facets'),
    defensible: integrable && volumeSign !== 0,
    findings: findingKinds.flatMap((kind): Finding[] => {
      const occurrence = occurrences[kind];
      return occurrence === undefined || occurrence.count === 0 ? [] : [{ kind, lines: [], ...occurrence }];
    }),
  };
}
