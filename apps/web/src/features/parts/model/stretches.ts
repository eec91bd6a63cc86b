/** Rows are read in stretches of so many. */
export const stretchRows = 100;

/** The stretches in which the rows from `first` to `last` lie, in a list of `total` rows; the first one always, while nothing is known. */
export function findStretches(first: number, last: number, total: number | undefined): number[] {
  const end = Math.max(0, Math.min(last, (total ?? 1) - 1));
  const start = Math.max(0, Math.min(first, end));
  const from = Math.floor(start / stretchRows);
  return Array.from({ length: Math.floor(end / stretchRows) - from + 1 }, (_, step) => from + step);
}

/** Where a row stands: in which stretch, and as which of it. */
export function placeRow(index: number): { stretch: number; place: number } {
  return { stretch: Math.floor(index / stretchRows), place: index % stretchRows };
}
