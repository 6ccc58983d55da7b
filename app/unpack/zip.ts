import { type AsyncFlateStreamHandler, Unzip, type UnzipFile, UnzipInflate, UnzipPassThrough } from 'fflate';
import { Fault } from '../../engine/matrix/fault.ts';
import { chunksOf, type Member, type RawFile } from './raw.ts';

/** Bytes handed to the library at once: a slice expands a thousandfold at most, and all of it waits in memory. */
const slice = 1 << 14;

type Data = (chunk: Uint8Array) => void;

/** Unpacks the member `wanted` and lets the bytes of all others pass by, so that nothing is kept. */
function unzipper(wanted: string | null, found: (file: UnzipFile) => void, data: Data, end: () => void): Unzip {
  const unzip = new Unzip((file) => {
    found(file);
    file.ondata = (error, chunk, final) => {
      if (error) throw error;
      if (file.name !== wanted) return;
      if (chunk.length > 0) data(chunk);
      if (final) end();
    };
    file.start();
  });
  for (const Real of [UnzipInflate, UnzipPassThrough]) {
    unzip.register(
      class {
        static readonly compression = Real.compression;
        ondata: AsyncFlateStreamHandler = () => {};
        private readonly real: UnzipInflate | UnzipPassThrough | null;
        constructor(name: string) {
          this.real = name === wanted ? new Real() : null;
        }
        push(chunk: Uint8Array, final: boolean): void {
          if (this.real === null) return;
          this.real.ondata = (error, part, last) => this.ondata(error, part, last);
          this.real.push(chunk, final);
        }
      },
    );
  }
  return unzip;
}

function broken(file: string, member: string | null, at: number, why: string): Fault {
  const what = member === null ? `${file}, byte ${at}` : `${file}, member ${member}, byte ${at} of the archive`;
  return new Fault(
    'input',
    'zip-broken',
    `${what}: the zip data are damaged, cut off or packed in a way that is not read (${why}); expected a complete zip archive, deflated or stored, without a password. Fetch it again.`,
    member === null ? { file, byteOffset: at } : { file, member, byteOffset: at },
  );
}

const reason = (thrown: unknown) => (thrown instanceof Error ? thrown.message : String(thrown));

/** The members of a zip archive, folders left out (PKWARE APPNOTE). */
export async function zipMembers(file: RawFile): Promise<Member[]> {
  const members: Member[] = [];
  const unzip = unzipper(
    null,
    ({ name, originalSize }) => {
      if (!name.endsWith('/')) members.push({ name, size: originalSize ?? null });
    },
    () => {},
    () => {},
  );
  let at = 0;
  try {
    for await (const chunk of chunksOf(file.stream())) {
      unzip.push(chunk.slice());
      at += chunk.length;
    }
  } catch (thrown) {
    throw thrown instanceof Fault ? thrown : broken(file.name, null, at, reason(thrown));
  }
  if (members.length === 0) throw broken(file.name, null, at, 'no member was found');
  return members;
}

/** The bytes of one member. */
export async function* zipMember(file: RawFile, member: string): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  const ready: Uint8Array[] = [];
  let ended = false;
  const unzip = unzipper(
    member,
    () => {},
    (chunk) => ready.push(chunk),
    () => {
      ended = true;
    },
  );
  let at = 0;
  for await (const chunk of chunksOf(file.stream())) {
    for (let from = 0; from < chunk.length && !ended; from += slice) {
      try {
        unzip.push(chunk.slice(from, from + slice));
      } catch (thrown) {
        throw broken(file.name, member, at, reason(thrown));
      }
      at += Math.min(slice, chunk.length - from);
      for (const part of ready) yield part as Uint8Array<ArrayBuffer>;
      ready.length = 0;
    }
    if (ended) return;
  }
  throw broken(file.name, member, at, 'the archive ends before its member');
}
