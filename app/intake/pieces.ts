import { asText, bytes } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { askMany } from '../state/questions.ts';
import { pool } from '../state/vault.ts';
import type { CompanionRole, Inspected } from '../workers/operations.ts';

/** One thing that came in: a file, or one member of an archive, with what it looks like. */
export interface Piece {
  readonly file: File;
  /** name in the archive; null for a file of its own */
  readonly member: string | null;
  /** without folders */
  readonly name: string;
  readonly role: 'matrix' | CompanionRole | 'unknown';
  readonly what: string;
  /** a banner or a title says that it is a matrix; other tables of numbers only look like one */
  readonly certain: boolean;
}

type Seen = Pick<Inspected, 'role' | 'what'> & { readonly kind: Inspected['kind'] | null };

function pieceOf(file: File, member: string | null, { kind, role, what }: Seen): Piece {
  const name = (member ?? file.name).split('/').at(-1) ?? file.name;
  const certain = kind === 'matrix-market' || kind === 'harwell-boeing' || kind === 'rutherford-boeing';
  const base = { file, member, name, what, certain };
  // tables of numbers have no banner: the name may say that they are places of nodes
  if (!(certain && role === 'matrix') && /coord|xyz?\b|_xyz?\.|nodes|mesh/i.test(name))
    return { ...base, role: 'coordinates' };
  return { ...base, role: role === 'archive' ? 'unknown' : role };
}

/** What was dropped, piece by piece; of archives with several members the user chooses. */
export async function piecesOf(files: readonly File[]): Promise<readonly Piece[]> {
  const out: Piece[] = [];
  for (const file of files) {
    const { reply } = pool.run('inspect', { file, member: null }, { lane: 'quick', priority: 12 });
    const seen = await reply;
    if (!seen.ok) {
      // the reader says what is wrong with it, with place and reason
      if (seen.failure.kind !== 'stopped')
        out.push({ file, member: null, name: file.name, role: 'matrix', what: '', certain: true });
      continue;
    }
    const { members } = seen.value;
    if (members === null) out.push(pieceOf(file, null, seen.value));
    else out.push(...(await chosenMembers(file, members)));
  }
  return out;
}

const words: Readonly<Record<Piece['role'], string>> = {
  matrix: 'a matrix',
  'right-hand side': 'right-hand sides',
  permutation: 'a permutation',
  labels: 'labels',
  coordinates: 'coordinates of nodes',
  unknown: 'not recognised',
};

async function chosenMembers(file: File, members: NonNullable<Inspected['members']>): Promise<readonly Piece[]> {
  const pieces = members.map((m) => pieceOf(file, m.name, m));
  const matrices = pieces.filter((p) => p.role === 'matrix').length;
  const choices = pieces.map((piece, k) => {
    const size = members[k].size;
    return {
      id: String(k),
      text: `${piece.member}: ${words[piece.role]}${size === null ? '' : `, ${asText(bytes(size))}`}`,
      // several matrices may be versions of one another: the first alone is taken unless the user says more
      chosen: piece.role === 'matrix' ? pieces.findIndex((p) => p.role === 'matrix') === k : piece.role !== 'unknown',
    };
  });
  const many = matrices > 1 ? ` ${matrices} of them look like matrices; each gets a sheet of its own.` : '';
  const answer = await askMany(
    `What is to be read from ${file.name}?`,
    `The archive has ${members.length} members.${many} What is no matrix is put beside the first one.`,
    choices,
    'Read them',
  );
  if (answer === null) return [];
  if (answer.length === 0) notify(`Nothing was chosen from ${file.name}.`);
  return answer.map((id) => pieces[Number(id)]);
}
