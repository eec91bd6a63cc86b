import type { SettingsChange } from '@masswright/contracts';

/** What was changed, project by project, and the first failure where not all of it was: what was done can then be taken back. */
export interface DensityOutcome {
  changes: SettingsChange[];
  error?: unknown;
}

/** Each by itself, whatever became of the others. @throws the failure where nothing at all was done */
export async function changeEach<Item>(items: Iterable<Item>, work: (item: Item) => Promise<SettingsChange>): Promise<DensityOutcome> {
  const changes: SettingsChange[] = [];
  const failures: unknown[] = [];
  for (const item of items) {
    try {
      changes.push(await work(item));
    } catch (error) {
      failures.push(error);
    }
  }
  if (changes.length === 0 && failures.length > 0) throw failures[0];
  return failures.length === 0 ? { changes } : { changes, error: failures[0] };
}
