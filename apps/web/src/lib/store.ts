import { useSyncExternalStore } from 'react';

/** A value outside of React that components can watch. */
export interface Store<State> {
  get: () => State;
  set: (change: State | ((state: State) => State)) => void;
  subscribe: (listener: () => void) => () => void;
}

export function createStore<State>(initial: State): Store<State> {
  let state = initial;
  const listeners = new Set<() => void>();
  return {
    get: () => state,
    set: (change) => {
      const next = typeof change === 'function' ? (change as (state: State) => State)(state) : change;
      if (Object.is(next, state)) return;
      state = next;
      for (const listener of [...listeners]) listener();
    },
    subscribe: (listener) => {
      listeners.add(listener);
      return () => void listeners.delete(listener);
    },
  };
}

export function useStore<State>(store: Pick<Store<State>, 'get' | 'subscribe'>): State {
  return useSyncExternalStore(store.subscribe, store.get, store.get);
}
