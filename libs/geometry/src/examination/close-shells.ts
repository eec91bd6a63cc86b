/** Steps of the search after which shells count as too many to be told apart by their boxes. */
const mostSteps = 20_000_000;
const mostPairs = 1_000_000;

/** Pairs of shells whose boxes meet, the lesser number first; undefined where there are too many. */
export function findClosePairs(boxes: Float64Array): [number, number][] | undefined {
  const count = boxes.length / 6;
  const order = Array.from({ length: count }, (_, shell) => shell).sort((one, two) => (boxes[6 * one] ?? 0) - (boxes[6 * two] ?? 0) || one - two);
  const pairs: [number, number][] = [];
  let steps = 0;
  let active: number[] = [];
  for (const shell of order) {
    const least = boxes[6 * shell] ?? 0;
    active = active.filter((other) => (boxes[6 * other + 3] ?? 0) >= least);
    steps += active.length;
    for (const other of active) if (boxesMeet(boxes, shell, other)) pairs.push(shell < other ? [shell, other] : [other, shell]);
    if (steps > mostSteps || pairs.length > mostPairs) return undefined;
    active.push(shell);
  }
  return pairs.sort(([a, b], [c, d]) => a - c || b - d);
}

function boxesMeet(boxes: Float64Array, one: number, two: number): boolean {
  for (let axis = 0; axis < 3; axis++) {
    if ((boxes[6 * one + axis] ?? 0) > (boxes[6 * two + 3 + axis] ?? 0) || (boxes[6 * two + axis] ?? 0) > (boxes[6 * one + 3 + axis] ?? 0)) return false;
  }
  return true;
}

export function isBoxWithin(boxes: Float64Array, inner: number, outer: number): boolean {
  for (let axis = 0; axis < 3; axis++) {
    if ((boxes[6 * inner + axis] ?? 0) < (boxes[6 * outer + axis] ?? 0) || (boxes[6 * inner + 3 + axis] ?? 0) > (boxes[6 * outer + 3 + axis] ?? 0)) return false;
  }
  return true;
}
