import { useEffect, useState } from 'react';
import type { RowRange } from './use-virtual-rows';

/** So many rows are filled in between two pictures of the page; a row has some forty elements. */
const rowsAtOnce = 6;

/** The rows of `filled` that are still in the page, and beside them up to `most` more: below first, since that is where most go. Empty ranges have `last` before `first`. */
export function growFilled(filled: RowRange, range: RowRange, most: number): RowRange {
  let first = Math.max(filled.first, range.first);
  let last = Math.min(filled.last, range.last);
  if (first > last) {
    first = range.first;
    last = range.first - 1;
  }
  const below = Math.min(most, range.last - last);
  const above = Math.min(most - below, first - range.first);
  return { first: first - above, last: last + below };
}

const isSame = (one: RowRange, two: RowRange): boolean => one.first === two.first && one.last === two.last;

/**
 * Which of the rows in the page show what they say. The rest keep their place for some pictures longer: filling a whole screen in one
 * go would hold up the wheel.
 */
export function useFilledRows({ first, last }: RowRange): (index: number) => boolean {
  const [filled, setFilled] = useState<RowRange>({ first, last: first - 1 });
  const shown = growFilled(filled, { first, last }, rowsAtOnce);
  useEffect(() => {
    if (isSame(shown, filled)) return undefined;
    const frame = requestAnimationFrame(() => setFilled(shown));
    return () => cancelAnimationFrame(frame);
  });
  return (index) => index >= shown.first && index <= shown.last;
}
