import { createHash } from 'node:crypto';
import { createMeasurer, MeshError } from '@masswright/geometry';
import type { Measurement, MeasuringError } from '@masswright/contracts';
import { ObjectStorageError, type ObjectStorage, type ObjectStorageErrorCode } from '@masswright/storage';

export type MeasuringStage = 'hashing' | 'reading' | 'measuring';

export interface MeasuringProgress {
  stage: MeasuringStage;
  bytesRead: number;
}

/** measured: what was found. refused: the file can't be measured, and why. interrupted: the storage failed; try again. */
export type MeasuringOutcome =
  | { kind: 'measured'; sha256: Uint8Array; measurement: Measurement }
  | { kind: 'refused'; sha256: Uint8Array; error: MeasuringError }
  | { kind: 'interrupted'; code: ObjectStorageErrorCode };

/** hashed: the hash of all bytes. interrupted: as below. */
export type HashingOutcome = { kind: 'hashed'; sha256: Uint8Array } | Extract<MeasuringOutcome, { kind: 'interrupted' }>;

/** Streams an object once for its hash alone. */
export async function hashObject(storage: ObjectStorage, { objectKey }: { objectKey: string }, onProgress: (progress: MeasuringProgress) => void): Promise<HashingOutcome> {
  try {
    const hash = createHash('sha256');
    const { stream } = await storage.getObjectStream(objectKey);
    let bytesRead = 0;
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      hash.update(chunk);
      bytesRead += chunk.length;
      onProgress({ stage: 'hashing', bytesRead });
    }
    return { kind: 'hashed', sha256: hash.digest() };
  } catch (error) {
    if (error instanceof ObjectStorageError) return { kind: 'interrupted', code: error.code };
    throw error;
  }
}

/** Streams an object once: its bytes are hashed and measured as they come. What is refused is hashed to its end all the same, so that the file is known again. */
export async function measureObject(
  storage: ObjectStorage,
  object: { objectKey: string; sizeBytes: number },
  onProgress: (progress: MeasuringProgress) => void,
): Promise<MeasuringOutcome> {
  try {
    const hash = createHash('sha256');
    const { stream } = await storage.getObjectStream(object.objectKey);
    const attempt = new MeasuringAttempt(object.sizeBytes);
    let bytesRead = 0;
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      hash.update(chunk);
      bytesRead += chunk.length;
      attempt.push(chunk);
      onProgress({ stage: 'reading', bytesRead });
    }
    if (!attempt.isRefused) onProgress({ stage: 'measuring', bytesRead });
    const sha256 = hash.digest();
    const result = attempt.finish();
    return result instanceof MeshError ? { kind: 'refused', sha256, error: describe(result) } : { kind: 'measured', sha256, measurement: result };
  } catch (error) {
    if (error instanceof ObjectStorageError) return { kind: 'interrupted', code: error.code };
    throw error;
  }
}

/** A measurer and what became of it: after a refusal it is let go with all that it holds, and what comes still is passed over. */
class MeasuringAttempt {
  private state: ReturnType<typeof createMeasurer> | MeshError;

  constructor(sizeBytes: number) {
    this.state = createMeasurer({ sizeBytes });
  }

  get isRefused(): boolean {
    return this.state instanceof MeshError;
  }

  push(chunk: Uint8Array): void {
    this.go((measurer) => measurer.push(chunk));
  }

  finish(): Measurement | MeshError {
    return this.go((measurer) => measurer.finish());
  }

  private go<Result>(work: (measurer: ReturnType<typeof createMeasurer>) => Result): Result | MeshError {
    if (this.state instanceof MeshError) return this.state;
    try {
      return work(this.state);
    } catch (error) {
      if (!(error instanceof MeshError)) throw error;
      this.state = error;
      return error;
    }
  }
}

function describe(error: MeshError): MeasuringError {
  return { code: error.code, message: error.message, at: error.at };
}
