import { z } from 'zod';
import { id } from './common';
import { partName } from './part';
import { setting } from './setting';

/** A file name as the person's disk gives it: a label, never a path. */
export const fileName = z
  .string()
  .min(1, 'The file has no name.')
  .max(300, 'A file name has at most 300 characters.');

export const createUploadRequest = z.object({
  fileName,
  sizeBytes: z.number().int().min(0),
});
export type CreateUploadRequest = z.infer<typeof createUploadRequest>;

/** A file on its way to object storage, in parts that the browser sends there itself. */
export const upload = z.object({
  id,
  projectId: id,
  fileName: z.string(),
  sizeBytes: z.number().int(),
  state: z.enum(['open', 'stored', 'cancelled']),
  /** Every part has this size but the last, which holds the rest. */
  partSizeBytes: z.number().int().positive(),
  partCount: z.number().int().positive(),
  /** What has arrived so far; empty once the upload is stored or cancelled. */
  storedParts: z.array(z.object({ partNumber: z.number().int(), sizeBytes: z.number().int(), etag: z.string() })),
});
export type Upload = z.infer<typeof upload>;

export const grantPartsRequest = z.object({
  partNumbers: z.array(z.number().int().min(1).max(10_000)).min(1).max(100),
});
export type GrantPartsRequest = z.infer<typeof grantPartsRequest>;
export const partGrants = z.object({
  grants: z.array(z.object({ partNumber: z.number().int(), url: z.string(), expiresAt: z.iso.datetime() })),
});
export type PartGrants = z.infer<typeof partGrants>;

/** Turns a wholly sent upload into a part with its first revision and queues its measuring. */
export const completeUploadRequest = z.object({
  partName: partName.optional(),
  setting: setting.pick({ lengthUnit: true, densityKgM3: true }),
});
export type CompleteUploadRequest = z.infer<typeof completeUploadRequest>;
