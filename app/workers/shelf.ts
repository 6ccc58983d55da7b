import type { Loaded } from '../../engine/exchange/loaded.ts';
import type { MatrixKey } from './protocol.ts';

/** The matrices a worker holds, and what it has derived from them and may need again. */
export class Shelf {
  private readonly held = new Map<MatrixKey, { loaded: Loaded; derived: Map<string, unknown> }>();

  put(key: MatrixKey, loaded: Loaded): void {
    this.held.set(key, { loaded, derived: new Map() });
  }

  drop(key: MatrixKey): void {
    this.held.delete(key);
  }

  /** The matrix under a key; a missing one is a fault of the program, not of the user. */
  get(key: MatrixKey): Loaded {
    return this.entry(key).loaded;
  }

  /** Something derived from a matrix, made once and kept as long as the matrix. */
  derive<T>(key: MatrixKey, name: string, make: (loaded: Loaded) => T): T {
    const { loaded, derived } = this.entry(key);
    if (!derived.has(name)) derived.set(name, make(loaded));
    return derived.get(name) as T;
  }

  private entry(key: MatrixKey) {
    const entry = this.held.get(key);
    if (entry === undefined) throw new Error(`matrix ${key} is not on this worker's shelf`);
    return entry;
  }
}
