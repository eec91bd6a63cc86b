import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { addToOutbox, closeUpload, Database, findAbandonedUploads, findUnknownKeys, recordAudit } from '@masswright/drizzle';
import { ObjectStorage } from '@masswright/storage';

/** So long may a person take to come back to an upload. */
const abandonedAfterHours = 24;

/** Sweeps what was begun and never completed: uploads that nobody came back to, and what the storage holds for none of our rows. */
@Injectable()
export class AbandonedUploads {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  async sweep(): Promise<void> {
    await this.cancelAbandoned();
    await this.abortUnknown();
  }

  private async cancelAbandoned(): Promise<void> {
    const requestId = randomUUID();
    const abandoned = await this.database.transaction({ relay: true }, (tx) => findAbandonedUploads(tx, abandonedAfterHours));
    for (const { id, organisationId, objectKey, multipartId } of abandoned) {
      await this.database.transaction({ organisationId }, async (tx) => {
        if (!(await closeUpload(tx, id, 'cancelled'))) return;
        await addToOutbox(tx, { organisationId, job: 'object.delete', payload: { objectKey, multipartId }, requestId });
        await recordAudit(tx, { organisationId, actorId: null, action: 'upload.abandon', subject: { type: 'upload', id }, requestId });
      });
    }
  }

  /** A process that died between the storage's answer and the commit leaves an upload that no row knows. */
  private async abortUnknown(): Promise<void> {
    const limit = Date.now() - abandonedAfterHours * 3_600_000;
    const old = (await this.storage.listMultipartUploads({ prefix: 'meshes/' })).filter(({ initiatedAt }) => initiatedAt !== undefined && initiatedAt.getTime() < limit);
    if (old.length === 0) return;
    const unknown = new Set(await this.database.transaction({ relay: true }, (tx) => findUnknownKeys(tx, old.map(({ key }) => key))));
    for (const { key, uploadId } of old) if (unknown.has(key)) await this.storage.abortMultipartUpload(key, uploadId);
  }
}
