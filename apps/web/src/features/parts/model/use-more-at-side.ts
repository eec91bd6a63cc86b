import { useEffect, useState, type RefObject } from 'react';

/** The empty margin at the end of the rows, in CSS pixels: where no more than that is out of view, nothing is. */
const leastHidden = 24;

/** Whether something that scrolls has more beyond its right edge. */
export function useMoreAtSide(scroller: RefObject<HTMLElement | null>): boolean {
  const [hasMore, setHasMore] = useState(false);
  useEffect(() => {
    const element = scroller.current;
    if (!element) return undefined;
    const look = (): void => setHasMore(element.scrollWidth - element.clientWidth - element.scrollLeft > leastHidden);
    // What it holds is watched, too: another choice of columns has another width.
    const observer = new ResizeObserver(look);
    observer.observe(element);
    for (const child of element.children) observer.observe(child);
    element.addEventListener('scroll', look, { passive: true });
    return () => {
      observer.disconnect();
      element.removeEventListener('scroll', look);
    };
  }, [scroller]);
  return hasMore;
}
