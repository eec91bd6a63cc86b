import type { Measurement, Shell } from '@masswright/contracts';
import { countOf } from '../../../lib/plural';

export const shellKinds: Record<Shell['kind'], string> = {
  solid: 'solid',
  detached: 'detached body',
  cavity: 'cavity',
  overlapping: 'overlapping',
  open: 'open',
};

/** How many pieces the mesh is of, in a sentence. */
export function describeShells({ soundness, shells: listed, examined }: Pick<Measurement, 'soundness' | 'shells' | 'examined'>): string {
  const { shells, cavities } = soundness;
  if (shells === null) return examined === 'integrals' ? 'Not examined yet.' : 'Not examined.';
  if (shells === 1) return 'One: all facets hang together by edges.';
  const hollow = cavities !== null && cavities > 0 ? `, ${cavities === shells ? 'all' : countOf(cavities, 'of them', 'of them')} the ${cavities === 1 ? 'wall of a cavity' : 'walls of cavities'}` : '';
  const left = listed !== null && listed.length < shells ? ` The ${countOf(listed.length, 'largest', 'largest')} are listed.` : '';
  return `${countOf(shells, 'piece')} that hang together by edges${hollow}.${left}`;
}

/** How the list is to be read. */
export function describeShellRules(shells: readonly Shell[]): string {
  const hasCavity = shells.some(({ kind }) => kind === 'cavity');
  const cavity = hasCavity ? ' The volume of a cavity is taken away; it goes with the shell around it, and filled it counts as if it were not there.' : '';
  return `“Inside” names the smallest shell around one.${cavity}`;
}
