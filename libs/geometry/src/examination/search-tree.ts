import { leafStart, type FacetTree } from './facet-tree';

/**
 * Calls `visit` for every two facets whose boxes meet, each pair once, in an order that depends on the tree alone. Stops where `visit` says so.
 *
 * @returns false where it was stopped
 */
export function visitClosePairs(tree: FacetTree, visit: (one: number, two: number) => boolean): boolean {
  // Pairs of nodes; a node with itself stands for the pairs within it.
  const stack: number[] = [0, 0];
  while (stack.length > 0) {
    const b = stack.pop() ?? 0;
    const a = stack.pop() ?? 0;
    if (a !== b && !boxesMeet(tree.boxes, a, b)) continue;
    const aIsLeaf = a >= tree.inner, bIsLeaf = b >= tree.inner;
    if (aIsLeaf && bIsLeaf) {
      if (!visitLeaves(tree, a, b, visit)) return false;
    } else if (a === b) {
      stack.push(2 * a + 1, 2 * a + 1, 2 * a + 1, 2 * a + 2, 2 * a + 2, 2 * a + 2);
    } else if (bIsLeaf || (!aIsLeaf && a < b)) {
      // The node with the lesser number stands higher in the tree, or level.
      stack.push(2 * a + 1, b, 2 * a + 2, b);
    } else {
      stack.push(a, 2 * b + 1, a, 2 * b + 2);
    }
  }
  return true;
}

function visitLeaves(tree: FacetTree, a: number, b: number, visit: (one: number, two: number) => boolean): boolean {
  const { order, facetBoxes, inner } = tree;
  const endOfB = leafStart(tree, b - inner + 1);
  for (let i = leafStart(tree, a - inner); i < leafStart(tree, a - inner + 1); i++) {
    for (let j = a === b ? i + 1 : leafStart(tree, b - inner); j < endOfB; j++) {
      if (!boxesMeet(facetBoxes, i, j)) continue;
      if (!visit(order[i] ?? 0, order[j] ?? 0)) return false;
    }
  }
  return true;
}

function boxesMeet(boxes: Float64Array, a: number, b: number): boolean {
  const i = 6 * a, j = 6 * b;
  return (
    (boxes[i] ?? 0) <= (boxes[j + 3] ?? 0) && (boxes[j] ?? 0) <= (boxes[i + 3] ?? 0) &&
    (boxes[i + 1] ?? 0) <= (boxes[j + 4] ?? 0) && (boxes[j + 1] ?? 0) <= (boxes[i + 4] ?? 0) &&
    (boxes[i + 2] ?? 0) <= (boxes[j + 5] ?? 0) && (boxes[j + 2] ?? 0) <= (boxes[i + 5] ?? 0)
  );
}

/** Calls `visit` for every facet whose box is met by the ray from a point along x; the point may be off by `slack`. */
export function visitRay(tree: FacetTree, [x, y, z]: readonly [number, number, number], slack: number, visit: (facet: number) => void): void {
  const { boxes, facetBoxes, inner, order } = tree;
  const isMet = (from: Float64Array, at: number): boolean =>
    (from[at + 3] ?? 0) >= x - slack && (from[at + 1] ?? 0) <= y + slack && (from[at + 4] ?? 0) >= y - slack && (from[at + 2] ?? 0) <= z + slack && (from[at + 5] ?? 0) >= z - slack;
  const stack = [0];
  while (stack.length > 0) {
    const node = stack.pop() ?? 0;
    if (!isMet(boxes, 6 * node)) continue;
    if (node < inner) {
      stack.push(2 * node + 2, 2 * node + 1);
      continue;
    }
    for (let k = leafStart(tree, node - inner); k < leafStart(tree, node - inner + 1); k++) if (isMet(facetBoxes, 6 * k)) visit(order[k] ?? 0);
  }
}

/** Calls `visit` for every facet whose box meets a box; stops where it says so, and gives false then. */
export function visitBox(tree: FacetTree, box: Float64Array, visit: (facet: number) => boolean): boolean {
  const { boxes, facetBoxes, inner, order } = tree;
  const isMet = (from: Float64Array, at: number): boolean => {
    for (let axis = 0; axis < 3; axis++) if ((from[at + axis] ?? 0) > (box[3 + axis] ?? 0) || (from[at + 3 + axis] ?? 0) < (box[axis] ?? 0)) return false;
    return true;
  };
  const stack = [0];
  while (stack.length > 0) {
    const node = stack.pop() ?? 0;
    if (!isMet(boxes, 6 * node)) continue;
    if (node < inner) {
      stack.push(2 * node + 2, 2 * node + 1);
      continue;
    }
    for (let k = leafStart(tree, node - inner); k < leafStart(tree, node - inner + 1); k++) {
      if (isMet(facetBoxes, 6 * k) && !visit(order[k] ?? 0)) return false;
    }
  }
  return true;
}
