import AwsS3 from '@uppy/aws-s3';
import Uppy, { type Body, type Meta, type UppyFile } from '@uppy/core';
import { choosePartsToKeep, cleanFileName, cleanFolder, type OpenUploads, type Upload } from '@masswright/contracts';
import pLimit from 'p-limit';
import { hashBlob } from '../../../lib/file-hash';
import { ConnectionError, getSentence, ProblemError } from '../../../lib/problem';
import { cancelUpload, createUpload, grantPart, listOpenUploads, readUpload } from '../api/uploads';

export interface Shipment {
  key: string;
  projectId: string;
  file: File;
  folder: string;
}

export interface TransportCallbacks {
  onBegun: (key: string) => void;
  /** `keptBytes` of them were there from an earlier try and were not sent again. */
  onSent: (key: string, bytes: number, keptBytes: number) => void;
  /** All parts are in the storage; the hashes are those of this file's parts. */
  onAllSent: (key: string, uploadId: string, partHashes: string[]) => void;
  onFailed: (key: string, problem: string) => void;
}

type OpenUpload = OpenUploads['items'][number];
type KnownUpload = Pick<Upload, 'id' | 'partCount' | 'partSizeBytes'>;

interface UnderWay {
  shipment: Shipment;
  upload?: KnownUpload;
  fileId?: string;
  /** Its upload is asked for, or is there: a pause and its end meanwhile must not ask for a second. */
  begun?: boolean;
  cancelled?: boolean;
  paused?: boolean;
  keptBytes: number;
  /** By part, computed when it is first needed: for its grant, or for comparing it with what is stored. */
  hashes: Map<number, Promise<string>>;
}

interface FileMeta extends Meta {
  key: string;
}

const uploadsCreatedAtOnce = 4;
const requestsAtOnce = 6;
const retryDelaysMs = [0, 1000, 3000, 8000];

/** The storage refuses in XML and the network in silence; either is put into words here. */
export function describeFailure(error: unknown): string {
  if (error instanceof ProblemError || error instanceof ConnectionError) return getSentence(error);
  if (error instanceof DOMException && error.name === 'NotReadableError') return 'The file on the disk changed or went away while it was sent. Drop it again.';
  const status = error instanceof Error && 'source' in error ? (error.source as { status?: number } | undefined)?.status : undefined;
  if (status) return `The storage did not take the file (status ${status}). Try again: what has arrived is kept.`;
  return 'The connection to the storage was lost. What has arrived is kept; try again to send the rest.';
}

/** What goes wrong is told to the person beside the file; the console has no use for it. */
const silence = { debug: () => undefined, warn: () => undefined, error: () => undefined };

/**
 * Sends files to the object storage in parts, each part granted by the api for its very hash; the bytes never pass through the api.
 * A file that was begun before, by name, folder and size, goes on: a part is passed over only where the storage has one of the same SHA-256.
 */
export class Transport {
  private readonly underWay = new Map<string, UnderWay>();
  private readonly partSizes = new WeakMap<object, number>();
  private readonly creating = pLimit(uploadsCreatedAtOnce);
  /** By project: what this person began and did not finish, read once and used up. */
  private readonly begunBefore = new Map<string, Promise<OpenUpload[]>>();
  private readonly uppy: Uppy<FileMeta, Body>;

