import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { CompleteUploadRequest, CreateUploadRequest, Part, PartGrants, Upload } from '@masswright/contracts';
import {
  addToOutbox,
  closeUpload,
  findPart,
  findPartOfUpload,
  findProject,
  findUpload,
  insertPart,
  insertUpload,
  publishEvent,
  takePartNumber,
  type Transaction,
  type UploadRow,
} from '@masswright/drizzle';
import { ObjectStorage, ObjectStorageError } from '@masswright/storage';
import { presentPart } from '../parts/part.presenter';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { AppError, notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work, type Actor } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { formatBytes } from './format-bytes';
import { countParts, layOutParts, sizeOfPart } from './part-layout';
import { nameOfPart } from './name-of-part';
import { presentUpload } from './upload.presenter';

const grantSeconds = 3600;
const contentType = 'application/octet-stream';

async function getUpload(tx: Transaction, uploadId: string): Promise<UploadRow> {
  const upload = await findUpload(tx, uploadId);
  if (upload === undefined) throw notFound('upload');
  return upload;
}

/** Files go from the browser straight to the storage; here they are only announced, granted their parts, and completed. */
@Injectable()
export class UploadsService {
  constructor(
    @Inject(Work) private readonly work: Work,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  async create(context: SignedInContext, projectId: string, request: CreateUploadRequest): Promise<Upload> {
    const { fileName, sizeBytes } = request;
    await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      if ((await findProject(tx, projectId)) === undefined) throw notFound('project');
    });
    const limit = this.settings.UPLOAD_MAX_BYTES;
    if (sizeBytes > limit) {
      throw new AppError('too-large', `This file has ${formatBytes(sizeBytes)}; one file may have ${formatBytes(limit)}. It is ${formatBytes(sizeBytes - limit)} too large.`);
    }
    const id = randomUUID();
    const objectKey = `meshes/${randomUUID()}`;
    const { partSizeBytes } = layOutParts(sizeBytes);
    const multipartId = await this.storage.createMultipartUpload(objectKey, { contentType });
    const upload: UploadRow = { id, projectId, fileName, sizeBytes, partSizeBytes, objectKey, multipartId, state: 'open' };
    await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      await insertUpload(tx, { ...upload, organisationId: context.organisationId, createdBy: context.userId });
      await audit(tx, context, { action: 'upload.create', subject: { type: 'upload', id }, after: { projectId, sizeBytes } });
    });
    return presentUpload(upload, []);
  }

  async get(context: SignedInContext, uploadId: string): Promise<Upload> {
    const upload = await this.read(context, uploadId);
    return presentUpload(upload, upload.state === 'open' ? await this.listStoredParts(upload) : []);
  }

  /** Addresses for some parts, each good for exactly its own bytes of its own upload. */
  async grantParts(context: SignedInContext, uploadId: string, partNumbers: readonly number[]): Promise<PartGrants> {
    const upload = await this.read(context, uploadId, requireEdit);
    if (upload.state !== 'open') throw new AppError('conflict', 'This upload is over. Add the file again.');
    const count = countParts(upload.sizeBytes, upload.partSizeBytes);
    const beyond = partNumbers.find((partNumber) => partNumber > count);
    if (beyond !== undefined) throw new AppError('invalid-input', `This upload has ${count} parts; there is no part ${beyond}.`);
    const expiresAt = new Date(Date.now() + grantSeconds * 1000).toISOString();
    const grants = await Promise.all(
      partNumbers.map(async (partNumber) => ({
        partNumber,
        url: await this.storage.presignPart({
          key: upload.objectKey,
          uploadId: upload.multipartId,
          partNumber,
          sizeBytes: sizeOfPart(upload.sizeBytes, upload.partSizeBytes, partNumber),
          expiresSeconds: grantSeconds,
        }),
        expiresAt,
      })),
    );
    return { grants };
  }

  /**
   * Makes the stored file a part with its first revision and asks for its measuring. Safe to ask for again after a lost answer:
   * the same upload gives the same part.
   */
  async complete(context: SignedInContext, uploadId: string, request: CompleteUploadRequest): Promise<Part> {
    const upload = await this.read(context, uploadId, requireEdit);
    if (upload.state === 'cancelled') throw new AppError('conflict', 'This upload was cancelled. Add the file again.');
    if (upload.state === 'open') await this.completeObject(upload);
    const completed = await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      if (await closeUpload(tx, uploadId, 'stored')) return this.addPart(tx, context, actor, upload, request);
      const partId = await findPartOfUpload(tx, uploadId);
      const known = partId === undefined ? undefined : await findPart(tx, partId);
      if (known !== undefined) return presentPart(known, actor);
      // It was cancelled while the storage put the object together: then the object came after its deletion.
      await this.discardObject(tx, context, upload);
      return undefined;
    });
    if (completed === undefined) throw new AppError('conflict', 'This upload was cancelled. Add the file again.');
    return completed;
  }

  /** Cancelling twice is no error; what was sent is deleted by the worker. */
  async cancel(context: SignedInContext, uploadId: string): Promise<void> {
    await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const upload = await getUpload(tx, uploadId);
      if (upload.state === 'stored') throw new AppError('conflict', 'This file is stored already; it is a part now.');
      if (!(await closeUpload(tx, uploadId, 'cancelled'))) return;
      await this.discardObject(tx, context, upload);
      await audit(tx, context, { action: 'upload.cancel', subject: { type: 'upload', id: uploadId } });
    });
  }

  private discardObject(tx: Transaction, { organisationId, requestId }: SignedInContext, { objectKey, multipartId }: UploadRow): Promise<void> {
    return addToOutbox(tx, { organisationId, job: 'object.delete', payload: { objectKey, multipartId }, requestId });
  }

  private async addPart(tx: Transaction, context: SignedInContext, actor: Actor, upload: UploadRow, request: CompleteUploadRequest): Promise<Part> {
    const { organisationId, requestId } = context;
    const { projectId } = upload;
    const partId = randomUUID();
    const number = await takePartNumber(tx, projectId);
    const name = request.partName ?? nameOfPart(upload.fileName);
    const { runId, revisionId } = await insertPart(tx, {
      organisationId,
      projectId,
      partId,
      number,
      name,
      uploadId: upload.id,
      createdBy: context.userId,
      setting: { ...request.setting, axis: { kind: 'mesh', along: 'z' } },
    });
    await addToOutbox(tx, { organisationId, job: 'measurement.run', payload: { organisationId, runId }, requestId });
    await audit(tx, context, { action: 'part.create', subject: { type: 'part', id: partId }, after: { number, name, revisionId, ...request.setting } });
    await publishEvent(tx, { organisationId, event: { type: 'part', projectId, partId } });
    const stored = await findPart(tx, partId);
    if (stored === undefined) throw new Error('A part vanished while it was made.');
    return presentPart(stored, actor);
  }

  private async completeObject(upload: UploadRow): Promise<void> {
    const { objectKey, multipartId, sizeBytes } = upload;
    try {
      const parts = await this.storage.listParts(objectKey, multipartId);
      const arrived = parts.reduce((sum, part) => sum + part.sizeBytes, 0);
      if (arrived !== sizeBytes || parts.length !== countParts(sizeBytes, upload.partSizeBytes)) {
        throw new AppError('upload-incomplete', `${formatBytes(arrived)} of ${formatBytes(sizeBytes)} have arrived. Send the missing parts, then complete the upload.`);
      }
      await this.storage.completeMultipartUpload(objectKey, multipartId, parts);
    } catch (error) {
      // An earlier request may have completed it and died, or be completing it at this moment; then the object is there.
      if (!(error instanceof ObjectStorageError)) throw error;
      if (error.code === 'invalid-parts') {
        throw new AppError('upload-incomplete', 'A part changed while the upload was completed. Complete it again.', {}, { cause: error });
      }
      if (error.code !== 'no-such-upload') throw error;
    }
    const object = await this.storage.headObject(objectKey);
    if (object?.sizeBytes !== sizeBytes) {
      throw new AppError('upload-incomplete', 'The stored file is not as long as the one that was announced. Add the file again.');
    }
  }

  private async listStoredParts(upload: UploadRow) {
    try {
      return await this.storage.listParts(upload.objectKey, upload.multipartId);
    } catch (error) {
      if (error instanceof ObjectStorageError && error.code === 'no-such-upload') return [];
      throw error;
    }
  }

  private read(context: SignedInContext, uploadId: string, require: (actor: Actor) => void = () => undefined): Promise<UploadRow> {
    return this.work.run(context, async (tx, actor) => {
      require(actor);
      return getUpload(tx, uploadId);
    });
  }
}
