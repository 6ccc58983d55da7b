import { exactly } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { freshSheet, layOut, type Sheet } from '../state/sheets.ts';
import { follow } from '../state/tasks.ts';
import { newMatrixKey, pool } from '../state/vault.ts';
import type { SummandAsk } from '../workers/operations.ts';
import { settle } from './settle.ts';

/** "1.5", "-2i", "0.5-2i" as [real part, imaginary part]; null for anything else. */
export function complexNumber(word: string): readonly [number, number] | null {
  const number = '[+-]?(?:\\d+\\.?\\d*|\\.\\d+)(?:e[+-]?\\d+)?';
  const text = word
    .replaceAll(/\s/g, '')
    .replace(/^([+-]?)i$/, '$11i')
    .replace(/([+-])i$/, '$11i');
  const alone = new RegExp(`^(${number})i$`, 'i').exec(text);
  if (alone !== null) return [0, Number(alone[1])];
  const found = new RegExp(`^(${number})(?:([+-](?:\\d+\\.?\\d*|\\.\\d+)(?:e[+-]?\\d+)?)i)?$`, 'i').exec(text);
  return found === null ? null : [Number(found[1]), Number(found[2] ?? 0)];
}

/** What the second matrix has that the first has not, in sentences. */
export async function compareSheets(a: Sheet, b: Sheet): Promise<readonly string[]> {
  const asked = { key: a.matrix, other: b.matrix };
  const { reply } = pool.run('difference', asked, { lane: 'long', priority: 6, matrices: [a.matrix, b.matrix] });
  const got = await reply;
  if (!got.ok) return [got.failure.message];
  const d = got.value;
  const places = (list: Int32Array) =>
    Array.from({ length: list.length / 2 }, (_, k) => `(${list[2 * k] + 1}, ${list[2 * k + 1] + 1})`).join(' ');
  const out: string[] = [];
  if (!d.sameShape) out.push('The sizes differ.');
  out.push(
    d.samePattern
      ? `Same pattern, ${exactly(d.common)} entries: an analysis of ${a.name} holds for ${b.name}.`
      : `Not the same pattern: ${exactly(d.common)} positions in both, ${exactly(d.added.count)} new, ${exactly(d.missing.count)} gone. ${b.name} needs a fresh analysis.`,
  );
  if (d.added.count > 0) out.push(`First new positions (row, column): ${places(d.added.first)}`);
  if (d.missing.count > 0) out.push(`First positions gone: ${places(d.missing.first)}`);
  const v = d.values;
  if (v === null) out.push('Values are not compared: one of them is a pattern.');
  else if (v.changed === 0) out.push('All values are equal.');
  else {
    const at = v.at === null ? '' : ` at (${v.at[0] + 1}, ${v.at[1] + 1})`;
    out.push(`${exactly(v.changed)} values differ, by up to ${v.largest.toPrecision(3)}${at}.`);
  }
  return out;
}

/** Lays out a sum of matrices as a sheet of its own. */
export function layOutSum(terms: readonly (SummandAsk & { readonly word: string; readonly name: string })[]): void {
  const key = newMatrixKey();
  const name = terms.map((t) => `(${t.word.trim()})·${t.name}`).join(' + ');
  layOut(freshSheet(key, name, 'summing', null));
  const asked = { key, name, terms: terms.map(({ key: k, coefficient }) => ({ key: k, coefficient })) };
  const task = pool.run('combine', asked, {
    lane: 'long',
    priority: 10,
    makes: key,
    matrices: terms.map((t) => t.key),
  });
  follow(key, 'read', task);
  void task.reply.then((reply) => {
    if (!reply.ok && reply.failure.kind !== 'stopped') notify(reply.failure.message, true);
    settle(key, reply);
  });
}
