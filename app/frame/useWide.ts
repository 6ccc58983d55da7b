import { useSyncExternalStore } from 'react';

const query = window.matchMedia('(min-width: 62rem)');

/** Whether ledger and panels fit side by side. */
export function useWide(): boolean {
  return useSyncExternalStore(
    (changed) => {
      query.addEventListener('change', changed);
      return () => query.removeEventListener('change', changed);
    },
    () => query.matches,
  );
}
