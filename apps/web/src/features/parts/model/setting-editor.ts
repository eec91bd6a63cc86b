import type { ChangeSettingRequest, Setting, StoredSetting } from '@masswright/contracts';
import { createStore, type Store } from '../../../lib/store';
import { computeDifference, isSameSetting, pickSetting } from './setting-difference';

/** saved: the server has what is shown. waiting: about to be sent. failed: can be tried again. overtaken: someone else's setting is shown now. */
export type SavingStatus = 'saved' | 'waiting' | 'saving' | 'failed' | 'overtaken';

export interface SettingEditorState {
  /** What the page shows and computes with. */
  draft: Setting;
  /** What the server has, as far as is known here. */
  saved: StoredSetting;
  status: SavingStatus;
  /** Why saving failed, for people. */
  problem?: string;
  /** What the person had set when someone else was first. */
  mine?: Setting;
  canUndo: boolean;
  canRedo: boolean;
  /** Saving has failed and not succeeded since: leaving the page would lose what was set. */
  isAtRisk: boolean;
}

export interface SettingEditorParts {
  save: (request: ChangeSettingRequest) => Promise<StoredSetting>;
  reload: () => Promise<StoredSetting>;
  isStale: (error: unknown) => boolean;
  /** The same may succeed in a while: the connection, and not the change, was at fault. */
  isPassing: (error: unknown) => boolean;
  describe: (error: unknown) => string;
  now?: () => number;
}

export interface SettingEditor extends Pick<Store<SettingEditorState>, 'get' | 'subscribe'> {
  change: (change: Partial<Setting>) => void;
  undo: () => void;
  redo: () => void;
  retry: () => void;
  /** After someone else was first: sets again what the person had set. */
  putMineBack: () => void;
  /** Takes over what the server is known to have now, unless the person is in the middle of a change. */
  adopt: (stored: StoredSetting) => void;
  /** Sends at once what still waits, for when the page is left. */
  flush: () => void;
}

const waitMs = 400;
const firstRetryMs = 2_000;
const longestRetryMs = 60_000;
/** Changes of the same fields within this time are one change to a person, and one step of undo. */
const sameChangeMs = 1_000;

/** Holds the setting of a part while a person works on it: shown at once, saved a moment later, undone step by step. */
export function createSettingEditor(initial: StoredSetting, parts: SettingEditorParts): SettingEditor {
  const now = parts.now ?? (() => Date.now());
  const store = createStore<SettingEditorState>({ draft: pickSetting(initial), saved: initial, status: 'saved', canUndo: false, canRedo: false, isAtRisk: false });
  let steps: Setting[] = [];
  let undone: Setting[] = [];
  let lastChange = { fields: '', at: Number.NEGATIVE_INFINITY };
  let timer: ReturnType<typeof setTimeout> | undefined;
  let sending = false;
  let failures = 0;

  const update = (change: Partial<SettingEditorState>): void => store.set((state) => ({ ...state, ...change, canUndo: steps.length > 0, canRedo: undone.length > 0, isAtRisk: failures > 0 }));
  const forgetSteps = (): void => {
    steps = [];
    undone = [];
    lastChange = { fields: '', at: Number.NEGATIVE_INFINITY };
  };

  let retryTimer: ReturnType<typeof setTimeout> | undefined;
  const schedule = (): void => {
    clearTimeout(timer);
    timer = setTimeout(() => void send(), waitMs);
  };
  const scheduleRetry = (): void => {
    retryTimer = setTimeout(() => void send(), Math.min(firstRetryMs * 2 ** (failures - 1), longestRetryMs));
  };

  const takeOver = async (): Promise<void> => {
    const mine = store.get().draft;
    const stored = await parts.reload();
    failures = 0;
    forgetSteps();
    const overtaken = !isSameSetting(mine, stored);
    update({ saved: stored, draft: pickSetting(stored), status: overtaken ? 'overtaken' : 'saved', mine: overtaken ? mine : undefined, problem: undefined });
  };

  async function send(): Promise<void> {
    clearTimeout(timer);
    clearTimeout(retryTimer);
    timer = undefined;
    if (sending) return;
    const { draft, saved } = store.get();
    const difference = computeDifference(draft, saved);
    if (Object.keys(difference).length === 0) {
      failures = 0;
      update({ status: 'saved', problem: undefined });
      return;
    }
    sending = true;
    update({ status: 'saving', problem: undefined });
    try {
      const stored = await parts.save({ ...difference, version: saved.version });
      failures = 0;
      const unchanged = isSameSetting(store.get().draft, draft);
      update(unchanged ? { saved: stored, draft: pickSetting(stored), status: 'saved' } : { saved: stored, status: 'waiting' });
    } catch (error) {
      try {
        if (!parts.isStale(error)) throw error;
        await takeOver();
      } catch (reason) {
        failures += 1;
        update({ status: 'failed', problem: parts.describe(reason) });
        if (parts.isPassing(reason)) scheduleRetry();
      }
    } finally {
      sending = false;
    }
    if (store.get().status === 'waiting' && timer === undefined) void send();
  }

  const set = (draft: Setting): void => {
    update({ draft, status: sending ? 'saving' : 'waiting', mine: undefined, problem: undefined });
    schedule();
  };

  const change = (wanted: Partial<Setting>): void => {
    const { draft } = store.get();
    const next = { ...draft, ...wanted };
    if (isSameSetting(next, draft)) return;
    const fields = Object.keys(wanted).sort().join();
    const at = now();
    if (fields !== lastChange.fields || at - lastChange.at > sameChangeMs) steps.push(draft);
    undone = [];
    lastChange = { fields, at };
    set(next);
  };

  /** One step back, or forward again: what is left is kept on the other side. */
  const step = (from: Setting[], to: Setting[]): void => {
    const next = from.pop();
    if (!next) return;
    to.push(store.get().draft);
    lastChange = { fields: '', at: Number.NEGATIVE_INFINITY };
    set(next);
  };

  return {
    get: store.get,
    subscribe: store.subscribe,
    change,
    undo: () => step(steps, undone),
    redo: () => step(undone, steps),
    retry: () => {
      if (store.get().status === 'failed') void send();
    },
    putMineBack: () => {
      const { mine } = store.get();
      if (mine) change(mine);
    },
    adopt: (stored) => {
      const { saved, draft, status } = store.get();
      if (stored.version <= saved.version || sending || timer !== undefined || status === 'failed') return;
      if (!isSameSetting(draft, stored)) forgetSteps();
      update({ saved: stored, draft: pickSetting(stored) });
    },
    flush: () => {
      if (timer !== undefined || store.get().status === 'failed') void send();
    },
  };
}
