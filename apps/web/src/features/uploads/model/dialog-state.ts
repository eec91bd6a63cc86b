import { createStore, useStore } from '../../../lib/store';

/** The dialog may be opened from a button, by files that are dropped on a page, or by a page without parts. */
interface DialogState {
  projectId: string;
  files: readonly File[];
}

const state = createStore<DialogState | undefined>(undefined);

export function openUploadDialog(projectId: string, files: readonly File[] = []): void {
  state.set({ projectId, files });
}

export function closeUploadDialog(): void {
  state.set(undefined);
}

export const useUploadDialog = (): DialogState | undefined => useStore(state);
export const useIsUploadDialogOpen = (): boolean => useUploadDialog() !== undefined;
