import type { FacetDoubt, IntegralChange } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { bulgeEdges } from './bulge-edges';
import { mergeFlats } from './merge-flats';
import { pairEdges } from './pair-edges';
import { readFacets, type FacetDoubtOptions } from './read-facets';
import { sumBulges } from './sum-bulges';
import { walkFans } from './walk-fans';
import { weighNormals, type Weighting } from './weigh-normals';

/** By angle, and a flat that is much larger than its neighbours has the normal to itself. */
const usual: Weighting = { alike: 'angle', unlike: 'fourth', from: 3, to: 6 };
/** Areas throughout; Max's weights for smooth meshes of uneven facets; a large flat taken for a plane earlier than the usual way does. */
const others: readonly Weighting[] = [
  { ...usual, alike: 'square', unlike: 'square' },
  { ...usual, alike: 'product' },
  { ...usual, from: 1.5, to: 3 },
];
/** The prediction holds to within this share of itself, whatever the weights: curves are no arcs, and patches no quadratics. It is the last of the spread. */
export const modelShare = 0.15;

/**
 * Predicts what the smooth body behind a closed, oriented mesh has more or less than the mesh, from the turns between its facets alone. It rests on three
 * assumptions: the vertices lie on the smooth surface; two facets that turn by less than 35° stand for a curve, and by more for a corner of the body;
 * a facet that is much larger than its neighbours is a plane and not a chord. A mesh of planes alone gets exactly 0. Where the facets of a curve were cut
 * again without moving the new vertices out to it, too little is predicted: a quarter where every chord was halved.
 *
 * Every vertex gets a normal in each of its smooth fans; from the normals at its ends follows how far the surface stands off each edge (`bulgeEdges`), and so
 * off each facet; and from that the change of each integral (`sumBulges`). The spread is the difference to what other weights of the
 * normals predict, and last the share of the prediction that the model leaves open; each is half the width of an interval.
 *
 * Time grows with the number of facets alone; some 200 bytes a facet are held. What comes out does not depend on where the mesh stands but for rounding.
 */
export function estimateFacetDoubt(mesh: WeldedMesh, options: FacetDoubtOptions): FacetDoubt {
  const facets = readFacets(mesh, options);
  const partners = pairEdges(facets);
  const flats = mergeFlats(facets, partners);
  const fans = walkFans(partners, flats.kinds);
  const predictions = weighNormals(facets, flats, fans, [usual, ...others]).map((normals) => sumBulges(facets, flats, partners, bulgeEdges(facets, flats.kinds, fans, normals)));
  const [prediction, ...rest] = predictions;
  if (prediction === undefined) throw new RangeError('There is no way of weighing.');
  const { body, area } = prediction;
  const none = combine(body, body, () => 0);
  return {
    body: { correction: body, spread: [...rest.map((other) => combine(other.body, body, (one, two) => one - two)), combine(body, none, (one) => one * modelShare)] },
    area: { correction: area, spread: [...rest.map((other) => other.area - area), area * modelShare] },
  };
}

/** Adds 0, so that nothing is -0. */
function combine(one: IntegralChange, two: IntegralChange, by: (a: number, b: number) => number): IntegralChange {
  const at = (a: number, b: number): number => by(a, b) + 0;
  const second = (key: keyof IntegralChange['second']): number => at(one.second[key], two.second[key]);
  return {
    content: at(one.content, two.content),
    first: [at(one.first[0], two.first[0]), at(one.first[1], two.first[1]), at(one.first[2], two.first[2])],
    second: { xx: second('xx'), yy: second('yy'), zz: second('zz'), xy: second('xy'), yz: second('yz'), zx: second('zx') },
  };
}
