import type { PartRow } from '@masswright/contracts';
import { computeSmallBeams } from '@masswright/pictures';
import { getLengthUnit } from '@masswright/units';
import { Link } from 'react-router-dom';
import { AlignedFigure } from '../../../components/figure';
import { PictureView } from '../../../components/picture-view';
import { StatusTag } from '../../../components/status-tag';
import { formatDay, formatMoment } from '../../../lib/format-time';
import { countOf } from '../../../lib/plural';
import type { ColumnId } from '../model/columns';
import { describeDaysLeft } from '../model/deleted-words';
import { computeRowFigure, listDigits, writeRowSize, type ColumnRooms } from '../model/row-figures';
import { describeRun } from '../model/run-words';
import { describeVerdict } from '../model/soundness-words';
import { stateTexts } from '../model/state-words';

interface PartCellProps {
  row: PartRow;
  column: ColumnId;
  rooms: ColumnRooms;
  /** Of the current row only, so that Tab goes from the list into it and then on. */
  tabIndex: 0 | -1;
}

const partPath = (row: PartRow): string => `/projects/${row.projectId}/parts/${row.id}`;
const Missing = () => <span className="soft">–</span>;

function StateCell({ row }: { row: PartRow }) {
  const { run } = row.revision;
  if (row.deletedAt !== null) {
    return (
      <span className="part-deleted" title={`Deleted ${formatMoment(row.deletedAt)}`}>
        {describeDaysLeft(row.deletedAt)}
        <span className="soft">deleted {formatDay(row.deletedAt)}</span>
      </span>
    );
  }
  if (row.state === 'measuring') {
    return (
      <span className="part-run">
        <StatusTag tone="busy" plain>
          {describeRun(run)}
        </StatusTag>
        <progress className="part-run-progress" max={1} value={run.progress} aria-label={`${row.name}: ${describeRun(run)}`} />
      </span>
    );
  }
  const { tone, word } = stateTexts[row.state];
  return (
    <StatusTag tone={tone} plain={tone === 'agreement'}>
      {word}
    </StatusTag>
  );
}

function NameCell({ row, tabIndex }: Pick<PartCellProps, 'row' | 'tabIndex'>) {
  return (
    <span className="part-name">
      <Link to={partPath(row)} title={row.name} tabIndex={tabIndex}>
        {row.name}
      </Link>
      {row.sameBytes > 0 && (
        <span className="part-same soft" title={`The same bytes are in ${countOf(row.sameBytes, 'other revision')}; they were measured once.`}>
          same file
        </span>
      )}
    </span>
  );
}

function SoundnessCell({ row: { soundness } }: { row: PartRow }) {
  if (soundness === null) return <Missing />;
  const { tone, word, words } = describeVerdict(soundness);
  return (
    <span title={words}>
      <StatusTag tone={tone} plain>
        {word}
      </StatusTag>
    </span>
  );
}

/** What a row says in one of its columns. */
export function PartCell({ row, column, rooms, tabIndex }: PartCellProps) {
  const { setting } = row.revision;
  switch (column) {
    case 'number':
      return <span className="figure soft">{row.number}</span>;
    case 'name':
      return <NameCell row={row} tabIndex={tabIndex} />;
    case 'revision':
      return <span className="figure">{row.revision.letter}</span>;
    case 'material':
      return setting.material ? <span title={setting.material.name}>{setting.material.name}</span> : setting.densityKgM3 === null ? <Missing /> : <span className="soft">density typed</span>;
    case 'unit':
      return setting.lengthUnit ? <span className="figure">{getLengthUnit(setting.lengthUnit).symbol}</span> : <Missing />;
    case 'size': {
      const size = writeRowSize(row);
      return size === null ? <Missing /> : <span className={`figure part-size part-size-${size.setting}`}>{size.text}</span>;
    }
    case 'beam':
      return row.balance ? <PictureView picture={computeSmallBeams(row.balance)} /> : <Missing />;
    case 'soundness':
      return <SoundnessCell row={row} />;
    case 'state':
      return <StateCell row={row} />;
    case 'file': {
      const path = [row.revision.folder, row.revision.fileName].filter(Boolean).join('/');
      return <span title={path}>{path}</span>;
    }
    case 'changed':
      return (
        <span className="soft" title={`${formatMoment(setting.changedAt)} by ${setting.changedBy}`}>
          {formatMoment(setting.changedAt)}
        </span>
      );
    case 'volume':
    case 'mass':
    case 'moment1':
    case 'moment2':
    case 'moment3': {
      const value = computeRowFigure(row, column);
      return value === null ? <Missing /> : <AlignedFigure value={value} digits={listDigits} behind={rooms[column].behind} />;
    }
  }
}

