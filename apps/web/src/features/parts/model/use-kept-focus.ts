import { useEffect, useRef, type RefObject } from 'react';

/** Menus, panels and dialogs are drawn there, whatever they belong to. */
const elsewhere = '.bp6-portal';

/**
 * Keeps the keyboard in the list: a button that was pressed may be gone, or at rest, once its work is done, and the focus would fall to
 * the page. Then the rows have it again. Whoever goes elsewhere by themselves is left there.
 */
export function useKeptFocus(): RefObject<HTMLElement | null> {
  const list = useRef<HTMLElement>(null);
  const isWithin = useRef(false);
  useEffect(() => {
    const note = (event: Event): void => {
      if (!(event.target instanceof Element) || event.target.closest(elsewhere)) return;
      isWithin.current = list.current?.contains(event.target) ?? false;
    };
    document.addEventListener('focusin', note);
    document.addEventListener('pointerdown', note);
    return () => {
      document.removeEventListener('focusin', note);
      document.removeEventListener('pointerdown', note);
    };
  }, []);
  useEffect(() => {
    if (!isWithin.current) return undefined;
    // A button that comes to rest loses the focus only with the next picture.
    const frame = requestAnimationFrame(() => {
      if (document.activeElement !== document.body || document.querySelector('.bp6-overlay-open')) return;
      list.current?.querySelector<HTMLElement>('[role=grid]')?.focus({ preventScroll: true });
    });
    return () => cancelAnimationFrame(frame);
  });
  return list;
}
