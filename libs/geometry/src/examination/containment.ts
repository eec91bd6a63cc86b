import type { WeldedMesh } from '../weld-corners';
import { isBoxWithin } from './close-shells';
import type { FacetTree } from './facet-tree';
import { locatePoint, type Probe } from './locate-point';
import type { ShellFigures } from './shell-figures';
import { facetsOfShell, type ShellTable } from './shells';

/** Points of a shell that are tried where others lie on the surface of the shell that is asked about. */
const mostProbes = 2000;

/** Facets that all rays may meet before the mesh is given up as too entangled: some seconds' work. Points inside of facets are asked by exact sums of many terms. */
export const usualFacetsMet = 20_000_000;
const costOfInside = 10;

/**
 * For each shell the closed shells that it lies within, ascending. One point of the shell is asked for all others at once; where it lies on the surface of one of
 * them, further points are, vertices first. Shells that coincide are taken as one within the other: a body within the wall that it fills, else the later one.
 *
 * @returns undefined where too many shells lie in or upon each other to be told apart in some seconds
 */
export function findContainers(mesh: WeldedMesh, tree: FacetTree, shells: ShellTable, figures: ShellFigures, asked: Iterable<number>, mostFacetsMet = usualFacetsMet): number[][] | undefined {
  const containers: number[][] = Array.from({ length: shells.count }, () => []);
  const mayContain = (outer: number, inner: number): boolean => outer !== inner && shells.open[outer] === 0 && figures.signs[outer] !== 0 && isBoxWithin(figures.boxes, inner, outer);
  let met = 0;
  for (const shell of asked) {
    const found = new Set<number>();
    let undecided: Set<number> | undefined;
    for (const probe of probesOf(mesh, facetsOfShell(shells, shell))) {
      const { windings, touched, facetsMet } = locatePoint(mesh, tree, shells, probe);
      met += 'vertex' in probe ? facetsMet : costOfInside * facetsMet;
      if (met > mostFacetsMet) return undefined;
      const before = undecided;
      for (const outer of windings.keys()) if (!touched.has(outer) && mayContain(outer, shell) && before?.has(outer) !== false) found.add(outer);
      undecided = new Set([...touched].filter((outer) => mayContain(outer, shell) && before?.has(outer) !== false));
      if (undecided.size === 0) break;
    }
    for (const outer of undecided ?? []) if (coincidesWithin(figures, shell, outer)) found.add(outer);
    containers[shell] = [...found].sort((one, two) => one - two);
  }
  return containers;
}

function coincidesWithin({ signs, boxes }: ShellFigures, inner: number, outer: number): boolean {
  if (!isBoxWithin(boxes, outer, inner)) return false;
  return signs[inner] === signs[outer] ? inner > outer : (signs[inner] ?? 0) > 0;
}

/** Corners of facets all over the shell, then points inside facets. */
function* probesOf({ corners }: WeldedMesh, facets: Uint32Array): Generator<Probe> {
  const steps = Math.min(mostProbes, facets.length);
  const facetAt = (k: number): number => 3 * (facets[Math.floor((k * facets.length) / steps)] ?? 0);
  for (let k = 0; k < steps; k++) yield { vertex: corners[facetAt(k) + (k % 3)] ?? 0 };
  for (let k = 0; k < steps; k++) yield { inside: [corners[facetAt(k)] ?? 0, corners[facetAt(k) + 1] ?? 0, corners[facetAt(k) + 2] ?? 0] };
}
