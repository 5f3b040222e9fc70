'use client';
import { createContext, useContext, useMemo, useSyncExternalStore, type ReactNode } from 'react';

/** The trial under the cursor, the chosen range (both ends in it) and the fold in focus. Indices count from 0. */
export interface TrialCursorState {
  at: number | null;
  range: readonly [number, number] | null;
  fold: number | null;
}

/** Shared by the fold strip and every plot and table of a page; moving it re-renders nothing but what asks for it. */
export interface TrialCursorStore {
  get(): TrialCursorState;
  set(change: Partial<TrialCursorState>): void;
  subscribe(listener: () => void): () => void;
}

const nothing: TrialCursorState = { at: null, range: null, fold: null };

function createStore(initial: TrialCursorState): TrialCursorStore {
  let state = initial;
  const listeners = new Set<() => void>();
  return {
    get: () => state,
    set(change) {
      const next = { ...state, ...change };
      if (next.at === state.at && next.range === state.range && next.fold === state.fold) return;
      state = next;
      for (const listener of listeners) listener();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

const Context = createContext<TrialCursorStore | null>(null);

/** Gives the page below one trial cursor. */
export function TrialCursorProvider({
  initialTrial = null,
  children,
}: {
  initialTrial?: number | null;
  children: ReactNode;
}) {
  const store = useMemo(() => createStore({ ...nothing, at: initialTrial }), [initialTrial]);
  return <Context.Provider value={store}>{children}</Context.Provider>;
}

/** The page's trial cursor store. Throws outside a provider. */
export function useTrialCursorStore(): TrialCursorStore {
  const store = useContext(Context);
  if (!store) throw new Error('a TrialCursorProvider is missing above this plot');
  return store;
}

/** One part of the cursor; re-renders when that part changes. */
export function useTrialCursor<T>(select: (state: TrialCursorState) => T): T {
  const store = useTrialCursorStore();
  return useSyncExternalStore(
    store.subscribe,
    () => select(store.get()),
    () => select(store.get()),
  );
}
