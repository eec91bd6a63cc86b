import { act, cleanup, renderHook } from '@testing-library/react';
import { useState } from 'react';
import { afterEach, describe, expect, it } from 'vitest';
import { countSelected, isSelected, nothing, type Selection } from './selection';
import { useGridPosition } from './use-grid-position';

const total = 1_000;
/** Rows from here on are not in the page. */
const read = 150;
const idOf = (index: number): string => `part ${index}`;

function open(canSelect = true) {
  const revealed: number[] = [];
  const { result } = renderHook(() => {
    const [selection, onSelect] = useState<Selection>(nothing);
    const position = useGridPosition({
      total,
      countSeen: () => 20,
      selection,
      canSelect,
      onSelect,
      findId: (index) => (index < read ? idOf(index) : undefined),
      readIds: (indices) => Promise.resolve(indices.map(idOf)),
      reveal: (index) => revealed.push(index),
      initial: 0,
    });
    return { position, selection };
  });
  const press = (key: string): void => act(() => result.current.position.goTo(result.current.position.findTarget(key) ?? -1));
  return { result, revealed, press, chosen: () => Array.from({ length: total }, (_, index) => index).filter((index) => isSelected(result.current.selection, idOf(index))) };
}

describe('the keyboard in the list', () => {
  afterEach(cleanup);
  it('goes by row, by page and to the ends, and no further', () => {
    const { result, press, revealed } = open();
    press('ArrowUp');
    expect(result.current.position.current).toBe(0);
    press('PageDown');
    press('ArrowDown');
    expect(result.current.position.current).toBe(21);
    press('End');
    press('ArrowDown');
    expect(result.current.position.current).toBe(999);
    press('Home');
    expect(revealed).toEqual([0, 20, 21, 999, 999, 0]);
    expect(result.current.position.findTarget('a')).toBeUndefined();
  });
  it('extends from where it began, there and back', () => {
    const { result, chosen } = open();
    act(() => result.current.position.goTo(5));
    act(() => result.current.position.extendTo(6));
    act(() => result.current.position.extendTo(8));
    expect(chosen()).toEqual([5, 6, 7, 8]);
    act(() => result.current.position.extendTo(4));
    expect(chosen()).toEqual([4, 5]);
  });
  it('a range keeps what was selected before it', () => {
    const { result, chosen } = open();
    act(() => result.current.position.toggleAt(2));
    act(() => result.current.position.goTo(10));
    act(() => result.current.position.extendTo(11));
    expect(chosen()).toEqual([2, 10, 11]);
    act(() => result.current.position.clear());
    expect(chosen()).toEqual([]);
  });
  it('a range reads the rows that are not in the page', async () => {
    const { result, chosen } = open();
    act(() => result.current.position.goTo(148));
    await act(async () => {
      result.current.position.extendTo(203);
      await Promise.resolve();
    });
    expect(chosen()).toHaveLength(56);
    expect(chosen().at(-1)).toBe(203);
  });
  it('selects all at once, and single rows out of them', () => {
    const { result } = open();
    act(() => void result.current.position.selectAll());
    act(() => result.current.position.toggleAt(3));
    expect(countSelected(result.current.selection, total)).toBe(999);
  });
  it('selects nothing for a reader', () => {
    const { result, chosen } = open(false);
    act(() => void result.current.position.selectAll());
    act(() => result.current.position.toggleAt(3));
    act(() => result.current.position.extendTo(9));
    expect(chosen()).toEqual([]);
  });
});
