import type { PartOrder, PartRow } from '@masswright/contracts';
import { useEffect, useId, useLayoutEffect, useRef, useState, type CSSProperties, type KeyboardEvent, type MouseEvent } from 'react';
import type { ReadList } from '../api/part-list';
import { computeColumnWidth, type ColumnId } from '../model/columns';
import type { ColumnRooms } from '../model/row-figures';
import { writeQuery } from '../model/list-address';
import { findPlace, keepPlace } from '../model/list-place';
import { countSelected, isSelected, type Selection } from '../model/selection';
import { findEntry, findRowElement, findStepInRow } from '../model/row-controls';
import { useGridPosition } from '../model/use-grid-position';
import { useMoreAtSide } from '../model/use-more-at-side';
import { useFilledRows } from '../model/use-filled-rows';
import { useIsPrinting } from '../model/use-is-printing';
import { rowHeight, useVirtualRows, type RowRange } from '../model/use-virtual-rows';
import { PartGridHead } from './part-grid-head';
import { PartGridRow } from './part-grid-row';
import type { RowActions } from '../model/use-row-actions';
import './part-grid.css';

interface PartGridProps {
  projectId: string;
  list: ReadList;
  total: number;
  columns: readonly ColumnId[];
  onOrder: (order: PartOrder) => void;
  selection: Selection;
  canSelect: boolean;
  onSelect: (selection: Selection) => void;
  /** Which rows are in view, so that they are read. */
  onRange: (range: RowRange) => void;
  readIds: (indices: readonly number[]) => Promise<string[]>;
  actions: RowActions | undefined;
  onOpen: (row: PartRow) => void;
  /** Of what is selected, or of one row where nothing is. */
  onDelete: (row: PartRow | undefined) => void;
}

/** The name takes what the others leave; all others are as wide as the list needs, whatever rows are in view. */
function writeTracks(columns: readonly ColumnId[], rooms: ColumnRooms): CSSProperties {
  const widths = columns.map((id) => computeColumnWidth(id, rooms));
  const tracks = widths.map((width, place) => (columns[place] === 'name' ? `minmax(${width}px, 1fr)` : `${width}px`));
  const least = widths.reduce((sum, width) => sum + width, selectWidth);
  return { '--tracks': `${selectWidth}px ${tracks.join(' ')}`, '--least': `${least}px` } as CSSProperties;
}
const selectWidth = 45;

/** The same object for as long as it says the same, so that rows needn't be drawn again. */
function useSteady<Value extends object>(value: Value): Value {
  const [steady, setSteady] = useState(value);
  if (JSON.stringify(steady) === JSON.stringify(value)) return steady;
  setSteady(value);
  return value;
}

/** Whether a click was on something that answers it by itself. */
const isControl = (target: EventTarget): boolean => target instanceof Element && target.closest('a, button, .bp6-popover') !== null;
const findIndex = (target: EventTarget): number | undefined => {
  const index = target instanceof Element ? target.closest<HTMLElement>('[data-index]')?.dataset['index'] : undefined;
  return index === undefined ? undefined : Number(index);
};
/** What a person reaches in a row by Tab or a press makes the row the current one. */
const findControlIndex = (target: EventTarget): number | undefined => (isControl(target) ? findIndex(target) : undefined);

