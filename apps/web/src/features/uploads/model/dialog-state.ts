import type { DroppedFile } from '../../../lib/dropped-files';
import { createStore, useStore } from '../../../lib/store';
import { describeExcess, separateMeshes } from './drop-rules';
import { addUploads } from './upload-queue';

/** A part whose file is to be replaced by its next revision. */
export interface Replacement {
  partId: string;
  number: number;
  name: string;
}
export type OpenReplacement = Replacement & { reason: string };

interface DialogState {
  projectId: string;
  /** Files that don't look like meshes by their names: not sent unless the person says so. */
  others: readonly DroppedFile[];
  /** Why the last drop was not taken. */
  excess?: string;
  /** What the browser could not read of the last drop. */
  unreadable: readonly string[];
  replacement?: OpenReplacement;
}

const state = createStore<DialogState | undefined>(undefined);

/** The dialog may be opened from a button, by files that are dropped on a page, by a part whose file is to be replaced, or by the tray. */
export function openUploadDialog(projectId: string, files: readonly DroppedFile[] = [], replacement?: Replacement, unreadable: readonly string[] = []): void {
  state.set({ projectId, others: [], unreadable, replacement: replacement && { ...replacement, reason: '' } });
  if (files.length > 0) takeFiles(files, unreadable);
}

/** Files for the open dialog: meshes are sent at once, what they are is asked meanwhile. */
export function takeFiles(files: readonly DroppedFile[], unreadable: readonly string[] = []): void {
  const { meshes, others } = separateMeshes(files);
  const excess = describeSurplus(meshes) ?? describeExcess(meshes);
  state.set((open) => open && { ...open, excess, unreadable, others: excess ? [] : [...open.others, ...others] });
  if (!excess) send(meshes);
}

/** The person wants the others to be sent too: what they are is told by their content. */
export function takeOthers(): void {
  const others = state.get()?.others ?? [];
  const excess = describeSurplus(others) ?? describeExcess(others);
  state.set((open) => open && { ...open, excess, others: excess ? open.others : [] });
  if (!excess) send(others);
}

/** One file replaces that of a part: of several, none is chosen for the person. */
function describeSurplus(files: readonly DroppedFile[]): string | undefined {
  if (!state.get()?.replacement || files.length < 2) return undefined;
  return `One file takes the place of a part’s file, and these are ${files.length}. Drop the one that is meant. Nothing was sent.`;
}

export function setReplacementReason(reason: string): void {
  state.set((open) => open?.replacement && { ...open, replacement: { ...open.replacement, reason } });
}

export function leaveOthersOut(): void {
  state.set((open) => open && { ...open, others: [] });
}

function send(files: readonly DroppedFile[]): void {
  const open = state.get();
  if (!open || files.length === 0) return;
  const { projectId, replacement } = open;
  const [first] = files;
  if (replacement && first) {
    addUploads(projectId, [{ ...first, decision: { as: 'revision', partId: replacement.partId, reason: replacement.reason } }]);
    state.set({ ...open, replacement: undefined });
  } else addUploads(projectId, files);
}

export function closeUploadDialog(): void {
  state.set(undefined);
}

export const useUploadDialog = (): DialogState | undefined => useStore(state);
export const useIsUploadDialogOpen = (): boolean => useUploadDialog() !== undefined;
