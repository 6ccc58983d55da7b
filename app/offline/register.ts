import { createStore } from 'zustand/vanilla';

/** Whether the whole page is kept in this browser and works without a network. */
export const offlineStore = createStore<{ readonly state: 'unknown' | 'keeping' | 'ready' | 'impossible' }>()(() => ({
  state: 'unknown',
}));

/** Registers the service worker of the built page and follows it. In development there is none. */
export function watchOffline(): void {
  if (!import.meta.env.PROD || !('serviceWorker' in navigator)) {
    offlineStore.setState({ state: 'impossible' });
    return;
  }
  offlineStore.setState({ state: 'keeping' });
  navigator.serviceWorker
    .register('./service-worker.js')
    .then(() => navigator.serviceWorker.ready)
    .then(() => offlineStore.setState({ state: 'ready' }))
    .catch(() => offlineStore.setState({ state: 'impossible' }));
}
