/*
 * What a browser asks of a mesh file before anything is measured: how large it is in its own unit, so that a person can say what that unit is. For a
 * Web Worker; every answer can be cloned on its way out. Nothing of it is ever stored: figures that are recorded come from the measurer.
 */
import type { ReadingLimits } from './limits';
import { MeshError, type MeshErrorCode, type MeshPlace } from './mesh-error';
import { createQuickReader, type QuickFigures } from './quick-reader';
import { createSilhouetteReader, type Silhouette } from './silhouette-reader';

export type { BoundingBox } from './bounding-box';
export { defaultLimits, type ReadingLimits } from './limits';
export type { MeshCompression, MeshFormat, Vector3 } from './measurement';
export { MeshError, meshErrorCodes, type MeshErrorCode, type MeshPlace } from './mesh-error';
export { createQuickReader, type QuickFigures, type QuickReader } from './quick-reader';
export { createSilhouetteReader, type AxisName, type Silhouette, type SilhouetteOptions, type SilhouetteReader } from './silhouette-reader';

/** The figures of a file; its outline is null where the file was too large for a second reading. */
export interface FileFigures extends QuickFigures {
  silhouette: Silhouette | null;
}

/** Why a file can't be measured: what the worker would say of the same bytes. */
export interface FileRefusal {
  error: { code: MeshErrorCode; message: string; at: MeshPlace | null };
}

export interface FileOptions extends Partial<ReadingLimits> {
  signal?: AbortSignal;
  /** Larger files are read once, for their figures alone. */
  silhouetteUpToBytes?: number;
  /** Cells along the longer side of the outline. */
  silhouetteCells?: number;
}

/** A second or so of reading. */
const usualSilhouetteBytes = 100_000_000;
const usualSilhouetteCells = 96;

/**
 * Reads a file of the person's disk, once for its figures and once more for its outline. A file that can't be measured gives `error`. Rejects with the
 * signal's reason when it is aborted, and with what the browser says where the file can't be read.
 */
export async function readMeshFile(file: Blob, { signal, silhouetteUpToBytes = usualSilhouetteBytes, silhouetteCells = usualSilhouetteCells, ...limits }: FileOptions = {}): Promise<FileFigures | FileRefusal> {
  const options = { ...limits, sizeBytes: file.size };
  try {
    const quick = createQuickReader(options);
    await pushAll(file, quick, signal);
    const figures = quick.finish();
    if (file.size > silhouetteUpToBytes) return { ...figures, silhouette: null };
    const outline = createSilhouetteReader({ ...options, boundingBox: figures.boundingBox, cells: silhouetteCells });
    await pushAll(file, outline, signal);
    return { ...figures, silhouette: outline.finish() };
  } catch (error) {
    if (!(error instanceof MeshError)) throw error;
    return { error: { code: error.code, message: error.message, at: error.at } };
  }
}

async function pushAll(file: Blob, reader: { push: (chunk: Uint8Array) => void }, signal: AbortSignal | undefined): Promise<void> {
  const source = file.stream().getReader();
  try {
    for (;;) {
      signal?.throwIfAborted();
      const { value } = (await source.read()) as { value?: Uint8Array };
      if (value === undefined) return;
      reader.push(value);
    }
  } finally {
    // What is left of a file that was refused or given up is not read; where the stream has ended, this does nothing.
    await source.cancel().catch(() => undefined);
  }
}
