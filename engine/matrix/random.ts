/**
 * The one source of chance: a small seeded generator (integers and multiplications only, so the same everywhere).
 * Lehmer's generator: Park & Miller 1988, multiplier 48271 (the 1993 recommendation), modulus 2³¹ − 1.
 */
export class Random {
  private state: number;

  /** `seed`: any integer; mapped into 1 … 2³¹ − 2. */
  constructor(seed: number) {
    const m = 2147483646;
    this.state = ((Math.trunc(seed) % m) + m) % m || 1;
  }

  /** Next raw integer, 1 … 2³¹ − 2. The product stays below 2⁵³, so the remainder is exact. */
  integer(): number {
    this.state = (this.state * 48271) % 2147483647;
    return this.state;
  }

  /** Uniform in (0, 1). */
  next(): number {
    return this.integer() / 2147483647;
  }

  /** Uniform integer in 0 … n − 1. */
  below(n: number): number {
    return Math.floor(this.next() * n);
  }

  /** Fisher–Yates, in place (Durstenfeld 1964). */
  shuffleInPlace(a: Int32Array): Int32Array {
    for (let i = a.length - 1; i > 0; i--) {
      const j = this.below(i + 1);
      const t = a[i];
      a[i] = a[j];
      a[j] = t;
    }
    return a;
  }
}
