import { createHash } from 'node:crypto';
import type { ObjectStorage } from '@masswright/storage';
import type { MeasuringProgress, MeasuringStage } from './measure-object';

/** A file up to this size is kept in memory between two readings. */
const keptBytes = 64_000_000;

/** Reads an object from its beginning, as often as it takes, and finds out its hash on the first time. */
export class ObjectReading {
  private sha256: Uint8Array | undefined;
  private kept: Buffer[] = [];
  private isKept = false;
  private bytesRead = 0;

  constructor(
    private readonly storage: ObjectStorage,
    private readonly object: { objectKey: string; sizeBytes: number },
    private readonly onProgress: (progress: MeasuringProgress) => void,
  ) {}

  tell(stage: MeasuringStage): void {
    this.onProgress({ stage, bytesRead: this.bytesRead });
  }

  /** @returns the hash of all bytes */
  async read(stage: MeasuringStage, take: (chunk: Uint8Array) => void): Promise<Uint8Array> {
    const hash = this.sha256 === undefined ? createHash('sha256') : undefined;
    this.bytesRead = 0;
    for await (const chunk of this.isKept ? this.kept : await this.open()) {
      hash?.update(chunk);
      this.bytesRead += chunk.length;
      if (hash !== undefined && this.object.sizeBytes <= keptBytes) this.kept.push(chunk);
      take(chunk);
      this.tell(stage);
    }
    this.isKept ||= this.object.sizeBytes <= keptBytes;
    this.sha256 ??= hash?.digest();
    if (this.sha256 === undefined) throw new Error('An object was read, and has no hash.');
    return this.sha256;
  }

  private async open(): Promise<AsyncIterable<Buffer>> {
    const { stream } = await this.storage.getObjectStream(this.object.objectKey);
    return stream as AsyncIterable<Buffer>;
  }
}
