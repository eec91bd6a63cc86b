import { keepDeletedPartsDays, type SettingsChange } from '@masswright/contracts';
import { createStore, type Store } from '../../../lib/store';
import { countOf } from '../../../lib/plural';
import type { ChosenParts } from './selection';

/** Something that was done to several parts and can be taken back. `about` says what a change was of: "Unit", "Material". */
export type ChangeStep =
  | { kind: 'setting'; change: SettingsChange; about: string; to: string }
  | { kind: 'deleted' | 'restored'; ids: readonly string[] };

export interface ChangeRequests {
  undo: (changeId: string) => Promise<SettingsChange>;
  remove: (parts: ChosenParts) => Promise<{ ids: string[] }>;
  restore: (parts: ChosenParts) => Promise<{ ids: string[] }>;
  /** The same may succeed in a while: the connection, and not the step, was at fault. */
  isPassing: (error: unknown) => boolean;
  describe: (error: unknown) => string;
}

export interface ChangeStepsState {
  /** What was done last, and whether that was done, taken back or done again. */
  last?: { step: ChangeStep; by: 'do' | 'undo' | 'redo' };
  canUndo: boolean;
  canRedo: boolean;
  isBusy: boolean;
  problem?: string;
}

export interface ChangeSteps extends Pick<Store<ChangeStepsState>, 'get' | 'subscribe'> {
  /** Does something and keeps it as a step. */
  take: (action: () => Promise<ChangeStep>) => Promise<void>;
  undo: () => Promise<void>;
  redo: () => Promise<void>;
  /** Puts the line about it away; it can still be undone by the key. */
  dismiss: () => void;
}

/** What was done on a list in this visit, one step behind the other; each can be taken back, and what was taken back done again. */
export function createChangeSteps(requests: ChangeRequests): ChangeSteps {
  const done: ChangeStep[] = [];
  const undone: ChangeStep[] = [];
  const store = createStore<ChangeStepsState>({ canUndo: false, canRedo: false, isBusy: false });

  const reverse = async (step: ChangeStep): Promise<ChangeStep> => {
    if (step.kind === 'setting') return { ...step, change: await requests.undo(step.change.id) };
    const move = step.kind === 'deleted' ? requests.restore : requests.remove;
    // Others may have been first with all of them.
    const { ids } = step.ids.length === 0 ? step : await move({ ids: [...step.ids] });
    return { kind: step.kind === 'deleted' ? 'restored' : 'deleted', ids };
  };
  const settle = async (by: 'do' | 'undo' | 'redo', action: () => Promise<ChangeStep>, onDone: (step: ChangeStep) => void, onRefused?: () => void): Promise<void> => {
    if (store.get().isBusy) return;
    store.set((state) => ({ ...state, isBusy: true, problem: undefined }));
    try {
      const step = await action();
      onDone(step);
      store.set({ last: { step, by }, canUndo: done.length > 0, canRedo: undone.length > 0, isBusy: false });
    } catch (error) {
      // What is refused once is refused for good, and must not stand before the steps behind it.
      if (!requests.isPassing(error)) onRefused?.();
      store.set((state) => ({ ...state, canUndo: done.length > 0, canRedo: undone.length > 0, isBusy: false, problem: requests.describe(error) }));
    }
  };
  const turn = (by: 'undo' | 'redo', from: ChangeStep[], to: ChangeStep[]): Promise<void> => {
    const step = from.at(-1);
    if (!step) return Promise.resolve();
    return settle(
      by,
      () => reverse(step),
      (reversed) => {
        from.pop();
        to.push(reversed);
      },
      () => void from.pop(),
    );
  };
  return {
    get: store.get,
    subscribe: store.subscribe,
    take: (action) =>
      settle('do', action, (step) => {
        undone.length = 0;
        done.push(step);
      }),
    undo: () => turn('undo', done, undone),
    redo: () => turn('redo', undone, done),
    dismiss: () => store.set((state) => ({ ...state, last: undefined, problem: undefined })),
  };
}

/** What was done, in a sentence. */
export function describeStep({ step, by }: NonNullable<ChangeStepsState['last']>): string {
  if (step.kind !== 'setting') {
    const parts = countOf(step.ids.length, 'part');
    return step.kind === 'deleted' ? `${parts} deleted; restorable for ${keepDeletedPartsDays} days.` : `${parts} restored.`;
  }
  const { changed, unchanged } = step.change;
  if (by === 'undo') return `${step.about} of ${countOf(changed, 'part')} put back as before.`;
  if (changed === 0 && unchanged > 0) return `${step.about} of ${countOf(unchanged, 'part')} was ${step.to} already.`;
  return `${step.about} of ${countOf(changed, 'part')} changed to ${step.to}.`;
}

/** Which parts were left as they are, and because of whom. */
export function describeLeft({ left }: SettingsChange): string {
  if (left.length === 0) return '';
  const named = left.slice(0, 3).map(({ name, changedBy }) => (changedBy === '' ? name : `${name} (${changedBy})`));
  const more = left.length > named.length ? ` and ${left.length - named.length} more` : '';
  return `Left as they are, because they were changed or deleted meanwhile: ${named.join(', ')}${more}.`;
}
