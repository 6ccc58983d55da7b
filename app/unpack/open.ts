import type { ByteSource } from '../../engine/exchange/source.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { packingOf } from './packing.ts';
import { chunksOf, headOf, type Member, type RawFile, streamOf, watched } from './raw.ts';
import { tarMember, tarMembers } from './tar.ts';
import { zipMember, zipMembers } from './zip.ts';

export { type Packing, packingOf } from './packing.ts';
export { blobFile, type Member, type RawFile } from './raw.ts';

/** An archive may unpack to at most so many times its size, once it passes `harmless` bytes: more is taken for an attack. */
export const mostExpansion = 1100;
const harmless = 2 ** 30;
/** archives in archives are opened to this depth */
const deepest = 4;

/** The bytes of a gzip file, unpacked. */
async function* gunzipped(packed: RawFile): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  let out = 0;
  try {
    const chunks =
      packed.gunzipped?.(() => {}) ?? chunksOf(packed.stream().pipeThrough(new DecompressionStream('gzip')));
    for await (const chunk of chunks) {
      out += chunk.length;
      yield chunk as Uint8Array<ArrayBuffer>;
    }
  } catch (error) {
    if (error instanceof Fault) throw error;
    throw new Fault(
      'input',
      'gzip-broken',
      `${packed.name}, byte ${out} after unpacking: the gzip data are damaged or cut off; expected a complete gzip file. Fetch the file again.`,
      { file: packed.name, byteOffset: out },
    );
  }
}

/** Stops a stream that unpacks to more than any matrix does. `packedSize`: bytes of the outermost file. */
async function* guarded(
  name: string,
  packedSize: number,
  free: number,
  chunks: AsyncGenerator<Uint8Array<ArrayBuffer>>,
): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  let out = 0;
  for await (const chunk of chunks) {
    out += chunk.length;
    if (out > free && out > mostExpansion * packedSize) {
      throw new Fault(
        'input',
        'expansion-too-large',
        `${name}, byte ${out} after unpacking: it unpacks to more than ${mostExpansion} times its size, which no matrix does; expected an ordinary archive.`,
        { file: name, byteOffset: out },
      );
    }
    yield chunk;
  }
}

/** A file that comes out of another one. */
interface Unpacked extends RawFile {
  chunks(): AsyncGenerator<Uint8Array<ArrayBuffer>>;
}

function unpackedFile(name: string, chunks: () => AsyncGenerator<Uint8Array<ArrayBuffer>>): Unpacked {
  const stream = () => streamOf(chunks());
  return { name, size: null, stream, chunks, head: (count) => headOf(stream(), count) };
}

/** The members of an archive (folders left out), or null for a file that is none. gzip around a tar is looked through. */
export async function membersOf(file: RawFile): Promise<readonly Member[] | null> {
  const packing = packingOf(await file.head(512));
  if (packing === 'zip') return zipMembers(file);
  if (packing === 'tar') return tarMembers(file);
  if (packing === 'none') return null;
  const inner = unpackedFile(file.name, () => guarded(file.name, file.size ?? harmless, harmless, gunzipped(file)));
  return packingOf(await inner.head(512)) === 'tar' ? tarMembers(inner) : null;
}

/**
 * The bytes of a file, unpacked as far as it goes: gzip by content, and one member of a zip or tar archive.
 * @param member which one; may be left out where there is only one
 * @param free bytes that may come out whatever the expansion
 * @throws Fault "choose-member" listing the members, each as a repair `member=NAME`
 */
export async function plainSource(
  file: RawFile,
  member: string | null = null,
  free: number = harmless,
): Promise<ByteSource> {
  let pulled = 0;
  const whole = watched(file, (bytes) => {
    pulled = bytes;
  });
  const source = await unpacked(whole, member, { packedSize: file.size ?? harmless, free }, 0);
  // what is not packed is read without the detour
  if (source.size !== null) return { ...source, open: () => chunksOf(file.stream()) };
  return { ...source, packedSize: file.size, pulled: () => pulled };
}

interface Limits {
  /** bytes of the outermost file */
  readonly packedSize: number;
  readonly free: number;
}

async function unpacked(file: RawFile, member: string | null, limits: Limits, depth: number): Promise<ByteSource> {
  const packing = packingOf(await file.head(512));
  if (packing === 'none') {
    return {
      name: file.name,
      size: depth === 0 ? file.size : null,
      packedSize: depth === 0 ? file.size : null,
      rewindable: true,
      open: () => ('chunks' in file ? (file as Unpacked).chunks() : chunksOf(file.stream())),
    };
  }
  if (depth === deepest) {
    throw new Fault(
      'input',
      'nested-too-deep',
      `${file.name}, byte 0: archives in archives are opened ${deepest} deep; expected a matrix by then.`,
      { file: file.name, byteOffset: 0 },
    );
  }
  const name = file.name.replace(/\.gz$/i, '').replace(/\.tgz$/i, '.tar');
  if (packing === 'gzip') {
    const inner = unpackedFile(name, () => guarded(file.name, limits.packedSize, limits.free, gunzipped(file)));
    return unpacked(inner, member, limits, depth + 1);
  }
  const members = packing === 'zip' ? await zipMembers(file) : await tarMembers(file);
  const chosen = choose(file.name, members, member);
  const bytes = packing === 'zip' ? zipMember : tarMember;
  const inner = unpackedFile(chosen.split('/').at(-1) ?? chosen, () =>
    guarded(file.name, limits.packedSize, limits.free, bytes(file, chosen)),
  );
  return unpacked(inner, null, limits, depth + 1);
}

function choose(file: string, members: readonly Member[], wanted: string | null): string {
  if (wanted === null && members.length === 1) return members[0].name;
  if (wanted !== null && members.some((m) => m.name === wanted)) return wanted;
  const listed = members.slice(0, 20).map((m) => `${m.name}${m.size === null ? '' : ` (${m.size} bytes)`}`);
  const more = members.length > 20 ? ` and ${members.length - 20} more` : '';
  const start = wanted === null ? `the archive has ${members.length} members` : `there is no member "${wanted}"`;
  throw new Fault(
    'input',
    wanted === null ? 'choose-member' : 'no-member',
    `${file}: ${start}; choose one of member ${listed.join(', ')}${more}.`,
    { file, member: members[0].name },
    members.slice(0, 20).map((m) => ({ id: `member=${m.name}`, text: `Read ${m.name}` })),
  );
}
