import { memo } from 'react';
import { formatCount } from '@masswright/units';
import { MenuButton } from '../../../components/menu-button';
import { chooseExportColumns } from '../model/columns';
import { writeQuery, type ListView } from '../model/list-address';

/** Saves what the filter leaves, in the order that is shown: as a table with the columns that are shown, or as whole records. */
export const ExportMenu = memo(function ExportMenu({ projectId, view, total }: { projectId: string; view: ListView; total: number }) {
  const address = (format: 'csv' | 'json'): string => {
    const query = writeQuery(view);
    query.set('format', format);
    if (format === 'csv') query.set('columns', chooseExportColumns(view.columns).join());
    return `/api/v1/projects/${projectId}/parts/export?${query.toString()}`;
  };
  const rows = `${formatCount(total)} ${total === 1 ? 'row' : 'rows'}`;
  return (
    <MenuButton
      label="Export"
      spoken="Export what is listed"
      disabled={total === 0}
      items={[
        { label: 'Table, CSV', note: `${rows}, the columns shown`, download: address('csv') },
        { label: 'Records, JSON', note: `${rows}, all figures`, download: address('json') },
      ]}
    />
  );
});
