import type { Finding } from '@masswright/contracts';
import { countOf } from '../../../lib/plural';

const are = (n: number, one: string, many: string): string => (n === 1 ? one : many);

/** A finding as a sentence or two: what is so, and what it means for the figures. */
const findingSentences: Record<Finding['kind'], (number: number) => string> = {
  'boundary-edges': (n) => `${countOf(n, 'edge')} ${are(n, 'is', 'are')} open: there the surface ends.`,
  'hairline-gaps': (n) =>
    `${countOf(n, 'opening')} ${are(n, 'is a hairline', 'are hairlines')}, no wider than a hundred-thousandth of the part. The figures are those of the mesh with ${are(n, 'it', 'them')} closed; what volume may be lost there is part of the uncertainty. The stored file is as it was.`,
  'crowded-edges': (n) => `${countOf(n, 'edge')} ${are(n, 'has', 'have')} more than two facets, as where two bodies touch along a line. The integrals hold all the same.`,
  'unbalanced-edges': (n) => `Along ${countOf(n, 'edge')} neighbouring facets are wound against each other: inside and outside change places there.`,
  'turned-facets': (n) => `${countOf(n, 'facet')} ${are(n, 'is', 'are')} turned against ${are(n, 'its', 'their')} neighbours: ${are(n, 'its', 'their')} inside is the others' outside.`,
  'crowded-vertices': (n) => `At ${countOf(n, 'vertex', 'vertices')} pieces of the surface touch in a point only. The integrals hold all the same.`,
  'degenerate-facets': (n) => `${countOf(n, 'facet')} ${are(n, 'has', 'have')} no area. They add nothing to the figures.`,
  'duplicate-facets': (n) => `${countOf(n, 'facet')} ${are(n, 'has', 'have')} the three corners of another one.`,
  'turned-whole': () => 'All facets are wound inwards, so the volume of the file as stored is negative. It was read the other way round; mass and inertia are those of the turned mesh.',
  'turned-shells': (n) =>
    `${countOf(n, 'shell')} that ${are(n, 'lies', 'lie')} within no other ${are(n, 'is', 'are')} wound inwards, and would take away what ${are(n, 'it encloses', 'they enclose')}. ${are(n, 'It was', 'They were')} read the other way round; the figures are those of the turned mesh.`,
  'overlapping-shells': (n) =>
    `${countOf(n, 'shell')} ${are(n, 'passes', 'pass')} through another one, or ${are(n, 'lies', 'lie')} within a body and yet ${are(n, 'adds', 'add')} to it. Space would be counted twice, so the figures are not defensible.`,
  'self-intersections': (n) => `${countOf(n, 'pair')} of facets ${are(n, 'passes', 'pass')} through each other. Where the surface folds into itself, space is counted twice: mass and inertia may come out too large.`,
  'no-volume': () => 'The surface encloses a volume that can not be told from nothing.',
  'trailing-bytes': (n) => `${countOf(n, 'byte')} ${are(n, 'follows', 'follow')} the last facet. They were passed over.`,
  'several-solids': (n) => `The file holds ${countOf(n, 'solid')}. They are measured together as one part.`,
  'nonzero-attributes': (n) => `${countOf(n, 'facet')} ${are(n, 'carries', 'carry')} attribute bytes (colours, often). They mean nothing to the figures.`,
  'contradicting-normals': (n) => `${countOf(n, 'facet')} ${are(n, 'has', 'have')} a stored normal that points against the order of the corners. The corners decide.`,
  'non-planar-polygons': (n) =>
    `${countOf(n, 'polygon')} ${are(n, 'has', 'have')} corners that lie in no one plane. Each was cut into triangles from its first corner; what another cut would change is part of the uncertainty.`,
  'folded-polygons': (n) => `${countOf(n, 'polygon')} ${are(n, 'bends', 'bend')} inwards, so triangles from the first corner lie over one another there. The volume holds all the same; the area comes out too large.`,
};

export function describeFinding({ kind, count }: Pick<Finding, 'kind' | 'count'>): string {
  return findingSentences[kind](count);
}
