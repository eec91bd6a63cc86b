import AwsS3 from '@uppy/aws-s3';
import Uppy, { type Body, type Meta, type UppyFile } from '@uppy/core';
import type { CompleteUploadRequest, Part, Upload } from '@masswright/contracts';
import pLimit from 'p-limit';
import { ConnectionError, getSentence, ProblemError } from '../../../lib/problem';
import { cancelUpload, completeUpload, createUpload, grantPart, readUpload } from '../api/uploads';

export interface Shipment {
  key: string;
  projectId: string;
  file: File;
  setting: CompleteUploadRequest['setting'];
}

export interface TransportCallbacks {
  onBegun: (key: string) => void;
  onSent: (key: string, bytes: number) => void;
  onAllSent: (key: string) => void;
  onStored: (key: string, part: Part) => void;
  onFailed: (key: string, problem: string) => void;
}

interface UnderWay {
  shipment: Shipment;
  upload?: Upload;
  fileId?: string;
  cancelled?: boolean;
}

interface FileMeta extends Meta {
  key: string;
}

const uploadsCreatedAtOnce = 4;
const requestsAtOnce = 6;
const retryDelaysMs = [0, 1000, 3000, 8000];

/** The storage refuses in XML and the network in silence; either is put into words here. */
function describeFailure(error: unknown): string {
  if (error instanceof ProblemError || error instanceof ConnectionError) return getSentence(error);
  const status = error instanceof Error && 'source' in error ? (error.source as { status?: number } | undefined)?.status : undefined;
  if (status) return `The storage did not take the file (status ${status}). Try again.`;
  return 'The connection to the storage was lost. What has arrived is kept; try again to send the rest.';
}

/** Sends files to the object storage in parts, each part granted by the api; the bytes never pass through the api. */
export class Transport {
  private readonly underWay = new Map<string, UnderWay>();
  private readonly partSizes = new WeakMap<object, number>();
  private readonly creating = pLimit(uploadsCreatedAtOnce);
  private readonly uppy: Uppy<FileMeta, Body>;
  private readonly callbacks: TransportCallbacks;

  constructor(callbacks: TransportCallbacks) {
    this.callbacks = callbacks;
    this.uppy = new Uppy<FileMeta, Body>({ autoProceed: false });
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
        const { grants } = await grantPart(this.getUpload(file.meta.key).id, partNumber, signal);
        const grant = grants.find((candidate) => candidate.partNumber === partNumber);
        if (!grant) throw new Error(`The server granted no part ${partNumber}.`);
        return { method: 'PUT', url: grant.url };
      },
      listParts: async (file) => {
        const { storedParts } = await readUpload(this.getUpload(file.meta.key).id);
        return storedParts.map((part) => ({ PartNumber: part.partNumber, Size: part.sizeBytes, ETag: part.etag }));
      },
      // A failure must not throw away what has arrived; `cancel` below does it where a person asks for it.
      abortMultipartUpload: () => undefined,
      completeMultipartUpload: async (file, { signal }) => {
        const { key } = file.meta;
        this.callbacks.onAllSent(key);
        this.callbacks.onStored(key, await completeUpload(this.getUpload(key).id, { setting: this.getUnderWay(key).shipment.setting }, signal));
        return {};
      },
    });
    this.uppy.on('upload-progress', (file, progress) => {
      if (file) this.callbacks.onSent(file.meta.key, progress.bytesUploaded || 0);
    });
    this.uppy.on('upload-error', (file, error) => {
      if (file) this.callbacks.onFailed(file.meta.key, describeFailure(error));
    });
    this.uppy.on('upload-success', (file) => {
      if (file) this.forget(file.meta.key);
    });
  }

  send(shipment: Shipment): void {
    this.underWay.set(shipment.key, { shipment });
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
        if (now.state === 'cancelled') {
          this.dropFile(fileId);
          this.send(shipment);
          return;
        }
        this.callbacks.onBegun(shipment.key);
        const known: Partial<UppyFile<FileMeta, Body>> & { s3Multipart: { uploadId: string; key: string } } = {
          s3Multipart: { uploadId: upload.id, key: upload.id },
        };
        this.uppy.setFileState(fileId, known);
        this.uppy.retryUpload(fileId).catch(() => undefined);
      },
      (error: unknown) => this.callbacks.onFailed(shipment.key, describeFailure(error)),
    );
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

  private async begin(key: string): Promise<void> {
    const entry = this.underWay.get(key);
    if (!entry || entry.cancelled) return;
    const { file, projectId } = entry.shipment;
    try {
      entry.upload = await createUpload(projectId, { fileName: file.name, sizeBytes: file.size });
    } catch (error) {
      this.callbacks.onFailed(key, describeFailure(error));
      return;
    }
    if (entry.cancelled) {
      cancelUpload(entry.upload.id).catch(() => undefined);
      return;
    }
    this.callbacks.onBegun(key);
    this.partSizes.set(file, entry.upload.partSizeBytes);
    // The relative path takes part in Uppy's idea of sameness: two files of one name and size are two files to us.
    entry.fileId = this.uppy.addFile({ name: file.name, type: file.type, data: file, meta: { key, relativePath: key } });
    this.uppy.upload().catch(() => undefined);
  }

  private getUnderWay(key: string): UnderWay {
    const entry = this.underWay.get(key);
    if (!entry) throw new Error('This file is no longer being sent.');
    return entry;
  }

  private getUpload(key: string): Upload {
    const { upload } = this.getUnderWay(key);
    if (!upload) throw new Error('This file has no upload yet.');
    return upload;
  }

  private dropFile(fileId: string): void {
    if (this.uppy.getFile(fileId)) this.uppy.removeFile(fileId);
  }

  private forget(key: string): void {
    const fileId = this.underWay.get(key)?.fileId;
    this.underWay.delete(key);
    // Not within Uppy's own event, which still looks at the file.
    if (fileId) queueMicrotask(() => this.dropFile(fileId));
  }
}
