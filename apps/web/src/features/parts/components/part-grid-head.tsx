import type { PartOrder } from '@masswright/contracts';
import { useEffect, useRef } from 'react';
import { getColumn, type ColumnId } from '../model/columns';
import { turnOrder } from '../model/list-address';

interface PartGridHeadProps {
  columns: readonly ColumnId[];
  order: PartOrder;
  onOrder: (order: PartOrder) => void;
  /** Of the rows that the filter leaves; undefined where nothing can be done with a selection. */
  chosen: 'none' | 'some' | 'all' | undefined;
  onChooseAll: (all: boolean) => void;
}

function SelectAll({ chosen, onChooseAll }: Pick<PartGridHeadProps, 'chosen' | 'onChooseAll'>) {
  const box = useRef<HTMLInputElement>(null);
  useEffect(() => {
    if (box.current) box.current.indeterminate = chosen === 'some';
  }, [chosen]);
  return <input ref={box} type="checkbox" checked={chosen === 'all'} aria-label="Select all that are listed" onChange={() => onChooseAll(chosen !== 'all')} />;
}

export function PartGridHead({ columns, order, onOrder, chosen, onChooseAll }: PartGridHeadProps) {
  return (
    <div role="rowgroup" className="part-head-group">
      <div role="row" className="part-head" aria-rowindex={1}>
        <div role="columnheader" className="part-cell part-cell-select" aria-colindex={1}>
          {chosen === undefined ? <span className="hidden-visually">Selection</span> : <SelectAll chosen={chosen} onChooseAll={onChooseAll} />}
        </div>
        {columns.map((id, position) => {
          const { name, head = name, unit, isNumeric, sort } = getColumn(id);
          const isSorted = sort !== undefined && sort === order.sort;
          const words = (
            <>
              <span aria-hidden={head === name ? undefined : true} className={unit && head !== name ? 'unit' : undefined}>
                {head}
              </span>
              {head !== name && <span className="hidden-visually">{name}</span>} {unit && <span className="unit">{unit}</span>}
            </>
          );
          return (
            <div
              key={id}
              role="columnheader"
              aria-colindex={position + 2}
              aria-sort={sort === undefined ? undefined : isSorted ? order.direction : 'none'}
              className={`part-cell part-cell-${id}${isNumeric ? ' numeric' : ''}`}
            >
              {sort === undefined ? (
                words
              ) : (
                <button type="button" className="part-sort" onClick={() => onOrder(turnOrder(order, sort))}>
                  {words}
                  <span className={`part-sort-mark${isSorted ? ` part-sort-${order.direction}` : ''}`} aria-hidden="true" />
                </button>
              )}
            </div>
          );
        })}
      </div>
    </div>
  );
}
