import { persist } from 'zustand/middleware';
import { createStore } from 'zustand/vanilla';
import { defaultTarget, defaultWorkload, type Target, type Workload } from '../workers/target.ts';

export type Theme = 'system' | 'light' | 'dark';

/** Everything the page remembers between visits; kept in this browser only, erased by `eraseSettings`. */
export interface Settings {
  readonly target: Target;
  readonly workload: Workload;
  readonly theme: Theme;
  /** columns of the ledger, in order */
  readonly columns: readonly string[];
  /** share of the height under the top line that the ledger takes, 0.2 to 0.8 */
  readonly ledgerShare: number;
}

export const defaultSettings: Settings = {
  target: defaultTarget,
  workload: defaultWorkload,
  theme: 'system',
  columns: [],
  ledgerShare: 0.46,
};

const storageKey = 'fillcast-settings';

export const settingsStore = createStore<Settings>()(persist(() => defaultSettings, { name: storageKey, version: 1 }));

/** Changes some settings. */
export function setSettings(change: Partial<Settings>): void {
  settingsStore.setState(change);
}

/** Back to the defaults, and nothing of them left in the browser. */
export function eraseSettings(): void {
  settingsStore.setState(defaultSettings);
  settingsStore.persist.clearStorage();
}

/** Puts the chosen theme on the page, now and whenever it changes. */
export function followTheme(): () => void {
  const apply = ({ theme }: Settings) => {
    if (theme === 'system') delete document.documentElement.dataset.theme;
    else document.documentElement.dataset.theme = theme;
  };
  apply(settingsStore.getState());
  return settingsStore.subscribe(apply);
}
