import { Button } from '@blueprintjs/core';
import type { Part } from '@masswright/contracts';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { formatDay, formatMoment } from '../../../lib/format-time';
import { partKey, partsKey } from '../api/keys';
import { restoreParts } from '../api/part-changes';
import { computeKeptUntil } from '../model/deleted-words';

/** Above a part that was deleted: until when it can be had back, and how. */
export function DeletedNotice({ part, deletedAt, canRestore }: { part: Part; deletedAt: string; canRestore: boolean }) {
  const client = useQueryClient();
  const restore = useMutation({
    mutationFn: () => restoreParts(part.projectId, { ids: [part.id] }),
    onSuccess: async () => {
      void client.invalidateQueries({ queryKey: partsKey(part.projectId) });
      await client.invalidateQueries({ queryKey: partKey(part.id) });
    },
  });
  const until = computeKeptUntil(deletedAt).toISOString();
  return (
    <Notice tone="doubt">
      <p>
        <b>This part is deleted</b>, since {formatMoment(deletedAt)}. It can be restored until {formatDay(until)}; it can be changed again once it is.
      </p>
      {canRestore && (
        <Button size="small" className="screen-only" loading={restore.isPending} onClick={() => restore.mutate()}>
          Restore
        </Button>
      )}
      {restore.error && <ProblemNotice error={restore.error} />}
    </Notice>
  );
}
