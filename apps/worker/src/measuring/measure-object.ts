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
  | { kind: 'refused'; sha256: Uint8Array | null; error: MeasuringError }
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

/** Streams an object once: its bytes are hashed and measured as they come. */
export async function measureObject(
  storage: ObjectStorage,
  object: { objectKey: string; sizeBytes: number },
  onProgress: (progress: MeasuringProgress) => void,
): Promise<MeasuringOutcome> {
  try {
    const hash = createHash('sha256');
    const { stream } = await storage.getObjectStream(object.objectKey);
    const measurer = createMeasurer({ sizeBytes: object.sizeBytes });
    let refusal: MeshError | undefined;
    let bytesRead = 0;
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      hash.update(chunk);
      bytesRead += chunk.length;
      try {
        measurer.push(chunk);
      } catch (error) {
        if (!(error instanceof MeshError)) throw error;
        refusal = error;
        break;
      }
      onProgress({ stage: 'reading', bytesRead });
    }
    if (refusal !== undefined) return { kind: 'refused', sha256: null, error: describe(refusal) };
    onProgress({ stage: 'measuring', bytesRead });
    const sha256 = hash.digest();
    try {
      return { kind: 'measured', sha256, measurement: measurer.finish() };
    } catch (error) {
      if (!(error instanceof MeshError)) throw error;
      return { kind: 'refused', sha256, error: describe(error) };
    }
  } catch (error) {
    if (error instanceof ObjectStorageError) return { kind: 'interrupted', code: error.code };
    throw error;
  }
}

function describe(error: MeshError): MeasuringError {
  return { code: error.code, message: error.message, at: error.at };
}
