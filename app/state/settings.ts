import { persist } from 'zustand/middleware';
import { createStore } from 'zustand/vanilla';

/** The machine the engineer will really run on. */
export interface Target {
  /** memory one factorization may take, bytes */
  readonly memoryBytes: number;
  /** sustained rate of dense kernels on one core, operations per second */
  readonly operationRate: number;
  /** memory bandwidth, bytes per second */
  readonly bandwidth: number;
  readonly cores: number;
  /** width of an index in the target code, bytes */
  readonly indexBytes: 4 | 8;
  /** width of a real scalar in the target code, bytes */
  readonly scalarBytes: 4 | 8;
}

/** How the factorization will be used. */
export interface Workload {
  /** factorizations with this pattern */
  readonly factorizations: number;
  /** right-hand sides for each factorization */
  readonly rightHandSides: number;
}

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
  target: {
    memoryBytes: 16 * 2 ** 30,
    operationRate: 1e10,
    bandwidth: 2e10,
    cores: 4,
    indexBytes: 4,
    scalarBytes: 8,
  },
  workload: { factorizations: 1, rightHandSides: 1 },
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
