import { z } from 'zod';
import { id, keptText, timestamp } from './common';
import { densityKgM3, densitySpreadKgM3 } from './setting';

export const materialName = keptText().trim().min(1, 'Give the material a name.').max(120, 'A name has at most 120 characters.');
/** Families under which materials are listed. */
export const materialGroups = ['aluminium', 'steel', 'copper', 'titanium', 'other-metal', 'polymer', 'elastomer', 'composite', 'wood', 'glass-ceramic', 'other'] as const;
export const materialGroup = z.enum(materialGroups);
export type MaterialGroup = z.infer<typeof materialGroup>;
/** The families in words, in the order in which they are listed. A table of materials may name them by these, too. */
export const materialGroupNames: Record<MaterialGroup, string> = {
  aluminium: 'Aluminium',
  steel: 'Iron and steel',
  copper: 'Copper and its alloys',
  titanium: 'Titanium',
  'other-metal': 'Other metals',
  polymer: 'Polymers',
  elastomer: 'Elastomers',
  composite: 'Composites',
  wood: 'Wood',
  'glass-ceramic': 'Glass, ceramics and stone',
  other: 'Other',
};
/** source: the source of the density states the spread too. judgement: nobody does, and it is ours or the organisation's estimate. */
export const spreadBasis = z.enum(['source', 'judgement']);
export type SpreadBasis = z.infer<typeof spreadBasis>;

const materialFields = z.object({
  name: materialName,
  group: materialGroup,
  densityKgM3,
  /** Half the width of the interval within which the density lies. */
  densitySpreadKgM3,
  spreadBasis,
  /** Where the density comes from, in words. */
  source: keptText().trim().max(300, 'A source has at most 300 characters.'),
});

/** starter: of the library that every installation has; can't be changed. own: of the organisation. */
export const material = materialFields.extend({
  id: z.string(),
  origin: z.enum(['starter', 'own']),
  /** Counts the changes of an own material; 1 for those of the starter library. */
  version: z.number().int().positive(),
  archivedAt: timestamp.nullable(),
  /** Parts whose latest revision is set to it, deleted ones left out. */
  usedByParts: z.number().int().nonnegative(),
  can: z.object({ edit: z.boolean() }),
});
export type Material = z.infer<typeof material>;

export const materialList = z.object({ items: z.array(material), can: z.object({ create: z.boolean() }) });
export type MaterialList = z.infer<typeof materialList>;

export const materialListQuery = z.object({
  /** Every word of it must be in the name, the group or the source. */
  text: keptText().max(200, 'A search has at most 200 characters.').default(''),
  /** true: archived ones too. */
  archived: z.stringbool().default(false),
});
export type MaterialListQuery = z.infer<typeof materialListQuery>;

export const createMaterialRequest = materialFields;
export type CreateMaterialRequest = z.infer<typeof createMaterialRequest>;
export const changeMaterialRequest = materialFields.partial().extend({ version: z.number().int().positive(), archived: z.boolean().optional() });
export type ChangeMaterialRequest = z.infer<typeof changeMaterialRequest>;

/** A part that is set to a material, and what the material's present density would make of it. */
export const materialUse = z.object({
  partId: id,
  projectId: id,
  projectName: z.string(),
  number: z.number().int().positive(),
  name: z.string(),
  letter: z.string(),
  /** The density that the setting was made with. */
  densityKgM3: z.number(),
  massKg: z.number().nullable(),
  /** With the material's present density; null where there is no mass, or where a weighing sets it. */
  massAtPresentDensityKg: z.number().nullable(),
});
export type MaterialUse = z.infer<typeof materialUse>;
/** At most 500 parts, by project and number; `total` counts all. */
export const materialUses = z.object({ items: z.array(materialUse), total: z.number().int().nonnegative() });
export type MaterialUses = z.infer<typeof materialUses>;

export const importMaterialsRequest = z.object({
  csv: z.string().max(2_000_000, 'The file has more than 2 000 000 characters.'),
  /** true: say what would happen and change nothing. */
  rehearse: z.boolean(),
});
export type ImportMaterialsRequest = z.infer<typeof importMaterialsRequest>;
/** Rows are numbered as in the file, the header being row 1. Rows with an error are left out; the others are taken. */
export const importMaterialsAnswer = z.object({
  added: z.number().int(),
  changed: z.number().int(),
  unchanged: z.number().int(),
  errors: z.array(z.object({ row: z.number().int(), column: z.string().nullable(), message: z.string() })),
});
export type ImportMaterialsAnswer = z.infer<typeof importMaterialsAnswer>;
