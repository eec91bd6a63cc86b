import { createHash } from 'node:crypto';
import { createIntegralsPass, createMeasurer, defaultLimits, MeshError, type IntegralsPass } from '@masswright/geometry';
import type { Measurement, MeasuringError } from '@masswright/contracts';
import { ObjectStorageError, type ObjectStorage, type ObjectStorageErrorCode } from '@masswright/storage';
import { ObjectReading } from './object-reading';

export type MeasuringStage = 'hashing' | 'reading' | 'measuring' | 'examining';

export interface MeasuringProgress {
  stage: MeasuringStage;
  bytesRead: number;
}

/** The figures of a file of which the rest is examined yet. */
export interface FirstFigures {
  sha256: Uint8Array;
  measurement: Measurement;
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

/** A smaller file is examined as soon as its figures could be told: it is read once. */
const bytesInOneStep = 2_000_000;

/** Whether a file is read once for its figures and once more to be examined. */
export const isReadTwice = ({ sizeBytes }: { sizeBytes: number }): boolean => sizeBytes > bytesInOneStep;

/**
 * Measures an object and hashes all of its bytes. A large one in two steps: its figures and whether it is closed come first (`onFigures`), and then it is read again to be
 * examined, where it is not too large for that. What is refused is hashed to its end all the same, so that the file is known again.
 */
export async function measureObject(
  storage: ObjectStorage,
  object: { objectKey: string; sizeBytes: number },
  onProgress: (progress: MeasuringProgress) => void,
  onFigures: (figures: FirstFigures) => void,
): Promise<MeasuringOutcome> {
  const reading = new ObjectReading(storage, object, onProgress);
  try {
    if (!isReadTwice(object)) return await examine(reading, object.sizeBytes, 'reading');
    const first = await integrate(reading, object.sizeBytes);
    if (first.kind !== 'measured') return first;
    const { sha256, measurement } = first;
    if (measurement.facets > defaultLimits.maximumExaminedFacets) return { kind: 'measured', sha256, measurement: withoutExamination(measurement) };
    onFigures({ sha256, measurement });
    const whole = await examine(reading, object.sizeBytes, 'examining');
    // The file was read once without a fault: what is refused now is too large for the memory that there is.
    return whole.kind === 'refused' ? { kind: 'measured', sha256, measurement: withoutExamination(measurement) } : whole;
  } catch (error) {
    if (error instanceof ObjectStorageError) return { kind: 'interrupted', code: error.code };
    throw error;
  }
}

/** What stands of a mesh that can't be examined to the end. */
export const withoutExamination = (measurement: Measurement): Measurement => ({ ...measurement, examined: 'limited' });

async function integrate(reading: ObjectReading, sizeBytes: number): Promise<MeasuringOutcome> {
  let pass: IntegralsPass = createIntegralsPass({ sizeBytes });
  for (;;) {
    const { sha256, result } = await push(reading, 'reading', pass);
    if (result instanceof MeshError) return { kind: 'refused', sha256, error: describe(result) };
    if (result.kind === 'measured') return { kind: 'measured', sha256, measurement: result.measurement };
    ({ pass } = result);
  }
}

async function examine(reading: ObjectReading, sizeBytes: number, stage: MeasuringStage): Promise<MeasuringOutcome> {
  const { sha256, result } = await push(reading, stage, createMeasurer({ sizeBytes }));
  return result instanceof MeshError ? { kind: 'refused', sha256, error: describe(result) } : { kind: 'measured', sha256, measurement: result };
}

interface Taker<Result> {
  push(chunk: Uint8Array): void;
  finish(): Result;
}

/** Pushes all bytes; after a refusal the taker is let go with all that it holds, and what comes still is only hashed. */
async function push<Result>(reading: ObjectReading, stage: MeasuringStage, taker: Taker<Result>): Promise<{ sha256: Uint8Array; result: Result | MeshError }> {
  let state: Taker<Result> | MeshError = taker;
  const go = <Step>(work: (taker: Taker<Result>) => Step): Step | MeshError => {
    if (state instanceof MeshError) return state;
    try {
      return work(state);
    } catch (error) {
      if (!(error instanceof MeshError)) throw error;
      state = error;
      return error;
    }
  };
  const sha256 = await reading.read(stage, (chunk) => void go((from) => from.push(chunk)));
  if (stage === 'reading' && !(state instanceof MeshError)) reading.tell('measuring');
  return { sha256, result: go((from) => from.finish()) };
}

function describe(error: MeshError): MeasuringError {
  return { code: error.code, message: error.message, at: error.at };
}
