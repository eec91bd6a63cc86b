import type { Measurement, Soundness } from '@masswright/contracts';
import type { Tone } from '../../../components/status-tag';
import { countOf } from '../../../lib/plural';

type Verdict = Pick<Soundness, 'closed' | 'oriented' | 'turned' | 'defensible'>;

/** One or two words for a row, and the colour and shape that go with them. */
export function describeVerdict(soundness: Verdict): { tone: Tone; word: string; words: string } {
  if (!soundness.closed) return { tone: 'wrong', word: 'Open', words: 'Open: not defensible' };
  if (!soundness.oriented) return { tone: 'wrong', word: 'Mixed winding', words: 'Closed, but wound both ways: not defensible' };
  if (!soundness.defensible) return { tone: 'wrong', word: 'No volume', words: 'Closed, but without volume: not defensible' };
  if (soundness.turned) return { tone: 'doubt', word: 'Closed, turned', words: 'Closed and oriented; it was inside out and was turned' };
  return { tone: 'agreement', word: 'Closed', words: 'Closed, oriented, outward' };
}

/** What the edges say, in a sentence. */
export function describeEdges({ closed, boundaryEdges, nonManifoldEdges }: Soundness): string {
  if (closed && nonManifoldEdges === 0) return 'Every edge is shared by two facets.';
  const sentences = [];
  if (boundaryEdges > 0) sentences.push(`${countOf(boundaryEdges, 'edge')} ${boundaryEdges === 1 ? 'has' : 'have'} a facet on one side only.`);
  if (nonManifoldEdges > 0) sentences.push(`${countOf(nonManifoldEdges, 'edge')} ${nonManifoldEdges === 1 ? 'is' : 'are'} shared by more than two facets.`);
  return sentences.join(' ');
}

type FindingKind = Measurement['soundness']['findings'][number]['kind'];

/** A finding as a sentence: what is so, and what it means for the figures. */
const findingSentences: Record<FindingKind, (number: number) => string> = {
  'boundary-edges': (n) => `${countOf(n, 'edge')} ${n === 1 ? 'is' : 'are'} open: there the surface ends, so there is no inside.`,
  'crowded-edges': (n) => `${countOf(n, 'edge')} ${n === 1 ? 'has' : 'have'} more than two facets, as where two bodies touch along a line. The integrals hold all the same.`,
  'unbalanced-edges': (n) => `Along ${countOf(n, 'edge')} neighbouring facets are wound against each other: inside and outside change places there.`,
  'degenerate-facets': (n) => `${countOf(n, 'facet')} ${n === 1 ? 'has' : 'have'} no area. They add nothing to the figures.`,
  'duplicate-facets': (n) => `${countOf(n, 'facet')} ${n === 1 ? 'lies' : 'lie'} exactly on another one.`,
  'turned-whole': () => 'All facets are wound inwards, so the volume of the file as stored is negative. It was read the other way round; mass and inertia are those of the turned mesh.',
  'no-volume': () => 'The surface encloses a volume that can not be told from nothing.',
  'trailing-bytes': (n) => `${countOf(n, 'byte')} ${n === 1 ? 'follows' : 'follow'} the last facet. They were passed over.`,
  'several-solids': (n) => `The file holds ${countOf(n, 'solid')}. They are measured together as one part.`,
  'nonzero-attributes': (n) => `${countOf(n, 'facet')} ${n === 1 ? 'carries' : 'carry'} attribute bytes (colours, often). They mean nothing to the figures.`,
  'contradicting-normals': (n) => `${countOf(n, 'facet')} ${n === 1 ? 'has' : 'have'} a stored normal that points against the order of the corners. The corners decide.`,
  'non-planar-polygons': (n) => `${countOf(n, 'polygon')} ${n === 1 ? 'has' : 'have'} corners that lie in no one plane. Each was cut into triangles from its first corner; another cut would give slightly other figures.`,
  'folded-polygons': (n) => `${countOf(n, 'polygon')} ${n === 1 ? 'bends' : 'bend'} inwards, so triangles from the first corner lie over one another there. The volume holds all the same; the area comes out too large.`,
};

export function describeFinding({ kind, count: number }: Measurement['soundness']['findings'][number]): string {
  return findingSentences[kind](number);
}

/** Why a mesh gives no figures and what can be done about it; undefined where it gives them. */
export function findRefusal(soundness: Soundness): { why: string; remedy: string } | undefined {
  if (soundness.defensible) return undefined;
  if (!soundness.closed) {
    return {
      why: `The mesh is open at ${countOf(soundness.boundaryEdges, 'edge')}. A surface with a gap encloses nothing, so it has no volume, no mass and no inertia that could be defended; a number could still be computed, and it would change with the place of the origin.`,
      remedy: 'Close the gap where the body is modelled, or export it again as one solid with a finer or watertight setting, and add the file anew.',
    };
  }
  if (!soundness.oriented) {
    return {
      why: 'The mesh is closed, but some of its facets are wound against their neighbours. What is inside for one is outside for the other, so parts of the volume would be taken away that should be added.',
      remedy: 'Have the modelling program make the normals consistent, export again, and add the file anew.',
    };
  }
  return {
    why: 'The surface is closed, but what it encloses can not be told from nothing: a sheet folded onto itself, for instance.',
    remedy: 'Give the body a thickness where it is modelled, export again, and add the file anew.',
  };
}
