import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import {
  cleanFileName,
  cleanFolder,
  fileNameKey,
  type CreateUploadRequest,
  type FindNameMatchesRequest,
  type GrantPartsRequest,
  type NameMatches,
  type OpenUploads,
  type PartGrants,
  type StorageUse,
  type Upload,
} from '@masswright/contracts';
import { addToOutbox, closeUpload, findParts, findPartsByFileName, hasProject, holdStoredBytes, insertUpload, listOpenUploads, sumStoredBytes, type StoredPart, type Transaction } from '@masswright/drizzle';
import { ObjectStorage } from '@masswright/storage';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { AppError, notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work, type Actor } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { formatBytes } from './format-bytes';
import { countParts, layOutParts, sizeOfPart } from './part-layout';
import { getUpload, listStoredParts } from './stored-upload';
import { presentNameMatch, presentOpenUpload, presentUpload } from './upload.presenter';

const grantSeconds = 3600;
const contentType = 'application/octet-stream';

/** Files go from the browser straight to the storage; here they are only announced and granted their parts. */
@Injectable()
export class UploadsService {
  constructor(
    @Inject(Work) private readonly work: Work,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  async create(context: SignedInContext, projectId: string, request: CreateUploadRequest): Promise<Upload> {
    const { sizeBytes } = request;
    await this.work.run(context, async (tx, actor) => {
      await this.requireProject(tx, actor, projectId);
      this.checkFileSize(sizeBytes);
      // Before the storage is asked for anything; what counts is the check below.
      this.checkRoom(await sumStoredBytes(tx, context.organisationId), sizeBytes);
    });
    const id = randomUUID();
    const objectKey = `meshes/${randomUUID()}`;
    const { partSizeBytes } = layOutParts(sizeBytes);
    const multipartId = await this.storage.createMultipartUpload(objectKey, { contentType });
    const upload = { id, projectId, fileName: cleanFileName(request.fileName), folder: cleanFolder(request.folder ?? ''), sizeBytes, partSizeBytes, objectKey, multipartId };
    try {
      return await this.work.run(context, async (tx, actor) => {
        requireEdit(actor);
        this.checkRoom(await holdStoredBytes(tx, context.organisationId), sizeBytes);
        const row = await insertUpload(tx, { ...upload, organisationId: context.organisationId, createdBy: context.userId });
        await audit(tx, context, { action: 'upload.create', subject: { type: 'upload', id }, after: { projectId, sizeBytes } });
        return presentUpload(row, []);
      });
    } catch (error) {
      // What is left of it should this fail too is swept by the worker.
      await this.storage.abortMultipartUpload(objectKey, multipartId).catch(() => undefined);
      throw error;
    }
  }

  listOpen(context: SignedInContext, projectId: string): Promise<OpenUploads> {
    return this.work.run(context, async (tx, actor) => {
      await this.requireProject(tx, actor, projectId);
      return { items: (await listOpenUploads(tx, projectId, context.userId)).map(presentOpenUpload) };
    });
  }

  async get(context: SignedInContext, uploadId: string): Promise<Upload> {
    const upload = await this.work.run(context, (tx) => getUpload(tx, uploadId));
    return presentUpload(upload, upload.state === 'open' ? await listStoredParts(this.storage, upload) : []);
  }

  async grantParts(context: SignedInContext, uploadId: string, { parts }: GrantPartsRequest): Promise<PartGrants> {
    const upload = await this.work.run(context, (tx, actor) => {
      requireEdit(actor);
      return getUpload(tx, uploadId);
    });
    if (upload.state !== 'open') throw new AppError('conflict', upload.state === 'stored' ? 'This upload is complete; it takes no more parts.' : 'This upload was cancelled. Add the file again.');
    const count = countParts(upload.sizeBytes, upload.partSizeBytes);
    const beyond = parts.find(({ partNumber }) => partNumber > count);
    if (beyond !== undefined) throw new AppError('invalid-input', `This upload has ${count} parts; there is no part ${beyond.partNumber}.`);
    const expiresAt = new Date(Date.now() + grantSeconds * 1000).toISOString();
    const grants = await Promise.all(
      parts.map(async ({ partNumber, sha256 }) => ({
        partNumber,
        ...(await this.storage.presignPart({
          key: upload.objectKey,
          uploadId: upload.multipartId,
          partNumber,
          sizeBytes: sizeOfPart(upload.sizeBytes, upload.partSizeBytes, partNumber),
          sha256,
          expiresSeconds: grantSeconds,
        })),
        expiresAt,
      })),
    );
    return { grants };
  }

  /** Cancelling twice is no error; what was sent is deleted by the worker. */
  async cancel(context: SignedInContext, uploadId: string): Promise<void> {
    await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const { state, objectKey, multipartId } = await getUpload(tx, uploadId);
      if (state === 'stored') throw new AppError('conflict', 'This file is stored already; it is a part now.');
      if (!(await closeUpload(tx, uploadId, 'cancelled'))) return;
      await addToOutbox(tx, { organisationId: context.organisationId, job: 'object.delete', payload: { objectKey, multipartId }, requestId: context.requestId });
      await audit(tx, context, { action: 'upload.cancel', subject: { type: 'upload', id: uploadId } });
    });
  }

  findNameMatches(context: SignedInContext, projectId: string, { fileNames }: FindNameMatchesRequest): Promise<NameMatches> {
    return this.work.run(context, async (tx, actor) => {
      await this.requireProject(tx, actor, projectId);
      const found = await findPartsByFileName(tx, projectId, [...new Set(fileNames.map(fileNameKey))]);
      const byKey = new Map<string, StoredPart[]>();
      for (const stored of await findParts(tx, found.map(({ partId }) => partId))) {
        const key = fileNameKey(stored.upload.fileName);
        byKey.set(key, byKey.get(key) ?? []);
        byKey.get(key)?.push(stored);
      }
      const matches = fileNames.flatMap((fileName) => (byKey.get(fileNameKey(fileName)) ?? []).map((stored) => presentNameMatch(fileName, stored)));
      return { matches };
    });
  }

  getStorageUse(context: SignedInContext): Promise<StorageUse> {
    return this.work.run(context, async (tx) => ({
      usedBytes: await sumStoredBytes(tx, context.organisationId),
      limitBytes: this.settings.ORGANISATION_MAX_BYTES,
      largestFileBytes: this.settings.UPLOAD_MAX_BYTES,
    }));
  }

  private async requireProject(tx: Transaction, actor: Actor, projectId: string): Promise<void> {
    requireEdit(actor);
    if (!(await hasProject(tx, projectId))) throw notFound('project');
  }

  private checkFileSize(sizeBytes: number): void {
    const limit = this.settings.UPLOAD_MAX_BYTES;
    if (sizeBytes <= limit) return;
    throw new AppError('too-large', `This file has ${formatBytes(sizeBytes)}; one file may have ${formatBytes(limit)}. It is ${formatBytes(sizeBytes - limit)} too large.`);
  }

  private checkRoom(usedBytes: number, sizeBytes: number): void {
    const limit = this.settings.ORGANISATION_MAX_BYTES;
    const over = usedBytes + sizeBytes - limit;
    if (over <= 0) return;
    throw new AppError(
      'quota-exceeded',
      `Your organisation's files take ${formatBytes(usedBytes)} of ${formatBytes(limit)}, and this one has ${formatBytes(sizeBytes)}: ${formatBytes(over)} too much. Deleted parts keep their room until they are forgotten after thirty days.`,
    );
  }
}
