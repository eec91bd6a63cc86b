import type { PartSelection } from '@masswright/contracts';
import { findFilteredPartIds, findPartIdsOfProject, hasProject, holdParts, type HeldPart, type Transaction } from '@masswright/drizzle';
import { AppError, notFound } from '../platform/app-error';

/** As many parts as one request may change: more would hold them longer than others want to wait. */
export const mostPartsAtOnce = 10_000;

const tooMany = () => new AppError('invalid-input', `One change takes at most ${mostPartsAtOnce} parts, and this filter leaves more. Narrow it, then go on with the rest.`);

const notAsMany = (now: number, expected: number) => new AppError('conflict', `${now === 1 ? '1 part matches' : `${now} parts match`} now; you chose ${expected}. Look again.`);

/**
 * Finds the parts of a project that somebody means and holds them for the rest of the transaction. Parts that are named one by one must all be there,
 * deleted or not; a filter says itself which it means.
 *
 * @throws AppError not-found where the project or a named part is none of the organisation's; invalid-input where there are too many; conflict where
 * they are not as many as the person saw
 */
export async function selectParts(tx: Transaction, projectId: string, selection: PartSelection): Promise<HeldPart[]> {
  if (!(await hasProject(tx, projectId))) throw notFound('project');
  if ('ids' in selection) {
    const ids = [...new Set(selection.ids)];
    if ((await findPartIdsOfProject(tx, projectId, ids)).length < ids.length) throw notFound('part');
    return holdParts(tx, ids);
  }
  const { text = '', states = '', deleted = false } = selection.filter;
  const ids = await findFilteredPartIds(tx, projectId, { filter: { text, states, deleted }, except: selection.except, limit: mostPartsAtOnce });
  if (ids.length > mostPartsAtOnce) throw tooMany();
  const held = (await holdParts(tx, ids)).filter(({ deletedAt }) => (deletedAt !== null) === deleted);
  if (selection.expected !== undefined && held.length !== selection.expected) throw notAsMany(held.length, selection.expected);
  return held;
}
