export type Packing = 'gzip' | 'zip' | 'tar' | 'none';

/** How a file is packed, by its first bytes (RFC 1952; PKWARE APPNOTE; POSIX ustar). */
export function packingOf(head: Uint8Array): Packing {
  if (head[0] === 0x1f && head[1] === 0x8b) return 'gzip';
  if (head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5)) return 'zip';
  const ustar = [0x75, 0x73, 0x74, 0x61, 0x72];
  if (head.length >= 262 && ustar.every((byte, k) => head[257 + k] === byte)) return 'tar';
  return 'none';
}
