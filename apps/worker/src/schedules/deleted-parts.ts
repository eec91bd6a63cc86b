import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { keepDeletedPartsDays } from '@masswright/contracts';
import { addToOutbox, Database, findPartsToForget, forgetPart, publishEvent, recordAudit } from '@masswright/drizzle';

const atOnce = 200;

/** Forgets parts that were deleted so long ago that nobody can restore them any more, and has their files deleted. */
@Injectable()
export class DeletedParts {
  constructor(@Inject(Database) private readonly database: Database) {}

  async forget(): Promise<void> {
    const requestId = randomUUID();
    for (;;) {
      const due = await this.database.transaction({ relay: true }, (tx) => findPartsToForget(tx, keepDeletedPartsDays, atOnce));
      for (const { partId, organisationId } of due) await this.forgetOne(partId, organisationId, requestId);
      if (due.length < atOnce) return;
    }
  }

  private async forgetOne(partId: string, organisationId: string, requestId: string): Promise<void> {
    await this.database.transaction({ organisationId }, async (tx) => {
      const forgotten = await forgetPart(tx, partId, keepDeletedPartsDays);
      // Restored at the last moment, or another worker was first.
      if (forgotten === undefined) return;
      const { number, projectId, objectKeys } = forgotten;
      for (const objectKey of objectKeys) await addToOutbox(tx, { organisationId, job: 'object.delete', payload: { objectKey }, requestId });
      await recordAudit(tx, { organisationId, actorId: null, action: 'part.forget', subject: { type: 'part', id: partId }, before: { number, projectId }, requestId });
      await publishEvent(tx, { organisationId, event: { type: 'parts', projectId } });
    });
  }
}
