import { asText, count } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { ask } from '../state/questions.ts';
import { changeSheet, type SheetId, sheetById } from '../state/sheets.ts';
import { addTrials } from '../state/trials.ts';
import { changeStock, pool } from '../state/vault.ts';
import type { CompanionRole } from '../workers/operations.ts';
import { advisedFactorization, defaultChoice } from '../workers/rules.ts';
import type { Piece } from './pieces.ts';

const roles: readonly { readonly id: CompanionRole; readonly text: string }[] = [
  { id: 'permutation', text: 'a permutation of its unknowns' },
  { id: 'right-hand side', text: 'right-hand sides' },
  { id: 'coordinates', text: 'coordinates of its mesh nodes' },
  { id: 'labels', text: 'labels of its rows' },
];

/** What a file beside a matrix is to be used as: what it looks like, or what the user says. */
export async function roleOf(piece: Piece, matrix: string): Promise<CompanionRole | 'matrix' | null> {
  const found = roles.find((r) => r.id === piece.role);
  if (found !== undefined) return found.id;
  const looks = piece.what === '' ? '' : ` and looks like ${piece.what}`;
  const answer = await ask(`What is ${piece.name}?`, `It came beside ${matrix}${looks}. It can be used as:`, [
    ...roles,
    { id: 'matrix', text: 'a matrix of its own' },
  ]);
  if (answer === 'matrix') return answer;
  return roles.find((r) => r.id === answer)?.id ?? null;
}

type Direction = 'new-to-old' | 'old-to-new';

/** Reads a file that belongs to the matrix of a sheet and puts what it says beside the matrix. */
export async function attach(id: SheetId, piece: Piece, role: CompanionRole): Promise<void> {
  let direction: Direction | null = null;
  let vector: 1 | 2 | null = null;
  for (;;) {
    const { file, member } = piece;
    const asked = { key: id, file, member, role, direction, vector };
    const reply = await pool.run('attach', asked, { lane: 'long', priority: 8, matrices: [id] }).reply;
    if (sheetById(id) === null) return;
    if (!reply.ok) {
      const { kind, message, repairs } = reply.failure;
      const choice = repairs.length > 0 ? await ask(`How is ${piece.name} to be read?`, message, repairs) : null;
      const chosen = /^permutation-vector=([12])$/.exec(choice ?? '');
      if (chosen === null) {
        if (kind !== 'stopped' && repairs.length === 0) notify(message, true);
        return;
      }
      vector = chosen[1] === '1' ? 1 : 2;
    } else if (reply.value.kind === 'which-direction') {
      direction = await whichDirection(piece.name, reply.value.factorEntries, reply.value.leaner);
      if (direction === null) return;
    } else {
      const { change, facts, says } = reply.value;
      changeStock(id, change);
      changeSheet(id, ({ beside }) => ({ facts, beside: [...beside, says] }));
      notify(says);
      if (role === 'permutation') {
        addTrials(id, [{ choice: defaultChoice(advisedFactorization(facts).factorization, 'imported') }]);
      }
      return;
    }
  }
}

/** Both readings with what they would cost; the user confirms one. */
async function whichDirection(
  name: string,
  entries: Readonly<Record<Direction, number | null>>,
  leaner: Direction | null,
): Promise<Direction | null> {
  const told = (d: Direction) => {
    const known = entries[d];
    return known === null
      ? ''
      : ` ${asText(count(known))} factor entries${leaner === d ? ', the fewer of the two' : ''}.`;
  };
  const answer = await ask(
    `Which way does ${name} read?`,
    'It is a valid permutation both ways, and the file does not say which one is meant.',
    [
      { id: 'new-to-old', text: `New to old: line k holds the unknown at position k.${told('new-to-old')}` },
      { id: 'old-to-new', text: `Old to new: line i holds the position of unknown i.${told('old-to-new')}` },
    ],
  );
  return answer === 'new-to-old' || answer === 'old-to-new' ? answer : null;
}
