import { Inject, Injectable } from '@nestjs/common';
import type { JobPayload } from '@masswright/jobs';
import { ObjectStorage } from '@masswright/storage';

/** Deletes an object, and what was sent of an unfinished upload of it. Deleting what is gone is no error. */
@Injectable()
export class ObjectDeletionHandler {
  constructor(@Inject(ObjectStorage) private readonly storage: ObjectStorage) {}

  async handle({ objectKey, multipartId }: JobPayload<'object.delete'>): Promise<void> {
    if (multipartId !== undefined) await this.storage.abortMultipartUpload(objectKey, multipartId);
    await this.storage.deleteObject(objectKey);
  }
}
