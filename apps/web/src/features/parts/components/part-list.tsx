import type { Material, PartRow } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useState, type ReactNode } from 'react';
import { useNavigate } from 'react-router-dom';
import { ProblemNotice } from '../../../components/problem-notice';
import { PrintLine } from '../../../components/print-line';
import { countOf } from '../../../lib/plural';
import { changeSettings, deleteParts, restoreParts } from '../api/part-changes';
import { readRowIds, usePartCounts, usePartList } from '../api/part-list';
import type { BulkChange } from '../model/bulk-change';
import type { ListQuery } from '../model/list-address';
import { countSelected, nothing, writeSelection, type Selection } from '../model/selection';
import { useChangeSteps } from '../model/use-change-steps';
import { placeRow } from '../model/stretches';
import { useKeptFocus } from '../model/use-kept-focus';
import { useListView } from '../model/use-list-view';
import { useRowActions } from '../model/use-row-actions';
import type { RowRange } from '../model/use-virtual-rows';
import { ColumnChooser } from './column-chooser';
import { ExportMenu } from './export-menu';
import { ListGap, ListSkeleton } from './list-gap';
import { PartFilterBar } from './part-filter';
import { PartGrid } from './part-grid';
import { SelectionBar } from './selection-bar';
import { StepLine } from './step-line';
import './part-list.css';

interface PartListProps {
  projectId: string;
  canEdit: boolean;
  materials: readonly Material[];
  /** What stands there while the project has no parts at all. */
  empty: ReactNode;
  onReplace?: (row: PartRow) => void;
}

const filterKey = ({ text, states, deleted }: ListQuery): string => JSON.stringify([text, states, deleted]);

/** Holds only for the filter under which it was made: under another, other rows would be meant. */
function useSelection(query: ListQuery): [Selection, (selection: Selection) => void] {
  const key = filterKey(query);
  const [made, setMade] = useState<{ key: string; selection: Selection }>({ key, selection: nothing });
  const select = useCallback((selection: Selection) => setMade({ key, selection }), [key]);
  return [made.key === key ? made.selection : nothing, select];
}

/** The rows in view, told anew only where other stretches of them are to be read. */
function useStretchRange(): [RowRange, (range: RowRange) => void] {
  const [range, setRange] = useState<RowRange>({ first: 0, last: 0 });
  const note = useCallback((next: RowRange) => {
    const isSame = (one: number, other: number): boolean => placeRow(one).stretch === placeRow(other).stretch;
    setRange((before) => (isSame(before.first, next.first) && isSame(before.last, next.last) ? before : next));
  }, []);
  return [range, note];
}

/** A project's parts: narrowed, ordered, selected and changed together, with one way back. */
export function PartList({ projectId, canEdit, materials, empty, onReplace }: PartListProps) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const { view, change } = useListView();
  const [range, noteRange] = useStretchRange();
  const { list, isTurning, error, retry } = usePartList(projectId, view, range);
  const counts = usePartCounts(projectId, view, list);
  const [selection, select] = useSelection(list.query);
  const keptFocus = useKeptFocus();
  const { steps, state } = useChangeSteps(projectId);
  const { actions, error: actionError } = useRowActions({ projectId, steps, materials, onReplace });
  const onText = useCallback((text: string) => change({ text }), [change]);
  const total = list.head?.total ?? 0;
  const count = countSelected(selection, total);
  const chosen = () => writeSelection(selection, list.query, total);

  const changeAll = ({ change: wanted, about, to }: BulkChange): Promise<void> =>
    steps.take(async () => {
      const done = await changeSettings(projectId, chosen(), wanted);
      return { kind: 'setting', change: done, about, to };
    });
  const move = (kind: 'deleted' | 'restored', parts = chosen()): Promise<void> =>
    steps.take(async () => {
      const { ids } = await (kind === 'deleted' ? deleteParts : restoreParts)(projectId, parts);
      select(nothing);
      return { kind, ids };
    });
  const isEmpty = list.head !== undefined && total === 0 && view.text === '' && view.states === '' && !view.deleted && list.head.deleted === 0 && !isTurning;
  if (isEmpty) return empty;
  return (
    <section ref={keptFocus} className="part-list" aria-label="List of parts">
      <div className="part-tools screen-only">
        <PartFilterBar view={view} counts={counts} deleted={list.head?.deleted} onChange={change} onText={onText} />
        <div className="part-tools-end">
          <ColumnChooser columns={view.columns} onChange={change} />
          <ExportMenu projectId={projectId} view={view} total={total} />
        </div>
      </div>
      {error !== null && <ProblemNotice error={error} onRetry={retry} />}
      {actionError !== null && <ProblemNotice error={actionError} />}
      <div className={`part-list-body${isTurning ? ' part-list-turning' : ''}`} aria-busy={isTurning}>
        {list.head === undefined ? (
          error === null && <ListSkeleton columns={view.columns} />
        ) : total === 0 ? (
          <ListGap query={list.query} deletedCount={list.head.deleted} onClear={() => change({ text: '', states: '', deleted: false })} />
        ) : (
          <PartGrid
            projectId={projectId}
            list={list}
            total={total}
            columns={view.columns}
            onOrder={change}
            selection={selection}
            canSelect={canEdit}
            onSelect={select}
            onRange={noteRange}
            readIds={(indices) => readRowIds(client, projectId, list.query, indices)}
            actions={canEdit && !view.deleted ? actions : undefined}
            onOpen={(row) => void navigate(`/projects/${projectId}/parts/${row.id}`)}
            onDelete={(row) => canEdit && !view.deleted && void move('deleted', row ? { ids: [row.id] } : undefined)}
          />
        )}
      </div>
      <PrintedCount read={list.countRead()} total={total} />
      <footer className="part-foot screen-only">
        <StepLine steps={steps} state={state} />
        <div className="part-foot-line">
          {count > 0 ? (
            <SelectionBar
              count={count}
              materials={materials}
              isBusy={state.isBusy}
              isDeletedView={list.query.deleted}
              onChange={(wanted) => void changeAll(wanted)}
              onDelete={() => void move('deleted')}
              onRestore={() => void move('restored')}
              onClear={() => select(nothing)}
            />
          ) : (
            total > 0 && (
              <p className="soft">
                <span className="figure">{formatCount(total)}</span> {list.query.deleted && 'deleted '}
                {total === 1 ? 'part' : 'parts'}
                {(list.query.text !== '' || list.query.states !== '') && ' that the filter leaves'}. Principal moments are about each centre of mass.
              </p>
            )
          )}
        </div>
      </footer>
    </section>
  );
}

/** On paper: rows that were never looked at are not there to be printed. */
function PrintedCount({ read, total }: { read: number; total: number }) {
  return (
    <PrintLine>
      {countOf(read, 'part')} of {formatCount(total)}
      {read < total && ` (${formatCount(total - read)} that were not looked at are left out; the export of the list has them all)`}, of uniform bodies, principal moments about each centre of
      mass
    </PrintLine>
  );
}
