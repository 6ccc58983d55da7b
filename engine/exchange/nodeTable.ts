import type { TripletStore } from './triplets.ts';

/** Numbers pairs of node and dof as rows: ascending by node, then by dof. */
export class NodeTable {
  private readonly keys = new Map<string, number>();
  private readonly pairs: (readonly [number, number])[] = [];

  /** A number for the pair, in the order of appearance. */
  keyOf(node: number, dof: number): number {
    const word = `${node} ${dof}`;
    const known = this.keys.get(word);
    if (known !== undefined) return known;
    this.keys.set(word, this.pairs.length);
    this.pairs.push([node, dof]);
    return this.pairs.length - 1;
  }

  /** Renumbers the entries of `store` in place, from keys to rows. */
  number(store: TripletStore): { rows: number; columns: number; labels: readonly string[] } {
    const { pairs } = this;
    const order = pairs.map((_, k) => k).sort((a, b) => pairs[a][0] - pairs[b][0] || pairs[a][1] - pairs[b][1]);
    const rowOf = new Int32Array(pairs.length);
    for (let r = 0; r < order.length; r++) rowOf[order[r]] = r;
    for (let e = 0; e < store.count; e++) {
      store.row[e] = rowOf[store.row[e]];
      store.column[e] = rowOf[store.column[e]];
    }
    const labels = order.map((k) => `node ${pairs[k][0]} dof ${pairs[k][1]}`);
    return { rows: pairs.length, columns: pairs.length, labels };
  }
}
