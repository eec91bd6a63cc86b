/** The six units in which mesh files are drawn. */
export const lengthUnits = ['micron', 'mm', 'cm', 'm', 'inch', 'foot'] as const;
export type LengthUnit = (typeof lengthUnits)[number];
