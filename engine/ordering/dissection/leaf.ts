/**
 * Exact minimum degree on a small leaf with its halo (Rose 1972; halo: Pellegrini, Roman & Amestoy 2000), on rows of
 * bits: a leaf of a dissection has a few hundred vertices, so the reach of a vertex fits in a few words and eliminating
 * is or-ing rows. The halo, the vertices of enclosing separators that touch the leaf, counts in every degree and is
 * never eliminated.
 */
export class LeafOrdering {
  private rows = new Int32Array(0);
  private degree = new Int32Array(0);
  private alive = new Int32Array(0);
  /** local index -> vertex of the whole graph, leaf first, halo behind */
  private member = new Int32Array(0);
  /** vertex of the whole graph -> local index, −1 elsewhere */
  private readonly localOf: Int32Array;
  private readonly pointer: Int32Array;
  private readonly neighbour: Int32Array;
  private readonly weight: Int32Array;
  private readonly uniform: boolean;
  /** Cholesky operations of the unknowns of the leaf ordered last, Σ cⱼ² */
  operations = 0;

  /** The whole graph, with vertex weights (unknowns a vertex stands for). */
  constructor(order: number, pointer: Int32Array, neighbour: Int32Array, weight: Int32Array) {
    this.pointer = pointer;
    this.neighbour = neighbour;
    this.weight = weight;
    this.localOf = new Int32Array(order).fill(-1);
    let uniform = true;
    for (let v = 0; v < order; v++) if (weight[v] !== 1) uniform = false;
    this.uniform = uniform;
  }

  /** Writes `vertices` in elimination order to `target`, from `at` on. All other neighbours are taken as halo. */
  orderInto(vertices: Int32Array, target: Int32Array, at: number): void {
    const n = vertices.length;
    const { pointer, neighbour, localOf } = this;
    let bound = n;
    for (let k = 0; k < n; k++) bound += pointer[vertices[k] + 1] - pointer[vertices[k]];
    if (this.member.length < bound) this.member = new Int32Array(2 * bound);
    const { member } = this;
    let size = n;
    for (let k = 0; k < n; k++) {
      member[k] = vertices[k];
      localOf[vertices[k]] = k;
    }
    for (let k = 0; k < n; k++) {
      for (let p = pointer[vertices[k]]; p < pointer[vertices[k] + 1]; p++) {
        const u = neighbour[p];
        if (localOf[u] >= 0) continue;
        localOf[u] = size;
        member[size++] = u;
      }
    }
    const words = (size + 31) >> 5;
    if (this.rows.length < words * n) this.rows = new Int32Array(2 * words * n);
    if (this.degree.length < n) {
      this.degree = new Int32Array(2 * n);
      this.alive = new Int32Array(2 * n);
    }
    const { rows } = this;
    rows.fill(0, 0, words * n);
    for (let k = 0; k < n; k++) {
      const row = k * words;
      for (let p = pointer[vertices[k]]; p < pointer[vertices[k] + 1]; p++) {
        const x = localOf[neighbour[p]];
        rows[row + (x >> 5)] |= 1 << (x & 31);
      }
    }
    for (let k = 0; k < size; k++) localOf[member[k]] = -1;
    for (let k = 0; k < n; k++) this.degree[k] = this.reach(k * words, words);
    this.eliminate(n, words, target, at);
  }

  private eliminate(n: number, words: number, target: Int32Array, at: number): void {
    const { rows, degree, alive, member, weight } = this;
    let operations = 0;
    let left = n;
    for (let k = 0; k < n; k++) alive[k] = k;
    while (left > 0) {
      let least = 0;
      let leastDegree = degree[alive[0]];
      for (let a = 1; a < left; a++) {
        const d = degree[alive[a]];
        if (d < leastDegree) {
          leastDegree = d;
          least = a;
        }
      }
      const v = alive[least];
      left--;
      for (let a = least; a < left; a++) alive[a] = alive[a + 1];
      target[at++] = member[v];
      let c = leastDegree + weight[member[v]];
      for (let q = weight[member[v]]; q > 0; q--, c--) operations += c * c;
      const rowOfV = v * words;
      const bitOfV = ~(1 << (v & 31));
      const wordOfV = v >> 5;
      // what stays alive is compacted; neighbours whose reach is the clique alone leave with v
      let kept = 0;
      let rest = leastDegree;
      for (let a = 0; a < left; a++) {
        const u = alive[a];
        if ((rows[rowOfV + (u >> 5)] & (1 << (u & 31))) === 0) {
          alive[kept++] = u;
          continue;
        }
        const row = u * words;
        for (let k = 0; k < words; k++) rows[row + k] |= rows[rowOfV + k];
        rows[row + wordOfV] &= bitOfV;
        rows[row + (u >> 5)] &= ~(1 << (u & 31));
        const d = this.reach(row, words);
        degree[u] = d;
        alive[kept++] = u;
      }
      left = kept;
      // mass elimination: u's reach within the clique of v
      kept = 0;
      for (let a = 0; a < left; a++) {
        const u = alive[a];
        const w = weight[member[u]];
        if ((rows[rowOfV + (u >> 5)] & (1 << (u & 31))) !== 0 && degree[u] + w === rest) {
          target[at++] = member[u];
          c = rest;
          rest -= w;
          for (let q = w; q > 0; q--, c--) operations += c * c;
          // the others lose u from their rows
          const word = u >> 5;
          const bit = ~(1 << (u & 31));
          for (let b = 0; b < left; b++) {
            const x = alive[b];
            const place = x * words + word;
            if ((rows[place] & ~bit) !== 0) {
              rows[place] &= bit;
              degree[x] -= w;
            }
          }
          degree[u] = -1;
        }
      }
      for (let a = 0; a < left; a++) if (degree[alive[a]] >= 0) alive[kept++] = alive[a];
      left = kept;
    }
    this.operations = operations;
  }

  /** Weight of the bits of a row. */
  private reach(row: number, words: number): number {
    const { rows } = this;
    let sum = 0;
    if (this.uniform) {
      for (let k = 0; k < words; k++) {
        let x = rows[row + k];
        x -= (x >>> 1) & 0x55555555;
        x = (x & 0x33333333) + ((x >>> 2) & 0x33333333);
        sum += Math.imul((x + (x >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
      }
      return sum;
    }
    const { weight, member } = this;
    for (let k = 0; k < words; k++) {
      let x = rows[row + k];
      while (x !== 0) {
        sum += weight[member[(k << 5) + 31 - Math.clz32(x & -x)]];
        x &= x - 1;
      }
    }
    return sum;
  }
}
