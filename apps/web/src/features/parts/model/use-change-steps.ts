import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { getSentence, isWorthAnotherTry } from '../../../lib/problem';
import { useStore } from '../../../lib/store';
import { partsKey } from '../api/keys';
import { deleteParts, restoreParts, undoSettingsChange } from '../api/part-changes';
import { createChangeSteps, type ChangeSteps, type ChangeStepsState } from './change-steps';
import { findStep } from '../../../lib/undo-keys';

/** What was changed is read anew: the list, and pages of parts that were open before. */
async function readAnew<Answer>(client: QueryClient, projectId: string, answer: Promise<Answer>): Promise<Answer> {
  const done = await answer;
  void client.invalidateQueries({ queryKey: ['part'] });
  await client.invalidateQueries({ queryKey: partsKey(projectId) });
  return done;
}

/** The steps of one project's list, for as long as its page is open. */
export function useChangeSteps(projectId: string): { steps: ChangeSteps; state: ChangeStepsState } {
  const client = useQueryClient();
  const [steps] = useState(() => {
    const created = createChangeSteps({
      undo: (changeId) => readAnew(client, projectId, undoSettingsChange(changeId)),
      remove: (parts) => readAnew(client, projectId, deleteParts(projectId, parts)),
      restore: (parts) => readAnew(client, projectId, restoreParts(projectId, parts)),
      isPassing: isWorthAnotherTry,
      describe: getSentence,
    });
    return { ...created, take: (action: Parameters<ChangeSteps['take']>[0]) => created.take(() => readAnew(client, projectId, action())) };
  });
  useEffect(() => {
    const turn = (event: KeyboardEvent): void => {
      const step = findStep(event);
      if (!step) return;
      event.preventDefault();
      void steps[step]();
    };
    document.addEventListener('keydown', turn);
    return () => document.removeEventListener('keydown', turn);
  }, [steps]);
  return { steps, state: useStore(steps) };
}
