import { useEffect, useState } from 'react';
import type { RowRange } from './use-virtual-rows';

/** So many rows are filled in between two pictures of the page; a row has some forty elements. */
const rowsAtOnce = 6;

/** The rows in the page that were filled before, and up to `most` more of those that were read, from above. What was not read yet is not filled, and comes in its turn when it is. */
export function growFilled(filled: ReadonlySet<number>, { first, last }: RowRange, isRead: (index: number) => boolean, most: number): Set<number> {
  const grown = new Set<number>();
  for (let index = first; index <= last; index++) if (filled.has(index) && isRead(index)) grown.add(index);
  for (let index = first, left = most; index <= last && left > 0; index++) {
    if (grown.has(index) || !isRead(index)) continue;
    grown.add(index);
    left -= 1;
  }
  return grown;
}

const isSame = (one: ReadonlySet<number>, two: ReadonlySet<number>): boolean => one.size === two.size && [...one].every((index) => two.has(index));

/**
 * Which of the rows in the page show what they say. The rest keep their place for some pictures longer: filling a whole screen in one
 * go would hold up the wheel.
 */
export function useFilledRows(range: RowRange, isRead: (index: number) => boolean): ReadonlySet<number> {
  const [filled, setFilled] = useState<ReadonlySet<number>>(new Set());
  const shown = growFilled(filled, range, isRead, rowsAtOnce);
  useEffect(() => {
    if (isSame(shown, filled)) return undefined;
    const frame = requestAnimationFrame(() => setFilled(shown));
    return () => cancelAnimationFrame(frame);
  });
  return shown;
}
