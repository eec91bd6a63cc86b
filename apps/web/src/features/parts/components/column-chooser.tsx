import { Button } from '@blueprintjs/core';
import { memo, useId, useState, type DragEvent } from 'react';
import { PanelButton } from '../../../components/menu-button';
import { columnIds, getColumn, isStandard, standardColumns, type ColumnId } from '../model/columns';

interface ColumnChooserProps {
  columns: readonly ColumnId[];
  onChange: (columns: readonly ColumnId[]) => void;
}

/** A column moved to the place of another. */
function moveTo(columns: readonly ColumnId[], id: ColumnId, place: number): ColumnId[] {
  const others = columns.filter((column) => column !== id);
  return [...others.slice(0, place), id, ...others.slice(place)];
}

function Choice({ columns, onChange }: ColumnChooserProps) {
  const headingId = useId();
  const [dragged, setDragged] = useState<ColumnId>();
  const [said, setSaid] = useState('');
  const hidden = columnIds.filter((id) => !columns.includes(id));
  const move = (id: ColumnId, place: number): void => {
    onChange(moveTo(columns, id, place));
    setSaid(`${getColumn(id).name} is column ${place + 1} of ${columns.length} now.`);
  };
  const over = (event: DragEvent, place: number): void => {
    if (dragged === undefined) return;
    event.preventDefault();
    if (columns.indexOf(dragged) !== place) onChange(moveTo(columns, dragged, place));
  };
  return (
    <div className="panel column-chooser" aria-labelledby={headingId} role="group">
      <p className="caption" id={headingId}>
        Columns, from left to right
      </p>
      <ol>
        {columns.map((id, place) => {
          const { name } = getColumn(id);
          return (
            <li
              key={id}
              draggable
              className={dragged === id ? 'column-dragged' : undefined}
              onDragStart={(event) => {
                event.dataTransfer.effectAllowed = 'move';
                event.dataTransfer.setData('text/plain', name);
                setDragged(id);
              }}
              onDragOver={(event) => over(event, place)}
              onDragEnd={() => setDragged(undefined)}
            >
              <label>
                <input type="checkbox" checked disabled={id === 'name'} onChange={() => onChange(columns.filter((column) => column !== id))} /> {name}
              </label>
              <Button size="small" variant="minimal" disabled={place === 0} aria-label={`${name} further left`} onClick={() => move(id, place - 1)}>
                ↑
              </Button>
              <Button size="small" variant="minimal" disabled={place === columns.length - 1} aria-label={`${name} further right`} onClick={() => move(id, place + 1)}>
                ↓
              </Button>
            </li>
          );
        })}
        {hidden.map((id) => (
          <li key={id}>
            <label>
              <input type="checkbox" checked={false} onChange={() => onChange([...columns, id])} /> {getColumn(id).name}
            </label>
          </li>
        ))}
      </ol>
      <Button size="small" disabled={isStandard(columns)} onClick={() => onChange(standardColumns)}>
        As usual
      </Button>
      <span role="status" className="hidden-visually">
        {said}
      </span>
    </div>
  );
}

/** Which columns the list has, and in which order. */
export const ColumnChooser = memo(function ColumnChooser({ columns, onChange }: { columns: readonly ColumnId[]; onChange: (change: { columns: readonly ColumnId[] }) => void }) {
  return <PanelButton label="Columns">{() => <Choice columns={columns} onChange={(chosen) => onChange({ columns: chosen })} />}</PanelButton>;
});
