import { createTarDecoder, type ParsedTarEntry } from 'modern-tar';
import { Fault } from '../../engine/matrix/fault.ts';
import { chunksOf, type Member, type RawFile } from './raw.ts';

function broken(file: string, member: string | null, why: string): Fault {
  const what = member === null ? `${file}, byte 0` : `${file}, member ${member}`;
  return new Fault(
    'input',
    'tar-broken',
    `${what}: the tar archive is damaged or cut off (${why}); expected a complete POSIX tar archive. Fetch it again.`,
    member === null ? { file, byteOffset: 0 } : { file, member },
  );
}

/** Lets the bytes of an entry pass by; the decoder goes on only then. */
async function drain(entry: ParsedTarEntry): Promise<void> {
  const reader = entry.body.getReader();
  while (!(await reader.read()).done);
}

/** Walks over the files of an archive; `use` gets each entry and drains or cancels its body. */
async function* entriesOf(file: RawFile): AsyncGenerator<ParsedTarEntry> {
  const stream = file.stream().pipeThrough(createTarDecoder({ strict: true }));
  const reader = stream.getReader();
  try {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) return;
      if (value.header.type === undefined || value.header.type === 'file') yield value;
      else await drain(value);
    }
  } finally {
    // not waited for: the decoder answers only once its own input has ended
    reader.cancel().catch(() => {});
  }
}

const reason = (thrown: unknown) => (thrown instanceof Error ? thrown.message : String(thrown));

/** The files of a tar archive (POSIX ustar and pax), folders and links left out. */
export async function tarMembers(file: RawFile): Promise<Member[]> {
  const members: Member[] = [];
  try {
    for await (const entry of entriesOf(file)) {
      members.push({ name: entry.header.name, size: entry.header.size });
      await drain(entry);
    }
  } catch (thrown) {
    throw thrown instanceof Fault ? thrown : broken(file.name, null, reason(thrown));
  }
  if (members.length === 0) throw broken(file.name, null, 'no file was found in it');
  return members;
}

/** The bytes of one member. */
export async function* tarMember(file: RawFile, member: string): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  try {
    for await (const entry of entriesOf(file)) {
      if (entry.header.name === member) {
        yield* chunksOf(entry.body as ReadableStream<Uint8Array<ArrayBuffer>>);
        return;
      }
      await drain(entry);
    }
  } catch (thrown) {
    throw thrown instanceof Fault ? thrown : broken(file.name, member, reason(thrown));
  }
  throw broken(file.name, member, 'the member is not in it');
}
