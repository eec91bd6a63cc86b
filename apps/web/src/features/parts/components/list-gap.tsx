import { Button } from '@blueprintjs/core';
import { keepDeletedPartsDays } from '@masswright/contracts';
import { getColumn, type ColumnId } from '../model/columns';
import { readStates, type ListQuery } from '../model/list-address';
import { stateTexts } from '../model/state-words';

interface ListGapProps {
  query: ListQuery;
  deletedCount: number;
  onClear: () => void;
}

/** What stands where rows would, when the filter leaves none. */
export function ListGap({ query, deletedCount, onClear }: ListGapProps) {
  const { text, states, deleted } = query;
  if (deleted && deletedCount === 0) {
    return (
      <div className="list-gap">
        <h2>No deleted parts</h2>
        <p className="soft">What is deleted stands here for {keepDeletedPartsDays} days and can be restored; after that it is gone.</p>
        <Button onClick={onClear}>Show all parts</Button>
      </div>
    );
  }
  const words = readStates(states).map((state) => stateTexts[state].word.toLowerCase());
  return (
    <div className="list-gap">
      <h2>No part fits the filter</h2>
      <p className="soft">
        {text !== '' && `No ${deleted ? 'deleted ' : ''}part has “${text}” in its name, number, file, folder or material`}
        {text !== '' && words.length > 0 && ' and is '}
        {text === '' && words.length > 0 && 'No part is '}
        {words.length > 1 ? `${words.slice(0, -1).join(', ')} or ${words.at(-1) ?? ''}` : words[0]}. Write less, or clear it.
      </p>
      <Button onClick={onClear}>Clear the filter</Button>
    </div>
  );
}

/** The list before its first answer: as high and as wide, so that nothing moves when the rows come. */
export function ListSkeleton({ columns }: { columns: readonly ColumnId[] }) {
  return (
    <div className="list-skeleton" role="status">
      <span className="hidden-visually">Reading the parts</span>
      {Array.from({ length: 12 }, (_, row) => (
        <div key={row} className="list-skeleton-row" aria-hidden="true">
          {columns.slice(0, 8).map((id) => (
            <span key={id} className="part-waiting" style={{ width: Math.min(90, getColumn(id).width - 12) }} />
          ))}
        </div>
      ))}
    </div>
  );
}
