import type { MatrixKey } from './protocol.ts';
import type { Stock } from './stock.ts';

/** The matrices a worker holds, and what it has derived from them and may need again. */
export class Shelf {
  private readonly held = new Map<MatrixKey, { stock: Stock; derived: Map<string, unknown> }>();

  /** Puts a matrix on the shelf; what was derived from an older one of the same key is thrown away. */
  put(key: MatrixKey, stock: Stock): void {
    this.held.set(key, { stock, derived: new Map() });
  }

  drop(key: MatrixKey): void {
    this.held.delete(key);
  }

  /** What lies under a key; a missing one is a fault of the program, not of the user. */
  get(key: MatrixKey): Stock {
    return this.entry(key).stock;
  }

  /** Something derived from a matrix, made once and kept as long as the matrix. */
  derive<T>(key: MatrixKey, name: string, make: (stock: Stock) => T): T {
    const { stock, derived } = this.entry(key);
    if (!derived.has(name)) derived.set(name, make(stock));
    return derived.get(name) as T;
  }

  private entry(key: MatrixKey) {
    const entry = this.held.get(key);
    if (entry === undefined) throw new Error(`matrix ${key} is not on this worker's shelf`);
    return entry;
  }
}