  constructor(private readonly callbacks: TransportCallbacks) {
    this.uppy = new Uppy<FileMeta, Body>({ autoProceed: false, logger: silence });
    this.uppy.use(AwsS3<FileMeta, Body>, {
      limit: requestsAtOnce,
      retryDelays: retryDelaysMs,
      shouldUseMultipart: true,
      // Asked for with the file's own data, before anything else is.
      getChunkSize: (data) => this.partSizes.get(data) ?? data.size,
      createMultipartUpload: (file) => {
        const { id } = this.getUpload(file.meta.key);
        return { uploadId: id, key: id };
      },
      signPart: async (file, { partNumber, signal }) => {
        const { key } = file.meta;
        const { grants } = await grantPart(this.getUpload(key).id, partNumber, await this.hashPart(key, partNumber), signal);
        const grant = grants.find((candidate) => candidate.partNumber === partNumber);
        if (!grant) throw new Error(`The server granted no part ${partNumber}.`);
        return { method: 'PUT', url: grant.url, headers: grant.headers };
      },
      listParts: (file) => this.listKeptParts(file.meta.key),
      // A failure must not throw away what has arrived; `cancel` below does it where a person asks for it.
      abortMultipartUpload: () => undefined,
      // When the file becomes a part is for the queue to say: a person may have to decide something first.
      completeMultipartUpload: () => ({}),
    });
    this.uppy.on('upload-progress', (file, progress) => {
      if (file) this.callbacks.onSent(file.meta.key, progress.bytesUploaded || 0, this.underWay.get(file.meta.key)?.keptBytes ?? 0);
    });
    this.uppy.on('upload-error', (file, error) => {
      if (file) this.callbacks.onFailed(file.meta.key, describeFailure(error));
    });
    this.uppy.on('upload-success', (file) => {
      if (file) void this.finish(file.meta.key);
    });
  }

  /** A new drop asks anew what was begun before. */
  forgetBegun(projectId: string): void {
    this.begunBefore.delete(projectId);
  }

  send(shipment: Shipment): void {
    this.underWay.set(shipment.key, { shipment, hashes: new Map(), keptBytes: 0 });
    void this.creating(() => this.begin(shipment.key));
  }

  /** Goes on where it stopped, as far as the storage still has what was sent. */
  retry(shipment: Shipment): void {
    const entry = this.underWay.get(shipment.key);
    if (!entry?.upload || !entry.fileId || entry.cancelled) {
      this.send(shipment);
      return;
    }
    const { fileId, upload } = entry;
    readUpload(upload.id).then(
      (now) => {
        if (now.state === 'cancelled' || now.state === 'discarded') {
          this.dropFile(fileId);
          this.send(shipment);
          return;
        }
        this.callbacks.onBegun(shipment.key);
        this.setKnown(fileId, upload.id);
        this.uppy.retryUpload(fileId).catch(() => undefined);
      },
      (error: unknown) => this.callbacks.onFailed(shipment.key, describeFailure(error)),
    );
  }

  pause(key: string): void {
    const entry = this.underWay.get(key);
    if (!entry || entry.paused) return;
    entry.paused = true;
    if (entry.fileId) this.uppy.pauseResume(entry.fileId);
  }

  resume(key: string): void {
    const entry = this.underWay.get(key);
    if (!entry?.paused) return;
    entry.paused = false;
    if (entry.fileId) this.uppy.pauseResume(entry.fileId);
    else void this.creating(() => this.begin(key));
  }

  cancel(key: string): void {
    const entry = this.underWay.get(key);
    if (!entry) return;
    entry.cancelled = true;
    if (entry.fileId) this.dropFile(entry.fileId);
    // A cancel that doesn't reach the server leaves an unfinished upload, which the server sweeps away by itself.
    if (entry.upload) cancelUpload(entry.upload.id).catch(() => undefined);
    this.underWay.delete(key);
  }

  /** The file is a part now: nothing more is known about its sending. */
  forget(key: string): void {
    const fileId = this.underWay.get(key)?.fileId;
    this.underWay.delete(key);
    // Not within Uppy's own event, which still looks at the file.
    if (fileId) queueMicrotask(() => this.dropFile(fileId));
  }

  /** What the storage has of it is not this file, or is gone: the next try asks anew what is there. */
  startOver(key: string): void {
    const projectId = this.underWay.get(key)?.shipment.projectId;
    if (projectId !== undefined) this.begunBefore.delete(projectId);
    this.forget(key);
  }

