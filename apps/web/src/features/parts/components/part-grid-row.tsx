import type { PartRow } from '@masswright/contracts';
import { memo, type CSSProperties } from 'react';
import { findFigureRun, getColumn, type ColumnId } from '../model/columns';
import type { ColumnRooms } from '../model/row-figures';
import { rowHeight } from '../model/use-virtual-rows';
import { PartCell } from './part-cell';
import type { RowActions } from '../model/use-row-actions';
import { findNote } from '../model/state-words';
import { RowNote } from './row-note';

interface PartGridRowProps {
  id: string;
  row: PartRow | undefined;
  index: number;
  columns: readonly ColumnId[];
  rooms: ColumnRooms;
  isCurrent: boolean;
  isSelected: boolean;
  /** Absent where nothing can be done with rows that are selected. */
  canSelect: boolean;
  actions: RowActions | undefined;
  /** A sentence may stand across several columns; on paper, where they are a table's, it can't. */
  canSpan: boolean;
}

/** Less room holds no sentence that is worth reading. */
const leastNoteWidth = 240;
/** A doubtful unit shows in the size; all else that follows from it gives way to the question. */
const isGivenWay = (row: PartRow) => (id: ColumnId) => row.state !== 'unit-doubt' || id !== 'size';

function Cells({ row, columns, rooms, isCurrent, actions, canSpan }: Pick<PartGridRowProps, 'columns' | 'rooms' | 'isCurrent' | 'actions' | 'canSpan'> & { row: PartRow }) {
  const tabIndex = isCurrent ? 0 : -1;
  const note = findNote(row);
  const run = note && findFigureRun(columns, isGivenWay(row));
  const isShown = canSpan && run !== undefined && run.width >= leastNoteWidth;
  return columns.map((column, position) => {
    if (isShown && note && position === run.start) {
      return (
        <div key={column} role="gridcell" className="part-cell" style={{ gridColumn: `span ${run.length}` }} aria-colspan={run.length} aria-colindex={position + 2}>
          <RowNote row={row} note={note} actions={actions} tabIndex={tabIndex} />
        </div>
      );
    }
    if (isShown && position > run.start && position < run.start + run.length) return null;
    const { isNumeric, isFigure } = getColumn(column);
    return (
      <div
        key={column}
        role={column === 'name' ? 'rowheader' : 'gridcell'}
        aria-colindex={position + 2}
        className={`part-cell part-cell-${column}${isNumeric ? ' numeric' : ''}`}
        title={isFigure && note && note.text !== '' ? note.text : undefined}
      >
        <PartCell row={row} column={column} rooms={rooms} tabIndex={tabIndex} />
      </div>
    );
  });
}

/** A row in the page. What was not read yet keeps its place, so that nothing jumps when it comes. */
export const PartGridRow = memo(function PartGridRow(props: PartGridRowProps) {
  const { id, row, index, columns, isCurrent, isSelected, canSelect } = props;
  const style: CSSProperties = { transform: `translateY(${index * rowHeight}px)` };
  return (
    <div
      role="row"
      id={id}
      data-index={index}
      aria-rowindex={index + 2}
      aria-selected={canSelect ? isSelected : undefined}
      aria-busy={row ? undefined : true}
      className={`part-row${isCurrent ? ' part-row-current' : ''}${isSelected ? ' part-row-selected' : ''}`}
      style={style}
    >
      <div role="gridcell" className="part-cell part-cell-select" aria-colindex={1}>
        {row && canSelect && <input type="checkbox" className="part-select" tabIndex={-1} checked={isSelected} readOnly aria-label={`Select ${row.name}`} />}
      </div>
      {row ? (
        <Cells {...props} row={row} />
      ) : (
        <div role="gridcell" aria-colindex={2} aria-colspan={columns.length} className="part-cell part-cell-waiting" />
      )}
    </div>
  );
});
