import { z } from 'zod';
import { id, keptText, timestamp } from './common';
import { partRow, partState, partStates } from './part';
import { settingChange } from './setting';

export const partSorts = ['number', 'name', 'file', 'unit', 'material', 'size', 'volume', 'mass', 'moment1', 'moment2', 'moment3', 'state', 'changed'] as const;
export const partSort = z.enum(partSorts);
export type PartSort = z.infer<typeof partSort>;

/** Which parts of a project are meant: those whose number, name, file, folder or material holds every word of `text`, in one of `states`. */
export const partFilter = z.object({
  text: keptText().max(200, 'A search has at most 200 characters.').default(''),
  /** Names of states with commas between; '' means all. */
  states: z
    .string()
    .default('')
    .refine((list) => list === '' || list.split(',').every((name) => (partStates as readonly string[]).includes(name)), `states takes some of ${partStates.join(', ')} with commas between.`),
  /** true: the deleted parts, false: all others. */
  deleted: z.stringbool().default(false),
});
export type PartFilter = z.infer<typeof partFilter>;

export const partOrder = z.object({
  sort: partSort.default('number'),
  direction: z.enum(['ascending', 'descending']).default('ascending'),
});
export type PartOrder = z.infer<typeof partOrder>;

/** A stretch of a project's list: `limit` rows from row `offset` (0 is the first). Rows without the figure that is sorted by come last, either way. */
export const partListQuery = partFilter.extend(partOrder.shape).extend({
  offset: z.coerce.number().int().min(0).max(1_000_000).default(0),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});
export type PartListQuery = z.infer<typeof partListQuery>;

export const partList = z.object({
  items: z.array(partRow),
  /** How many rows the filter leaves. */
  total: z.number().int().nonnegative(),
  /** How many parts that match the text there are in each state, whatever states are asked for. */
  counts: z.record(partState, z.number().int().nonnegative()),
  deleted: z.number().int().nonnegative(),
});
export type PartList = z.infer<typeof partList>;

/** Columns that an export can have, in any order. What they mean, in which unit and about what, stands in the export itself. */
export const exportColumns = [
  'number', 'name', 'revision', 'file', 'sha256', 'material', 'unit', 'density', 'facets', 'size', 'volume', 'area', 'mass', 'uncertainty', 'centre', 'tensor', 'moments', 'axes', 'radii', 'soundness',
  'shells', 'state',
] as const;
export const exportColumn = z.enum(exportColumns);
export type ExportColumn = z.infer<typeof exportColumn>;
export const exportQuery = partFilter.extend(partOrder.shape).extend({
  format: z.enum(['csv', 'json']),
  /** Names of columns with commas between, for CSV; '' means all. JSON holds whole records (`exportedRecord`). */
  columns: z
    .string()
    .default('')
    .refine((list) => list === '' || list.split(',').every((name) => (exportColumns as readonly string[]).includes(name)), `columns takes some of ${exportColumns.join(', ')} with commas between.`),
});
export type ExportQuery = z.infer<typeof exportQuery>;

/**
 * Parts one by one, or all that a filter leaves but some. `expected` is how many the person saw, the exceptions taken off: where another number is meant by
 * now, the request is refused with `conflict`, so that nothing happens to parts that came after the look.
 */
export const partSelection = z.union([
  z.object({ ids: z.array(id).min(1).max(10_000) }),
  z.object({ filter: partFilter.extend({ deleted: z.boolean().default(false) }).partial(), except: z.array(id).max(10_000).default([]), expected: z.number().int().nonnegative().optional() }),
]);
export type PartSelection = z.infer<typeof partSelection>;

/** One change for many settings at once. */
export const changeSettingsRequest = z.object({
  parts: partSelection,
  change: settingChange.pick({ lengthUnit: true, densityKgM3: true, densitySpreadKgM3: true, material: true, axis: true }),
});
export type ChangeSettingsRequest = z.infer<typeof changeSettingsRequest>;

/**
 * What a bulk change did. It can be taken back once; that is a change of its own, which can be taken back in turn.
 * What somebody else has changed or deleted since is left as it is, and named.
 */
export const settingsChange = z.object({
  id,
  projectId: id,
  /** How many settings are other than before. */
  changed: z.number().int().nonnegative(),
  /** Parts whose setting was so already. */
  unchanged: z.number().int().nonnegative(),
  /** Parts that were left as they are because their setting was changed meanwhile, or because they are deleted (then `changedBy` is ''); the first 100. */
  left: z.array(z.object({ partId: id, number: z.number().int(), name: z.string(), changedBy: z.string() })),
  /** What this change took back. */
  reverses: id.nullable(),
  createdAt: timestamp,
  createdBy: z.string(),
});
export type SettingsChange = z.infer<typeof settingsChange>;

export const deletePartsRequest = z.object({ parts: partSelection });
export type DeletePartsRequest = z.infer<typeof deletePartsRequest>;
export const restorePartsRequest = z.object({ parts: partSelection });
export type RestorePartsRequest = z.infer<typeof restorePartsRequest>;
/** Which parts were deleted, or restored. */
export const movedParts = z.object({ ids: z.array(id) });
export type MovedParts = z.infer<typeof movedParts>;
/** So long a deleted part can be restored. */
export const keepDeletedPartsDays = 30;
