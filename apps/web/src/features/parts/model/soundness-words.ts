import type { Measurement, PartRow, Soundness } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import type { Tone } from '../../../components/status-tag';
import { countOf } from '../../../lib/plural';

export type Verdict = NonNullable<PartRow['soundness']>;

/** What a row says of a measurement, for a page that has all of it. */
export function pickVerdict({ soundness, examined }: Pick<Measurement, 'soundness' | 'examined'>): Verdict {
  const { defensible, closed, oriented, turned, selfIntersections, findings } = soundness;
  return { defensible, closed, oriented, turned, selfIntersections, overlapping: findings.some(({ kind }) => kind === 'overlapping-shells'), examined };
}

export interface VerdictWords {
  tone: Tone;
  /** One or two words, for a row. */
  word: string;
  words: string;
}

/** What is said of a mesh as a whole, and the colour and shape that go with it. */
export function describeVerdict(verdict: Verdict): VerdictWords {
  const said = verdict.defensible ? describeDefensible(verdict) : describeNotDefensible(verdict);
  const more = { integrals: '; the rest is being examined', limited: '; the rest was not examined', whole: '' }[verdict.examined];
  return { ...said, words: `${said.words}${more}` };
}

function describeNotDefensible({ closed, oriented, overlapping, examined }: Verdict): VerdictWords {
  // The sum over the edges tells that something is wrong with them, and not yet what.
  if (closed === null) {
    return { tone: examined === 'integrals' ? 'doubt' : 'wrong', word: 'Edges unpaired', words: 'Open, or wound both ways: not defensible' };
  }
  if (!closed) return { tone: 'wrong', word: 'Open', words: 'Open: not defensible' };
  if (!oriented) return { tone: 'wrong', word: 'Mixed winding', words: 'Closed, but wound both ways: not defensible' };
  if (overlapping) return { tone: 'wrong', word: 'Overlapping', words: 'Closed, but shells overlap: not defensible' };
  return { tone: 'wrong', word: 'No volume', words: 'Closed, but without volume: not defensible' };
}

function describeDefensible({ closed, turned, selfIntersections }: Verdict): VerdictWords {
  if (closed === false) return { tone: 'doubt', word: 'Hairline gaps', words: 'Open by hairlines only: defensible with a stated gap' };
  if (selfIntersections !== null && selfIntersections > 0) return { tone: 'doubt', word: 'Crosses itself', words: 'Closed and oriented, but the surface passes through itself' };
  if (turned) return { tone: 'doubt', word: 'Closed, turned', words: 'Closed and oriented; what was inside out was turned' };
  return { tone: 'agreement', word: 'Closed', words: 'Closed, oriented, outward' };
}

/** What the edges say, in a sentence. */
export function describeEdges({ closed, boundaryEdges, nonManifoldEdges }: Soundness): string {
  if (closed === null) return 'They do not cancel: the surface is open, or wound both ways somewhere. Which, and where, is not examined.';
  if (nonManifoldEdges === null) return closed ? 'They cancel: the mesh is closed and wound one way. Edges of more than two facets are not counted.' : 'The mesh is open.';
  if (closed && nonManifoldEdges === 0) return 'Every edge is shared by two facets.';
  const sentences = [];
  if (boundaryEdges !== null && boundaryEdges > 0) sentences.push(`${countOf(boundaryEdges, 'edge')} ${boundaryEdges === 1 ? 'has' : 'have'} a facet on one side only.`);
  if (nonManifoldEdges > 0) sentences.push(`${countOf(nonManifoldEdges, 'edge')} ${nonManifoldEdges === 1 ? 'is' : 'are'} shared by more than two facets.`);
  return sentences.join(' ');
}

export function describeWinding({ closed, oriented, turned, findings }: Soundness): string {
  if (closed === null) return 'Not judged: the edges do not cancel.';
  const against = findings.some(({ kind }) => kind === 'turned-facets' || kind === 'unbalanced-edges');
  if (!closed) return against ? 'Facets are wound both ways, beside the openings.' : 'All one way, as far as the surface goes.';
  if (!oriented) return 'Facets are wound both ways.';
  if (!turned) return 'All one way, outwards.';
  return findings.some(({ kind }) => kind === 'turned-shells') ? 'One way within each shell; some shells were inside out and were read the other way round.' : 'All one way, inwards: read the other way round.';
}

export function describeVertices({ nonManifoldVertices }: Soundness, examined: Measurement['examined']): string {
  if (nonManifoldVertices === null) return examined === 'integrals' ? 'Not examined yet.' : 'Not examined.';
  if (nonManifoldVertices === 0) return 'The facets at every vertex form one fan.';
  return `At ${countOf(nonManifoldVertices, 'vertex', 'vertices')} more than one fan of facets meets.`;
}

/** Larger meshes are not searched for facets that pass through each other. */
const examinedFacets = 200_000;

export function describeIntersections({ selfIntersections }: Soundness, { facets, examined }: Pick<Measurement, 'facets' | 'examined'>): string {
  if (selfIntersections === null) {
    if (examined === 'integrals') return 'Not examined yet.';
    if (facets <= examinedFacets) return 'Not examined: too many of the facets lie close together.';
    return `Not examined: meshes of up to ${formatCount(examinedFacets)} facets are searched for them, and this one has ${formatCount(facets)}.`;
  }
  return selfIntersections === 0 ? 'None: no facet passes through another.' : `${countOf(selfIntersections, 'pair')} of facets pass through each other.`;
}