export function PartGrid(props: PartGridProps) {
  const { projectId, list, total, columns, onOrder, selection, canSelect, onSelect, onRange, actions } = props;
  const id = useId();
  const scroller = useRef<HTMLDivElement>(null);
  const queryText = writeQuery(list.query).toString();
  const [place] = useState(() => findPlace(projectId, queryText));
  const { range, reveal, scrollToTop, countSeen } = useVirtualRows(scroller, total, place.offset);
  const isPrinting = useIsPrinting();
  const position = useGridPosition({
    total,
    countSeen,
    selection,
    canSelect,
    onSelect,
    findId: (index) => list.getRow(index)?.id,
    readIds: props.readIds,
    reveal,
    initial: place.current,
  });
  const { current, goToTop } = position;

  const { first, last } = range;
  useEffect(() => onRange({ first, last }), [onRange, first, last]);
  const seen = useRef(queryText);
  useLayoutEffect(() => {
    if (seen.current === queryText) return;
    // Another filter or order is another list: it begins at its beginning.
    seen.current = queryText;
    scrollToTop();
    goToTop();
  });
  /** Noted and never asked for: the answer would have the browser lay out the page on the spot. */
  const offset = useRef(place.offset);
  useEffect(() => keepPlace(projectId, { query: queryText, offset: offset.current, current }), [projectId, queryText, current]);

  const focusGrid = (): void => scroller.current?.focus({ preventScroll: true });
  /** True where a control of a row, and not the list, answers the key. */
  const pressInRow = (event: KeyboardEvent<Element>, row: Element): boolean => {
    if (!(event.target instanceof Element) || event.ctrlKey || event.metaKey || event.altKey) return false;
    const step = findStepInRow(event.target, row, event.key);
    if (step === undefined) return false;
    if (step !== 'own') event.preventDefault();
    if (step === 'list') focusGrid();
    else if (step !== 'own') step.focus();
    return true;
  };
  const press = (event: KeyboardEvent): void => {
    const inRow = findRowElement(event.target);
    if (inRow ? pressInRow(event, inRow) : event.target !== scroller.current) return;
    const isCommand = event.ctrlKey || event.metaKey;
    const target = isCommand || event.altKey ? undefined : position.findTarget(event.key);
    const row = list.getRow(current);
    const entry = isCommand || event.altKey || inRow ? undefined : findEntry(document.getElementById(`${id}-${current}`), event.key);
    if (entry) entry.focus();
    else if (target !== undefined) {
      if (event.shiftKey) position.extendTo(target);
      else position.goTo(target);
    } else if (event.key === ' ') position.toggleAt(current);
    else if (isCommand && event.key.toLowerCase() === 'a') position.selectAll();
    else if (event.key === 'Enter' && row) props.onOpen(row);
    else if (event.key === 'Delete') props.onDelete(countSelected(selection, total) > 0 ? undefined : row);
    else if (event.key === 'Escape') position.clear();
    else return;
    event.preventDefault();
    if (inRow) focusGrid();
  };
  const click = (event: MouseEvent): void => {
    const index = findIndex(event.target);
    if (index === undefined || isControl(event.target)) return;
    const isBox = event.target instanceof HTMLInputElement;
    if (event.shiftKey && canSelect) {
      getSelection()?.removeAllRanges();
      position.extendTo(index);
    } else if (isBox || event.ctrlKey || event.metaKey) position.toggleAt(index);
    else position.goTo(index);
    if (isBox) focusGrid();
  };

  const filled = useFilledRows(range, (index) => list.getRow(index) !== undefined);
  const rooms = useSteady(list.rooms);
  const shown = isPrinting ? list.listRead() : Array.from({ length: Math.max(0, last - first + 1) }, (_, step) => ({ index: first + step, row: list.getRow(first + step) }));
  const chosen = countSelected(selection, total);
  const hasMore = useMoreAtSide(scroller);
  return (
    <div className="part-grid-frame" data-more={hasMore}>
      <div
        ref={scroller}
        role="grid"
        aria-describedby={`${id}-keys`}
        aria-label="Parts"
        aria-rowcount={total + 1}
        aria-colcount={columns.length + 1}
        aria-multiselectable={canSelect ? true : undefined}
        aria-activedescendant={list.getRow(current) && current >= first && current <= last ? `${id}-${current}` : undefined}
        tabIndex={0}
        className="part-grid"
        style={writeTracks(columns, rooms)}
        onKeyDown={press}
        onClick={click}
        onFocus={(event) => {
          const index = findControlIndex(event.target);
          if (index !== undefined && index !== current) position.standAt(index);
        }}
        onScroll={(event) => {
          offset.current = event.currentTarget.scrollTop;
          keepPlace(projectId, { query: queryText, offset: offset.current, current });
        }}
      >
        <PartGridHead
          columns={columns}
          order={list.query}
          onOrder={onOrder}
          chosen={!canSelect ? undefined : chosen === 0 ? 'none' : chosen >= total ? 'all' : 'some'}
          onChooseAll={(all) => (all ? position.selectAll() : position.clear())}
        />
        <div role="rowgroup" className="part-rows" style={{ height: total * rowHeight }}>
          {shown.map(({ index, row }) => (
            <PartGridRow
              key={row?.id ?? `place ${index}`}
              id={`${id}-${index}`}
              row={isPrinting || filled.has(index) ? row : undefined}
              index={index}
              columns={columns}
              rooms={rooms}
              isCurrent={index === current}
              isSelected={row !== undefined && isSelected(selection, row.id)}
              canSelect={canSelect}
              actions={actions}
              canSpan={!isPrinting}
            />
          ))}
        </div>
    </div>
      <span id={`${id}-keys`} className="hidden-visually">
        Arrow right or F2 goes to what a row asks, Escape back to the list; Space selects.
      </span>
    </div>
  );
}
