import { asText, count } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { ask } from '../state/questions.ts';
import { changeSheet, type SheetId, sheetById } from '../state/sheets.ts';
import { addTrials } from '../state/trials.ts';
import { changeStock, pool } from '../state/vault.ts';
import type { CompanionRole } from '../workers/operations.ts';
import { advisedFactorization, defaultChoice } from '../workers/rules.ts';

const roles: readonly { readonly id: CompanionRole; readonly text: string }[] = [
  { id: 'permutation', text: 'a permutation of its unknowns' },
  { id: 'right-hand side', text: 'right-hand sides' },
  { id: 'coordinates', text: 'coordinates of its mesh nodes' },
  { id: 'labels', text: 'labels of its rows' },
];

/** What a file beside a matrix is to be used as: what it looks like, or what the user says. */
export async function roleOf(file: File, guess: string, matrix: string): Promise<CompanionRole | null> {
  if (/coord|xyz|nodes|mesh/i.test(file.name)) return 'coordinates';
  const found = roles.find((r) => r.id === guess);
  if (found !== undefined) return found.id;
  const answer = await ask(`What is ${file.name}?`, `It came beside ${matrix}. It can be used as:`, roles);
  return roles.find((r) => r.id === answer)?.id ?? null;
}

/** Reads a file that belongs to the matrix of a sheet and puts what it says beside the matrix. */
export async function attach(id: SheetId, file: File, role: CompanionRole): Promise<void> {
  const run = (direction: 'new-to-old' | 'old-to-new' | null) =>
    pool.run('attach', { key: id, file, role, direction }, { lane: 'long', priority: 8, matrices: [id] }).reply;
  let reply = await run(null);
  if (reply.ok && reply.value.kind === 'which-direction') {
    const { factorEntries } = reply.value;
    const told = (d: 'new-to-old' | 'old-to-new') => {
      const entries = factorEntries[d];
      return entries === null ? '' : ` (${asText(count(entries))} factor entries)`;
    };
    const answer = await ask(
      `Which way does ${file.name} read?`,
      'It is a valid permutation both ways, and the file does not say which one is meant.',
      [
        { id: 'new-to-old', text: `new-to-old: line k holds the unknown at position k${told('new-to-old')}` },
        { id: 'old-to-new', text: `old-to-new: line i holds the position of unknown i${told('old-to-new')}` },
      ],
    );
    if (answer !== 'new-to-old' && answer !== 'old-to-new') return;
    reply = await run(answer);
  }
  if (!reply.ok) {
    if (reply.failure.kind !== 'stopped') notify(reply.failure.message, true);
    return;
  }
  if (reply.value.kind !== 'attached' || sheetById(id) === null) return;
  const { change, facts, says } = reply.value;
  changeStock(id, change);
  changeSheet(id, ({ beside }) => ({ facts, beside: [...beside, says] }));
  notify(says);
  if (role === 'permutation') {
    addTrials(id, [{ choice: defaultChoice(advisedFactorization(facts).factorization, 'imported') }]);
  }
}
