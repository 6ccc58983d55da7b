/** Round constants: the first 32 bits of the fractional parts of the cube roots of the first 64 primes (FIPS 180-4, 4.2.2). */
const constants = new Uint32Array([
  0x428a2f98, 0x71374491, 0xb5c0fbcf, 0xe9b5dba5, 0x3956c25b, 0x59f111f1, 0x923f82a4, 0xab1c5ed5, 0xd807aa98,
  0x12835b01, 0x243185be, 0x550c7dc3, 0x72be5d74, 0x80deb1fe, 0x9bdc06a7, 0xc19bf174, 0xe49b69c1, 0xefbe4786,
  0x0fc19dc6, 0x240ca1cc, 0x2de92c6f, 0x4a7484aa, 0x5cb0a9dc, 0x76f988da, 0x983e5152, 0xa831c66d, 0xb00327c8,
  0xbf597fc7, 0xc6e00bf3, 0xd5a79147, 0x06ca6351, 0x14292967, 0x27b70a85, 0x2e1b2138, 0x4d2c6dfc, 0x53380d13,
  0x650a7354, 0x766a0abb, 0x81c2c92e, 0x92722c85, 0xa2bfe8a1, 0xa81a664b, 0xc24b8b70, 0xc76c51a3, 0xd192e819,
  0xd6990624, 0xf40e3585, 0x106aa070, 0x19a4c116, 0x1e376c08, 0x2748774c, 0x34b0bcb5, 0x391c0cb3, 0x4ed8aa4a,
  0x5b9cca4f, 0x682e6ff3, 0x748f82ee, 0x78a5636f, 0x84c87814, 0x8cc70208, 0x90befffa, 0xa4506ceb, 0xbef9a3f7,
  0xc67178f2,
]);

/** The secure hash SHA-256 (FIPS 180-4) over bytes as they come; platforms offer it only over bytes held all at once. */
export class Sha256 {
  private readonly state = Uint32Array.of(
    0x6a09e667,
    0xbb67ae85,
    0x3c6ef372,
    0xa54ff53a,
    0x510e527f,
    0x9b05688c,
    0x1f83d9ab,
    0x5be0cd19,
  );
  private readonly words = new Uint32Array(64);
  private readonly rest = new Uint8Array(64);
  private restLength = 0;
  private length = 0;

  update(bytes: Uint8Array): this {
    this.length += bytes.length;
    let at = 0;
    if (this.restLength > 0) {
      const take = Math.min(64 - this.restLength, bytes.length);
      this.rest.set(bytes.subarray(0, take), this.restLength);
      this.restLength += take;
      at = take;
      if (this.restLength < 64) return this;
      this.block(this.rest, 0);
      this.restLength = 0;
    }
    for (; at + 64 <= bytes.length; at += 64) this.block(bytes, at);
    this.rest.set(bytes.subarray(at), 0);
    this.restLength = bytes.length - at;
    return this;
  }

  /** The hash as 64 hexadecimal digits; nothing can be added afterwards. */
  hex(): string {
    const bits = this.length * 8;
    const tail = new Uint8Array(this.restLength < 56 ? 64 - this.restLength : 128 - this.restLength);
    tail[0] = 0x80;
    const view = new DataView(tail.buffer);
    view.setUint32(tail.length - 8, Math.floor(bits / 2 ** 32));
    view.setUint32(tail.length - 4, bits >>> 0);
    this.update(tail);
    return Array.from(this.state, (word) => word.toString(16).padStart(8, '0')).join('');
  }

  private block(bytes: Uint8Array, at: number): void {
    const w = this.words;
    for (let t = 0, q = at; t < 16; t++, q += 4) {
      w[t] = (bytes[q] << 24) | (bytes[q + 1] << 16) | (bytes[q + 2] << 8) | bytes[q + 3];
    }
    for (let t = 16; t < 64; t++) {
      const x = w[t - 15];
      const y = w[t - 2];
      const s0 = ((x >>> 7) | (x << 25)) ^ ((x >>> 18) | (x << 14)) ^ (x >>> 3);
      const s1 = ((y >>> 17) | (y << 15)) ^ ((y >>> 19) | (y << 13)) ^ (y >>> 10);
      w[t] = (w[t - 16] + s0 + w[t - 7] + s1) | 0;
    }
    const h = this.state;
    let a = h[0] | 0;
    let b = h[1] | 0;
    let c = h[2] | 0;
    let d = h[3] | 0;
    let e = h[4] | 0;
    let f = h[5] | 0;
    let g = h[6] | 0;
    let k = h[7] | 0;
    for (let t = 0; t < 64; t++) {
      const s1 = ((e >>> 6) | (e << 26)) ^ ((e >>> 11) | (e << 21)) ^ ((e >>> 25) | (e << 7));
      const t1 = (k + s1 + ((e & f) ^ (~e & g)) + constants[t] + w[t]) | 0;
      const s0 = ((a >>> 2) | (a << 30)) ^ ((a >>> 13) | (a << 19)) ^ ((a >>> 22) | (a << 10));
      const t2 = (s0 + ((a & b) ^ (a & c) ^ (b & c))) | 0;
      k = g;
      g = f;
      f = e;
      e = (d + t1) | 0;
      d = c;
      c = b;
      b = a;
      a = (t1 + t2) | 0;
    }
    h[0] += a;
    h[1] += b;
    h[2] += c;
    h[3] += d;
    h[4] += e;
    h[5] += f;
    h[6] += g;
    h[7] += k;
  }
}

/** The bytes under a typed array, without copying. */
function bytesOf(array: Int32Array | Float64Array): Uint8Array {
  return new Uint8Array(array.buffer, array.byteOffset, array.byteLength);
}

/** Hash of typed arrays one after the other, as little-endian bytes (as all platforms of today hold them). */
export function hashArrays(head: string, ...arrays: readonly (Int32Array | Float64Array | null)[]): string {
  const hash = new Sha256().update(new TextEncoder().encode(head));
  for (const array of arrays) if (array !== null) hash.update(bytesOf(array));
  return hash.hex();
}
