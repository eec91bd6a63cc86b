import { dropLimits, hasMeshEnding } from '@masswright/contracts';
import type { DroppedFile } from '../../../lib/dropped-files';
import { formatBytes } from '../../../lib/format-bytes';
import { countOf } from '../../../lib/plural';

/**
 * Meshes by their names, and the rest. What a file is is told by its content, when it is read; but of a folder full of drawings and notes,
 * those are not sent unless a person says so.
 */
export function separateMeshes(files: readonly DroppedFile[]): { meshes: DroppedFile[]; others: DroppedFile[] } {
  return { meshes: files.filter(({ file }) => hasMeshEnding(file.name)), others: files.filter(({ file }) => !hasMeshEnding(file.name)) };
}

/** Why a drop is more than one may hold, and by how much; undefined where it isn't. */
export function describeExcess(files: readonly DroppedFile[]): string | undefined {
  const bytes = files.reduce((sum, { file }) => sum + file.size, 0);
  if (files.length > dropLimits.files) {
    return `These are ${countOf(files.length, 'file')}; one drop may hold ${dropLimits.files}, so ${files.length - dropLimits.files} are too many. Drop them in portions. Nothing was sent.`;
  }
  if (bytes > dropLimits.bytes) {
    return `These files have ${formatBytes(bytes)}; one drop may hold ${formatBytes(dropLimits.bytes)}, so ${formatBytes(bytes - dropLimits.bytes)} are too much. Drop them in portions. Nothing was sent.`;
  }
  return undefined;
}
