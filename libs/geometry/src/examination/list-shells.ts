import type { BodyIntegrals } from '../integrate-body';
import { listedShells, type Shell, type ShellKind, type Vector3 } from '../measurement';
import { findParent, type ShellReading } from './judge-shells';
import type { ShellFigures } from './shell-figures';
import { facetsOfShell, type ShellTable } from './shells';

/** All that is known of the shells of a mesh. */
export interface JudgedShells {
  shells: ShellTable;
  figures: ShellFigures;
  /** Of each shell those around it; undefined where there are too many to be told apart. */
  containers: readonly (readonly number[])[] | undefined;
  reading: ShellReading;
  overlapping: ReadonlySet<number>;
}

export function findKinds({ shells, figures, reading, overlapping }: JudgedShells): ShellKind[] {
  let solid: number | undefined;
  const kinds = Array.from({ length: shells.count }, (_, shell): ShellKind => {
    if (shells.open[shell] === 1) return 'open';
    if (overlapping.has(shell)) return 'overlapping';
    if ((reading.signs[shell] ?? 0) < 0) return 'cavity';
    if (reading.signs[shell] !== 0 && (solid === undefined || Math.abs(figures.volumes[shell] ?? 0) > Math.abs(figures.volumes[solid] ?? 0))) solid = shell;
    return 'detached';
  });
  if (solid !== undefined) kinds[solid] = 'solid';
  return kinds;
}

/**
 * The shells in the order of the file, with their own integrals; the largest of them where there are too many to be listed.
 *
 * @param fileFacets facets from here on were added to close the mesh
 * @param integrate over some facets, as they are read
 */
export function listShells(fileFacets: number, judged: JudgedShells, kinds: readonly ShellKind[], integrate: (facets: Uint32Array) => Pick<BodyIntegrals, 'volume' | 'surface'>): Shell[] {
  const { shells, figures, containers, reading } = judged;
  const listed = chooseListed(shells, figures);
  const placeOf = new Map(listed.map((shell, place) => [shell, place]));
  return listed.map((shell) => {
    const all = facetsOfShell(shells, shell);
    const facets = all.filter((facet) => facet < fileFacets);
    const kind = kinds[shell] ?? 'open';
    const own = integrate(facets);
    const body = facets.length === all.length || kind === 'open' ? own : integrate(all);
    const parent = findParent(figures, containers?.[shell] ?? []);
    const box = Array.from(figures.boxes.subarray(6 * shell, 6 * shell + 6), (bound) => bound + 0);
    return {
      kind,
      facets: facets.length,
      firstFacet: facets[0] ?? 0,
      inside: parent === undefined ? null : (placeOf.get(parent) ?? null),
      turned: reading.turned[shell] === 1,
      boundingBox: { min: box.slice(0, 3) as Vector3, max: box.slice(3) as Vector3 },
      area: own.surface.content,
      volume: kind === 'open' ? null : body.volume,
    };
  });
}

function chooseListed(shells: ShellTable, { volumes }: ShellFigures): number[] {
  const all = Array.from({ length: shells.count }, (_, shell) => shell);
  if (all.length <= listedShells) return all;
  const facetsOf = (shell: number): number => (shells.starts[shell + 1] ?? 0) - (shells.starts[shell] ?? 0);
  const largest = all.sort((one, two) => Math.abs(volumes[two] ?? 0) - Math.abs(volumes[one] ?? 0) || facetsOf(two) - facetsOf(one) || one - two);
  return largest.slice(0, listedShells).sort((one, two) => one - two);
}
