import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { CompleteUploadRequest, Part, Setting } from '@masswright/contracts';
import { addToOutbox, closeUpload, findPart, findPartOfUpload, insertPart, insertRevision, lockPart, publishEvent, readSetting, refreshPartSummaries, takePartNumber, type Transaction, type UploadRow } from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';
import { ObjectStorage } from '@masswright/storage';
import { chooseDensity } from '../materials/choose-density';
import { readPart, requirePresent } from '../parts/stored-part';
import { AppError, notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work, type Actor } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { nameOfPart } from './name-of-part';
import { completeObject, getUpload } from './stored-upload';

/** What a mesh is set to before anything is said of it. */
const nothingStated: Setting = {
  lengthUnit: null,
  densityKgM3: null,
  densitySpreadKgM3: null,
  material: null,
  weighing: null,
  axis: { kind: 'mesh', along: 'z' },
  drive: null,
  asMade: null,
  shellDensities: [],
};

interface Addition {
  partId: string;
  reason: string;
  setting: Setting;
  settingVersion: number;
  unitStated: boolean;
  audited: { action: string; after: object };
}

/** Holds the part that an upload goes on with. @throws AppError where the project has none, or where it is deleted */
async function holdContinued(tx: Transaction, { projectId }: UploadRow, partId: string): Promise<void> {
  const held = await lockPart(tx, partId);
  if (held?.projectId !== projectId) throw notFound('part');
  requirePresent(held);
}

/** Turns wholly sent files into parts and revisions. */
@Injectable()
export class UploadCompletionService {
  constructor(
    @Inject(Work) private readonly work: Work,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  /**
   * Makes the stored file a part with its first revision, or the next revision of one, and asks for its measuring. Safe to ask for again after a lost
   * answer: the same upload gives the same part.
   */
  async complete(context: SignedInContext, uploadId: string, request: CompleteUploadRequest): Promise<Part> {
    const upload = await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const announced = await getUpload(tx, uploadId);
      // Refused before the storage makes one object of the parts: then the upload is still one that can be gone on with.
      if (announced.state === 'open' && request.revisionOf !== undefined) await holdContinued(tx, announced, request.revisionOf.partId);
      return announced;
    });
    if (upload.state === 'cancelled' || upload.state === 'discarded') throw new AppError('conflict', 'This upload was cancelled. Add the file again.');
    if (upload.state === 'open') await completeObject(this.storage, upload, request.partHashes);
    const completed = await this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      if (await closeUpload(tx, uploadId, 'stored')) return this.add(tx, context, actor, upload, request);
      const partId = await findPartOfUpload(tx, uploadId);
      if (partId !== undefined) return readPart(tx, partId, actor);
      // It was cancelled while the storage put the object together: then the object came after its deletion.
      await addToOutbox(tx, { organisationId: context.organisationId, job: 'object.delete', payload: { objectKey: upload.objectKey, multipartId: upload.multipartId }, requestId: context.requestId });
      return undefined;
    });
    if (completed === undefined) throw new AppError('conflict', 'This upload was cancelled. Add the file again.');
    return completed;
  }

  private async add(tx: Transaction, context: SignedInContext, actor: Actor, upload: UploadRow, request: CompleteUploadRequest): Promise<Part> {
    const { organisationId, userId, requestId } = context;
    const { projectId } = upload;
    const { partId, reason, setting, settingVersion, unitStated, audited } =
      request.revisionOf === undefined ? await this.addPart(tx, organisationId, upload, request) : await this.continuePart(tx, upload, request, request.revisionOf);
    const { runId, revisionId } = await insertRevision(tx, { organisationId, partId, uploadId: upload.id, reason, createdBy: userId, setting, settingVersion, unitStated });
    await addToOutbox(tx, { organisationId, job: 'measurement.run', payload: { organisationId, runId }, requestId });
    await refreshPartSummaries(tx, organisationId, [partId], summarisePart);
    await audit(tx, context, { action: audited.action, subject: { type: 'part', id: partId }, after: { ...audited.after, revisionId, setting } });
    await publishEvent(tx, { organisationId, event: { type: 'part', projectId, partId } });
    return readPart(tx, partId, actor);
  }

  private async addPart(tx: Transaction, organisationId: string, upload: UploadRow, request: CompleteUploadRequest): Promise<Addition> {
    const id = randomUUID();
    const number = await takePartNumber(tx, upload.projectId);
    const name = request.partName ?? nameOfPart(upload.fileName);
    await insertPart(tx, { id, organisationId, projectId: upload.projectId, number, name });
    const setting = await this.state(tx, nothingStated, request);
    return { partId: id, reason: '', setting, settingVersion: 1, unitStated: setting.lengthUnit !== null, audited: { action: 'part.create', after: { number, name } } };
  }

  /** A new revision takes the setting of the one before, but never its weighed mass; what was not stated there is taken from the request. */
  private async continuePart(tx: Transaction, upload: UploadRow, request: CompleteUploadRequest, { partId, reason }: NonNullable<CompleteUploadRequest['revisionOf']>): Promise<Addition> {
    await holdContinued(tx, upload, partId);
    const stored = await findPart(tx, partId);
    if (stored === undefined) throw notFound('part');
    // The weighed mass was that of another part, and the shells were those of another mesh.
    const before: Setting = { ...readSetting(stored.setting), weighing: null, shellDensities: [] };
    const asked = await this.state(tx, before, request);
    const density = before.densityKgM3 === null ? asked : before;
    const setting: Setting = {
      ...before,
      lengthUnit: before.lengthUnit ?? asked.lengthUnit,
      densityKgM3: density.densityKgM3,
      densitySpreadKgM3: density.densitySpreadKgM3,
      material: density.material,
    };
    const unitStated = before.lengthUnit === null && setting.lengthUnit !== null;
    return { partId, reason, setting, settingVersion: stored.setting.version + 1, unitStated, audited: { action: 'revision.create', after: { reason } } };
  }

  private async state(tx: Transaction, before: Setting, { setting: { lengthUnit, ...choice } }: CompleteUploadRequest): Promise<Setting> {
    return { ...before, lengthUnit, ...(await chooseDensity(tx, before, choice)) };
  }
}
