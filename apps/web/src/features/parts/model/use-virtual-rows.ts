import { elementScroll, observeElementOffset, observeElementRect, Virtualizer } from '@tanstack/virtual-core';
import { useLayoutEffect, useState, type RefObject } from 'react';

/** Every row is as high: so a row that fills in, or says why it can't, moves none of the others. */
export const rowHeight = 36;
export const headHeight = 36;
const overscan = 6;
/** Until the height of the list is known. */
const firstGuess = { first: 0, last: 29 };

export interface RowRange {
  first: number;
  last: number;
}

export interface VirtualRows {
  /** The rows that are in the page: what is seen, and a few on either side. */
  range: RowRange;
  /** Brings a row into view, by as little as that takes. */
  reveal: (index: number) => void;
  scrollToTop: () => void;
  /** How many whole rows are seen at once. */
  countSeen: () => number;
}

/** Which of `count` rows are in the page, in a list that scrolls within `scroller` below a head that stays. */
export function useVirtualRows(scroller: RefObject<HTMLElement | null>, count: number, initialOffset: number): VirtualRows {
  const [range, setRange] = useState<RowRange>(() => {
    const first = Math.max(0, Math.floor(initialOffset / rowHeight) - overscan);
    return { first, last: first + firstGuess.last };
  });
  const [virtualizer] = useState(() => {
    const created: Virtualizer<HTMLElement, HTMLElement> = new Virtualizer({
      count,
      getScrollElement: () => scroller.current,
      estimateSize: () => rowHeight,
      observeElementRect,
      observeElementOffset,
      scrollToFn: elementScroll,
      overscan,
      initialOffset,
      // The head covers the top of what is scrolled, so as much less is seen at the bottom.
      scrollPaddingEnd: headHeight,
      onChange: (instance) => {
        const items = instance.getVirtualItems();
        const first = items[0]?.index;
        const last = items.at(-1)?.index;
        if (first === undefined || last === undefined) return;
        setRange((before) => (before.first === first && before.last === last ? before : { first, last }));
      },
    });
    return created;
  });

  useLayoutEffect(() => virtualizer._didMount(), [virtualizer]);
  useLayoutEffect(() => {
    virtualizer.setOptions({ ...virtualizer.options, count });
    virtualizer._willUpdate();
    // Says which rows are in view now.
    virtualizer.measure();
  }, [virtualizer, count]);

  return {
    range: { first: Math.min(range.first, Math.max(0, count - 1)), last: Math.min(range.last, count - 1) },
    reveal: (index) => virtualizer.scrollToIndex(index, { align: 'auto' }),
    scrollToTop: () => {
      scroller.current?.scrollTo({ top: 0 });
      setRange((before) => (before.first === 0 ? before : firstGuess));
    },
    countSeen: () => Math.max(1, Math.floor(((scroller.current?.clientHeight ?? 0) - headHeight) / rowHeight)),
  };
}
