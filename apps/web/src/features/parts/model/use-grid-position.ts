import { useRef, useState } from 'react';
import { everything, isSelected, listRange, nothing, toggle, withSelected, type Selection } from './selection';

interface GridPositionParts {
  total: number;
  /** How many rows are seen at once. */
  countSeen: () => number;
  selection: Selection;
  canSelect: boolean;
  onSelect: (selection: Selection) => void;
  findId: (index: number) => string | undefined;
  /** Reads ids of rows that are not in the page. */
  readIds: (indices: readonly number[]) => Promise<string[]>;
  reveal: (index: number) => void;
  initial: number;
}

/** Where the keyboard stands in the list, and what it selects from there. */
export function useGridPosition(parts: GridPositionParts) {
  const { total, selection, canSelect, onSelect } = parts;
  const [wanted, setCurrent] = useState(parts.initial);
  const current = Math.max(0, Math.min(wanted, total - 1));
  /** Where a range begins, and what was selected without it. */
  const anchor = useRef<{ index: number; base: Selection }>(undefined);
  const ranges = useRef(0);

  const goTo = (index: number): void => {
    const next = Math.max(0, Math.min(index, total - 1));
    setCurrent(next);
    parts.reveal(next);
  };
  const extendTo = (index: number): void => {
    if (!canSelect) return;
    anchor.current ??= { index: current, base: selection };
    const { index: from, base } = anchor.current;
    const indices = listRange(from, Math.max(0, Math.min(index, total - 1)));
    const known = indices.map(parts.findId);
    const turn = ++ranges.current;
    const select = (ids: readonly string[]): void => {
      // A longer range may have been asked for while this one was read.
      if (turn === ranges.current) onSelect(withSelected(base, ids, true));
    };
    if (known.every((id) => id !== undefined)) select(known);
    else void parts.readIds(indices).then(select, () => undefined);
    goTo(index);
  };
  const toggleAt = (index: number): void => {
    const id = parts.findId(index);
    if (!canSelect || id === undefined) return;
    const next = toggle(selection, id);
    anchor.current = { index, base: isSelected(next, id) ? next : withSelected(next, [], true) };
    setCurrent(index);
    onSelect(next);
  };
  return {
    current,
    goTo: (index: number) => {
      anchor.current = undefined;
      goTo(index);
    },
    /** Where the person has gone by themselves: nothing has to be brought into view. */
    standAt: (index: number) => {
      anchor.current = undefined;
      setCurrent(index);
    },
    /** Where another list begins. */
    goToTop: () => {
      anchor.current = undefined;
      setCurrent(0);
    },
    extendTo,
    toggleAt,
    selectAll: () => canSelect && onSelect(everything),
    clear: () => onSelect(nothing),
    /** The row that a key leads to; undefined where it is none that moves. */
    findTarget: (key: string): number | undefined => {
      switch (key) {
        case 'ArrowDown':
          return current + 1;
        case 'ArrowUp':
          return current - 1;
        case 'PageDown':
          return current + parts.countSeen();
        case 'PageUp':
          return current - parts.countSeen();
        case 'Home':
          return 0;
        case 'End':
          return total - 1;
        default:
          return undefined;
      }
    },
  };
}
