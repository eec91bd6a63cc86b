import { z } from 'zod';
import { id, timestamp } from './common';
import { partName, revisionReason } from './part';
import { densityChoice, lengthUnit } from './setting';

/** A file name as the person's disk gives it: a label, never a path. What is kept of it says `cleanFileName`. */
export const fileName = z.string().min(1, 'The file has no name.').max(1000, 'A file name has at most 1000 characters.');

/** SHA-256 of a part of a file, as 64 small hexadecimal digits. */
export const partHash = z.string().regex(/^[0-9a-f]{64}$/, 'A SHA-256 has 64 hexadecimal digits.');

export const createUploadRequest = z.object({
  fileName,
  /** Where in the dropped folder the file lies: a label, too. */
  folder: z.string().max(2000, 'The name of the folder has more than 2000 characters.').optional(),
  sizeBytes: z.number().int().min(0),
});
export type CreateUploadRequest = z.infer<typeof createUploadRequest>;

/** A file on its way to object storage, in parts that the browser sends there itself. */
export const upload = z.object({
  id,
  projectId: id,
  fileName: z.string(),
  folder: z.string(),
  sizeBytes: z.number().int(),
  state: z.enum(['open', 'stored', 'cancelled', 'discarded']),
  createdAt: timestamp,
  /** Every part has this size but the last, which holds the rest. */
  partSizeBytes: z.number().int().positive(),
  partCount: z.number().int().positive(),
  /** What has arrived so far, each with the SHA-256 that the storage checked it against; null where it was sent without. Empty once the upload is stored or cancelled. */
  storedParts: z.array(z.object({ partNumber: z.number().int(), sizeBytes: z.number().int(), sha256: partHash.nullable() })),
});
export type Upload = z.infer<typeof upload>;

/** Uploads that a person began and did not finish; what has arrived of each is said by the upload itself. */
export const openUploads = z.object({ items: z.array(upload.omit({ storedParts: true })) });
export type OpenUploads = z.infer<typeof openUploads>;

/** A grant lets in only a body of the hash that it was asked for with. */
export const grantPartsRequest = z.object({
  parts: z.array(z.object({ partNumber: z.number().int().min(1).max(10_000), sha256: partHash })).min(1).max(100),
});
export type GrantPartsRequest = z.infer<typeof grantPartsRequest>;
export const partGrants = z.object({
  grants: z.array(z.object({ partNumber: z.number().int(), url: z.string(), headers: z.record(z.string(), z.string()), expiresAt: timestamp })),
});
export type PartGrants = z.infer<typeof partGrants>;

/** What people state of a mesh when they add it; null is stated later. */
export const intakeSetting = densityChoice.extend({ lengthUnit: lengthUnit.nullable() });
export type IntakeSetting = z.infer<typeof intakeSetting>;

/** Turns a wholly sent upload into a part with its first revision, or into the next revision of one, and queues its measuring. */
export const completeUploadRequest = z.object({
  partName: partName.optional(),
  /** For a new part; a new revision takes the setting of the one before. */
  setting: intakeSetting,
  revisionOf: z.object({ partId: id, reason: revisionReason }).optional(),
  /** The hashes of all parts in order, as the sender knows them: the upload is refused where the storage has another. */
  partHashes: z.array(partHash).max(10_000).optional(),
});
export type CompleteUploadRequest = z.infer<typeof completeUploadRequest>;

export const findNameMatchesRequest = z.object({ fileNames: z.array(fileName).max(500) });
export type FindNameMatchesRequest = z.infer<typeof findNameMatchesRequest>;
/** Parts of the project whose latest revision has a file of that name, letter case left aside. */
export const nameMatches = z.object({
  matches: z.array(
    z.object({
      /** As it was asked for. */
      fileName: z.string(),
      partId: id,
      number: z.number().int(),
      name: z.string(),
      letter: z.string(),
      storedFileName: z.string(),
      folder: z.string(),
      sizeBytes: z.number().int(),
      /** Of the stored file; null until it was hashed. */
      sha256: partHash.nullable(),
      /** false: the names differ in the case of letters. */
      sameCase: z.boolean(),
    }),
  ),
});
export type NameMatches = z.infer<typeof nameMatches>;

/** What the organisation's files take in the storage, and how much they may. */
export const storageUse = z.object({ usedBytes: z.number(), limitBytes: z.number(), largestFileBytes: z.number() });
export type StorageUse = z.infer<typeof storageUse>;

/** What one drop may hold. */
export const dropLimits = { files: 500, bytes: 5_000_000_000 } as const;

// Control characters, and the marks that turn the direction of text and so can make one name look like another.
const invisible = /[\p{Cc}\u200b-\u200f\u061c\u2028-\u202e\u2060-\u2069\ufeff]/gu;
const longestFileName = 200;
const keptEnding = 40;

/**
 * The rule for names of files: what lies before the last slash of either kind is left out, so are control characters and marks of direction; composed
 * letters count as one (NFC); of more than 200 characters the first and the last 40 are kept with an ellipsis between. Nothing left makes 'unnamed'.
 */
export function cleanFileName(given: string): string {
  const base = given.split(/[/\\]/).at(-1) ?? '';
  const letters = [...base.normalize('NFC').replace(invisible, '').trim()];
  if (letters.length === 0) return 'unnamed';
  if (letters.length <= longestFileName) return letters.join('');
  return `${letters.slice(0, longestFileName - keptEnding - 1).join('')}…${letters.slice(-keptEnding).join('')}`;
}

/** How names of mesh files end. What a file is is told by its content, and by its name only where the content can't be looked at. */
export const meshFileEndings = ['stl', 'obj', 'ply', 'off', '3mf', 'glb', 'gltf'] as const;
const meshEnding = new RegExp(`\\.(${meshFileEndings.join('|')})$`, 'i');
const packedEnding = /\.gz$/i;

/** Whether a file is a mesh by its name; any may be packed with gzip. */
export const hasMeshEnding = (given: string): boolean => meshEnding.test(given.replace(packedEnding, ''));

/** The name of a file without what it says of its format and packing. */
export const dropMeshEnding = (given: string): string => cleanFileName(given).replace(packedEnding, '').replace(meshEnding, '');

/** The rule for folders: the same as for names, part by part, without `.` and `..`; of more than 400 characters the last are kept. */
export function cleanFolder(given: string): string {
  const names = given.split(/[/\\]/).map((name) => name.normalize('NFC').replace(invisible, '').trim());
  const path = names.filter((name) => name !== '' && name !== '.' && name !== '..').join('/');
  const letters = [...path];
  return letters.length <= 400 ? path : `…${letters.slice(-399).join('')}`;
}

/** Two names are the same where these are: letter case is left aside. */
export function fileNameKey(given: string): string {
  return cleanFileName(given).toLowerCase();
}
