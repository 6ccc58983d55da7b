/** What a file looks like by its first bytes. */
export type FileKind =
  | 'matrix-market'
  | 'harwell-boeing'
  | 'rutherford-boeing'
  | 'coordinate-text'
  | 'node-dof-table'
  | 'numbers'
  | 'labels'
  | 'gzip'
  | 'zip'
  | 'tar'
  | 'foreign'
  | 'empty';

export interface Recognised {
  readonly kind: FileKind;
  /** what it looks like, a few words for a sentence "it looks like …" */
  readonly what: string;
  /** what a dropped file probably is to be used as; by its content, then by its name */
  readonly role: 'matrix' | 'right-hand side' | 'permutation' | 'labels' | 'archive' | 'unknown';
}

/** Leading bytes of other kinds of file, from their published descriptions. */
const signatures: readonly (readonly [string, string])[] = [
  ['\x89HDF\r\n\x1a\n', 'an HDF5 container'],
  ['\x93NUMPY', 'a binary array file of a scripting library'],
  ['MATLAB 5.0 MAT-file', 'a binary workspace file'],
  ['%PDF', 'a PDF document'],
  ['\x89PNG', 'a PNG picture'],
  ['\xff\xd8\xff', 'a JPEG picture'],
  ['\x7fELF', 'an executable program'],
  ['CDF\x01', 'a netCDF container'],
  ['CDF\x02', 'a netCDF container'],
  ['SQLite format 3', 'a database'],
  ['BZh', 'a bzip2 archive'],
  ['\xfd7zXZ', 'an xz archive'],
  ['\x28\xb5\x2f\xfd', 'a zstd archive'],
  ['7z\xbc\xaf', 'a 7z archive'],
];

function ascii(bytes: Uint8Array, most: number): string {
  let text = '';
  for (let p = 0; p < Math.min(bytes.length, most); p++) text += String.fromCharCode(bytes[p]);
  return text;
}

/**
 * Recognises a file by its content; the name decides the role only where the content leaves it open.
 * @param firstBytes the first bytes, some thousands where there are as many
 */
export function recognise(firstBytes: Uint8Array, name: string): Recognised {
  if (firstBytes.length === 0) return { kind: 'empty', what: 'an empty file', role: 'unknown' };
  const text = ascii(firstBytes, 1 << 14).replace(/^\xef\xbb\xbf/, '');
  if (text.startsWith('\x1f\x8b')) return { kind: 'gzip', what: 'a gzip file', role: 'archive' };
  if (text.startsWith('PK\x03\x04') || text.startsWith('PK\x05\x06'))
    return { kind: 'zip', what: 'a zip archive', role: 'archive' };
  if (text.slice(257, 262) === 'ustar') return { kind: 'tar', what: 'a tar archive', role: 'archive' };
  for (const [start, what] of signatures) if (text.startsWith(start)) return { kind: 'foreign', what, role: 'unknown' };
  if (/^\s*%{1,2}matrixmarket/i.test(text)) return market(text, name);
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what tells a binary file
  if (/[\x00-\x08\x0e-\x1a\x1c-\x1f]/.test(text)) return { kind: 'foreign', what: 'a binary file', role: 'unknown' };
  if (/^\s*<(!doctype|html|\?xml|head|body|svg)/i.test(text)) {
    const page = /<html|<!doctype html|<head|<body/i.test(text);
    return { kind: 'foreign', what: page ? 'an HTML page (a failed download?)' : 'an XML file', role: 'unknown' };
  }
  if (/^\s*[{[]/.test(text)) return { kind: 'foreign', what: 'a JSON file', role: 'unknown' };
  return cards(text) ?? plain(text, name);
}

function market(text: string, name: string): Recognised {
  const head = text.slice(0, 4096);
  const what = 'a Matrix Market file';
  if (/\b(new-to-old|old-to-new), [01]-based/.test(head)) return { kind: 'matrix-market', what, role: 'permutation' };
  const array = /^\s*%{1,2}matrixmarket\s+matrix\s+array/i.test(head);
  const size = /(?:^|[\r\n])[ \t]*(\d+)[ \t]+(\d+)[ \t]*(?:\d+[ \t]*)?(?:[\r\n]|$)/.exec(head);
  if (!array && size !== null && size[2] === '1' && size[1] !== '1')
    return { kind: 'matrix-market', what, role: roleByName(name) ?? 'right-hand side' };
  if (array && size !== null && size[1] !== size[2])
    return { kind: 'matrix-market', what, role: roleByName(name) ?? 'right-hand side' };
  return { kind: 'matrix-market', what, role: 'matrix' };
}

/** Harwell–Boeing content: counts in the second line, a type like RSA in the third, Fortran formats in the fourth. */
function cards(text: string): Recognised | null {
  const lines = text.split(/\r\n|\n|\r/, 4);
  if (lines.length < 4 || !/^[RCPIQ][SUHZR][AE]\s+\d/i.test(lines[2]) || !/^\s*\(.*\)/.test(lines[3])) return null;
  const counts = lines[1].trim().split(/\s+/).length;
  return counts === 5
    ? { kind: 'harwell-boeing', what: 'a Harwell–Boeing file', role: 'matrix' }
    : { kind: 'rutherford-boeing', what: 'a Rutherford–Boeing file', role: 'matrix' };
}

function roleByName(name: string): Recognised['role'] | null {
  const bare = name.toLowerCase();
  if (/perm|order/.test(bare)) return 'permutation';
  if (/label|names|dofs?\b/.test(bare)) return 'labels';
  if (/rhs|_b\.|^b\.|load/.test(bare)) return 'right-hand side';
  return null;
}

function plain(text: string, name: string): Recognised {
  const lines = text.split(/\r\n|\n|\r/).filter((l) => l.trim() !== '' && !/^\s*(%|#|\/\/)/.test(l));
  if (text.length >= 1 << 14 && lines.length > 1) lines.pop();
  const number = /^[+-]?((\d+\.?\d*|\.\d+)([ed][+-]?\d+)?|nan|inf(inity)?)$/i;
  const rows = lines.slice(0, 200).map((l) => l.trim().split(/\s*[,;]\s*|\s+/));
  const start = rows.length > 1 && rows[0].some((w) => /[a-z_]/i.test(w) && !number.test(w)) ? 1 : 0;
  const body = rows.slice(start);
  const share = body.filter((r) => r.every((w) => number.test(w))).length / Math.max(1, body.length);
  if (share > 0.8) {
    const width = body[body.length - 1].length;
    const whole = (k: number) => body.every((r) => r.length <= k || /^[+-]?\d+(\.0*)?$/.test(r[k]));
    if (width === 5 && [0, 1, 2, 3].every(whole))
      return { kind: 'node-dof-table', what: 'a table of node, dof, node, dof, value', role: 'matrix' };
    if ((width === 3 || width === 4 || width === 2) && whole(0) && whole(1)) {
      return { kind: 'coordinate-text', what: 'plain coordinate text', role: roleByName(name) ?? 'matrix' };
    }
    const role = roleByName(name) ?? (width === 1 && whole(0) ? 'permutation' : 'right-hand side');
    return { kind: 'numbers', what: 'plain numbers', role };
  }
  return { kind: 'labels', what: 'lines of words', role: roleByName(name) ?? 'unknown' };
}
