import { allocate } from '../grow-array';
import type { WeldedMesh } from '../weld-corners';

/**
 * A tree of boxes over facets: a complete binary tree, split at the middle facet along the longest extent of the centres, so that it is balanced whatever the
 * mesh. Node n has the children 2n + 1 and 2n + 2; leaf l holds order[leafStart(l), leafStart(l + 1)).
 */
export interface FacetTree {
  /** Facets in the order of the leaves. */
  order: Uint32Array;
  /** Nodes that have children. */
  inner: number;
  leaves: number;
  /** Six bounds a node: least x, y, z, then greatest. */
  boxes: Float64Array;
  /** Six bounds a facet, in the order of `order`. */
  facetBoxes: Float64Array;
}

const leafFacets = 4;

export function createFacetTree(mesh: WeldedMesh, facets: Uint32Array): FacetTree {
  let leaves = 1;
  while (leaves * leafFacets < facets.length) leaves *= 2;
  const order = facets.slice();
  const boxesByPlace = allocate(() => new Float64Array(6 * facets.length));
  const centres = allocate(() => new Float64Array(3 * facets.length));
  for (let k = 0; k < facets.length; k++) {
    writeBox(mesh, facets[k] ?? 0, boxesByPlace, 6 * k);
    for (let axis = 0; axis < 3; axis++) centres[3 * k + axis] = ((boxesByPlace[6 * k + axis] ?? 0) + (boxesByPlace[6 * k + 3 + axis] ?? 0)) / 2;
  }
  const places = allocate(() => new Uint32Array(facets.length));
  for (let k = 0; k < places.length; k++) places[k] = k;
  split(places, centres, 0, leaves);
  const facetBoxes = allocate(() => new Float64Array(6 * facets.length));
  for (let k = 0; k < places.length; k++) {
    const place = places[k] ?? 0;
    order[k] = facets[place] ?? 0;
    facetBoxes.set(boxesByPlace.subarray(6 * place, 6 * place + 6), 6 * k);
  }
  const tree: FacetTree = { order, inner: leaves - 1, leaves, boxes: allocate(() => new Float64Array(6 * (2 * leaves - 1))), facetBoxes };
  fillBoxes(tree);
  return tree;
}

/** Where the facets of a leaf begin: all leaves hold as many, or one more. */
export const leafStart = ({ order, leaves }: FacetTree, leaf: number): number => Math.floor((leaf * order.length) / leaves);

export function writeBox({ corners, coordinates }: WeldedMesh, facet: number, boxes: Float64Array, to: number): void {
  const a = 3 * (corners[3 * facet] ?? 0), b = 3 * (corners[3 * facet + 1] ?? 0), c = 3 * (corners[3 * facet + 2] ?? 0);
  for (let axis = 0; axis < 3; axis++) {
    const p = coordinates[a + axis] ?? 0, q = coordinates[b + axis] ?? 0, r = coordinates[c + axis] ?? 0;
    boxes[to + axis] = Math.min(p, q, r);
    boxes[to + 3 + axis] = Math.max(p, q, r);
  }
}

/** Orders places so that every leaf's facets lie together. The parts of a node are those of its leaves [first, first + count). */
function split(places: Uint32Array, centres: Float64Array, first: number, leaves: number): void {
  const stack: [first: number, count: number][] = [[first, leaves]];
  for (let part = stack.pop(); part !== undefined; part = stack.pop()) {
    const [from, count] = part;
    if (count === 1) continue;
    const bound = (leaf: number): number => Math.floor((leaf * places.length) / leaves);
    const begin = bound(from), middle = bound(from + count / 2), end = bound(from + count);
    if (end - begin > 1) selectMiddle(places, centres, longestAxis(places, centres, begin, end), begin, middle, end);
    stack.push([from, count / 2], [from + count / 2, count / 2]);
  }
}

function longestAxis(places: Uint32Array, centres: Float64Array, begin: number, end: number): number {
  let longest = 0;
  let extent = -1;
  for (let axis = 0; axis < 3; axis++) {
    let least = Infinity;
    let greatest = -Infinity;
    for (let k = begin; k < end; k++) {
      const centre = centres[3 * (places[k] ?? 0) + axis] ?? 0;
      if (centre < least) least = centre;
      if (centre > greatest) greatest = centre;
    }
    if (greatest - least > extent) {
      extent = greatest - least;
      longest = axis;
    }
  }
  return longest;
}

/** Hoare's selection: no place before the middle has a greater centre than any after it. The pivot is the median of three. */
function selectMiddle(places: Uint32Array, centres: Float64Array, axis: number, begin: number, middle: number, end: number): void {
  let left = begin;
  let right = end - 1;
  const centre = (k: number): number => centres[3 * (places[k] ?? 0) + axis] ?? 0;
  while (left < right) {
    const one = centre(left), two = centre((left + right) >>> 1), three = centre(right);
    const pivot = Math.max(Math.min(one, two), Math.min(Math.max(one, two), three));
    let i = left;
    let j = right;
    while (i <= j) {
      while (centre(i) < pivot) i++;
      while (centre(j) > pivot) j--;
      if (i > j) break;
      const place = places[i] ?? 0;
      places[i] = places[j] ?? 0;
      places[j] = place;
      i++;
      j--;
    }
    if (middle <= j) right = j;
    else if (middle >= i) left = i;
    else return;
  }
}

function fillBoxes(tree: FacetTree): void {
  const { boxes, facetBoxes, inner, leaves } = tree;
  for (let node = inner + leaves - 1; node >= 0; node--) {
    for (let k = 0; k < 6; k++) {
      let bound = k < 3 ? Infinity : -Infinity;
      const extend = (value: number): void => {
        if (k < 3 ? value < bound : value > bound) bound = value;
      };
      if (node >= inner) for (let at = leafStart(tree, node - inner); at < leafStart(tree, node - inner + 1); at++) extend(facetBoxes[6 * at + k] ?? 0);
      else for (const child of [2 * node + 1, 2 * node + 2]) extend(boxes[6 * child + k] ?? 0);
      boxes[6 * node + k] = bound;
    }
  }
}
