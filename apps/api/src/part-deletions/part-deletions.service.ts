import { Inject, Injectable } from '@nestjs/common';
import type { MovedParts, PartSelection } from '@masswright/contracts';
import { markPartsDeleted, publishEvent, unmarkPartsDeleted, type Transaction } from '@masswright/drizzle';
import { selectParts } from '../part-list/select-parts';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireEdit } from '../projects/project.policy';

/** Parts are deleted with a way back: for thirty days they can be restored, then the worker forgets them. */
@Injectable()
export class PartDeletionsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  /** Deleting what is deleted already is no error: the answer names those that were not. */
  delete(context: SignedInContext, projectId: string, selection: PartSelection): Promise<MovedParts> {
    return this.move(context, projectId, selection, 'part.delete', (tx, ids) => markPartsDeleted(tx, ids, context.userId));
  }

  restore(context: SignedInContext, projectId: string, selection: PartSelection): Promise<MovedParts> {
    // A filter that doesn't say so means the deleted ones, since no others can be restored.
    const meant: PartSelection = 'ids' in selection ? selection : { ...selection, filter: { ...selection.filter, deleted: true } };
    return this.move(context, projectId, meant, 'part.restore', unmarkPartsDeleted);
  }

  private move(context: SignedInContext, projectId: string, selection: PartSelection, action: string, mark: (tx: Transaction, ids: string[]) => Promise<string[]>): Promise<MovedParts> {
    const { organisationId } = context;
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const selected = await selectParts(tx, projectId, selection);
      const moved = new Set(await mark(tx, selected.map(({ id }) => id)));
      const parts = selected.filter(({ id }) => moved.has(id)).sort((a, b) => a.number - b.number);
      if (parts.length === 0) return { ids: [] };
      const ids = parts.map(({ id }) => id);
      await audit(tx, context, { action, subject: { type: 'project', id: projectId }, after: { parts: parts.map(({ id, number }) => ({ id, number })) } });
      // The projects' counts change too.
      await publishEvent(tx, { organisationId, event: { type: 'project', projectId } });
      await publishEvent(tx, { organisationId, event: { type: 'parts', projectId } });
      return { ids };
    });
  }
}
