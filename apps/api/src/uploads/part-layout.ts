/** The storage takes at most so many parts an upload, and none but the last below 5 MiB (limits of the S3 api). */
const mostParts = 10_000;
const usualPartBytes = 8 * 1024 * 1024;
const mebibyte = 1024 * 1024;

export interface PartLayout {
  partSizeBytes: number;
  partCount: number;
}

/** Cuts a file into parts of one size, the last with the rest. An empty file has one empty part, so that it too ends in a clear answer. */
export function layOutParts(sizeBytes: number): PartLayout {
  const needed = Math.ceil(sizeBytes / mostParts);
  const partSizeBytes = Math.max(usualPartBytes, Math.ceil(needed / mebibyte) * mebibyte);
  return { partSizeBytes, partCount: countParts(sizeBytes, partSizeBytes) };
}

export function countParts(sizeBytes: number, partSizeBytes: number): number {
  return Math.max(1, Math.ceil(sizeBytes / partSizeBytes));
}

/** How many bytes a part has, by its number from 1. */
export function sizeOfPart(sizeBytes: number, partSizeBytes: number, partNumber: number): number {
  return Math.min(partSizeBytes, sizeBytes - (partNumber - 1) * partSizeBytes);
}