  private async begin(key: string): Promise<void> {
    const entry = this.underWay.get(key);
    if (!entry || entry.cancelled || entry.paused || entry.begun) return;
    entry.begun = true;
    const { file, folder, projectId } = entry.shipment;
    const known = await this.takeBegun(entry.shipment);
    try {
      entry.upload = known ?? (await createUpload(projectId, { fileName: file.name, folder, sizeBytes: file.size }));
    } catch (error) {
      this.callbacks.onFailed(key, describeFailure(error));
      return;
    }
    if (this.isCancelled(entry)) {
      cancelUpload(entry.upload.id).catch(() => undefined);
      return;
    }
    this.callbacks.onBegun(key);
    this.partSizes.set(file, entry.upload.partSizeBytes);
    // The relative path takes part in Uppy's idea of sameness: two files of one name and size are two files to us.
    entry.fileId = this.uppy.addFile({ name: file.name, type: file.type, data: file, meta: { key, relativePath: key } });
    if (known) this.setKnown(entry.fileId, known.id);
    this.uppy.upload().catch(() => undefined);
    if (entry.paused) this.uppy.pauseResume(entry.fileId);
  }

  /** A cancel can come while the server is being asked; the compiler believes that it can't. */
  private isCancelled(entry: UnderWay): boolean {
    return entry.cancelled === true;
  }

  /** An upload of this name, folder and size that was begun before and that no other file of this page goes on with. */
  private async takeBegun({ file, folder, projectId }: Shipment): Promise<OpenUpload | undefined> {
    const asked = this.begunBefore.get(projectId) ?? listOpenUploads(projectId).then(({ items }) => items);
    this.begunBefore.set(projectId, asked);
    try {
      const open = await asked;
      const inUse = new Set([...this.underWay.values()].map(({ upload }) => upload?.id));
      const at = open.findIndex((one) => one.sizeBytes === file.size && one.fileName === cleanFileName(file.name) && one.folder === cleanFolder(folder) && !inUse.has(one.id));
      return at < 0 ? undefined : open.splice(at, 1)[0];
    } catch {
      // Then it is sent from its beginning.
      this.begunBefore.delete(projectId);
      return undefined;
    }
  }

  private setKnown(fileId: string, uploadId: string): void {
    const known: Partial<UppyFile<FileMeta, Body>> & { s3Multipart: { uploadId: string; key: string } } = { s3Multipart: { uploadId, key: uploadId } };
    this.uppy.setFileState(fileId, known);
  }

  private async listKeptParts(key: string): Promise<{ PartNumber: number; Size: number; ETag: string }[]> {
    const entry = this.getUnderWay(key);
    const { storedParts } = await readUpload(this.getUpload(key).id);
    const kept = await choosePartsToKeep(storedParts, (partNumber) => this.hashPart(key, partNumber));
    entry.keptBytes = kept.reduce((sum, { sizeBytes }) => sum + sizeBytes, 0);
    return kept.map(({ partNumber, sizeBytes, sha256 }) => ({ PartNumber: partNumber, Size: sizeBytes, ETag: sha256 }));
  }

  private hashPart(key: string, partNumber: number): Promise<string> {
    const { hashes, shipment } = this.getUnderWay(key);
    const { partSizeBytes } = this.getUpload(key);
    const known = hashes.get(partNumber);
    if (known) return known;
    const begin = (partNumber - 1) * partSizeBytes;
    const hash = hashBlob(shipment.file.slice(begin, begin + partSizeBytes));
    hashes.set(partNumber, hash);
    // A file that could not be read at this moment may be readable at the next try.
    hash.catch(() => hashes.delete(partNumber));
    return hash;
  }

  private async finish(key: string): Promise<void> {
    const entry = this.underWay.get(key);
    if (!entry?.upload) return;
    const { id, partCount } = entry.upload;
    try {
      const partHashes = await Promise.all(Array.from({ length: partCount }, (_, index) => this.hashPart(key, index + 1)));
      this.callbacks.onAllSent(key, id, partHashes);
    } catch (error) {
      this.callbacks.onFailed(key, describeFailure(error));
    }
  }

  private getUnderWay(key: string): UnderWay {
    const entry = this.underWay.get(key);
    if (!entry) throw new Error('This file is no longer being sent.');
    return entry;
  }

  private getUpload(key: string): KnownUpload {
    const { upload } = this.getUnderWay(key);
    if (!upload) throw new Error('This file has no upload yet.');
    return upload;
  }

  private dropFile(fileId: string): void {
    if (this.uppy.getFile(fileId)) this.uppy.removeFile(fileId);
  }
}
