import { createStore, useStore } from '../lib/store';

const isOpen = createStore(false);

export const openKeysDialog = (): void => isOpen.set(true);
export const closeKeysDialog = (): void => isOpen.set(false);
export const useKeysDialog = (): boolean => useStore(isOpen);
