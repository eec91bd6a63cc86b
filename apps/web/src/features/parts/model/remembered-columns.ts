import { isStandard, readColumns, writeColumns, type ColumnId } from './columns';

const key = 'masswright.part-columns';

/** The columns that were chosen last in this browser; undefined where none were, or where it keeps nothing. */
export function readRememberedColumns(): readonly ColumnId[] | undefined {
  try {
    return readColumns(localStorage.getItem(key));
  } catch {
    return undefined;
  }
}

export function rememberColumns(columns: readonly ColumnId[]): void {
  try {
    if (isStandard(columns)) localStorage.removeItem(key);
    else localStorage.setItem(key, writeColumns(columns));
  } catch {
    // A browser that keeps nothing shows the usual columns on the next visit.
  }
}
