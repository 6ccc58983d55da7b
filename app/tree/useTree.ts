import { useEffect, useState } from 'react';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { pool, resultOf } from '../state/vault.ts';
import type { TreeAnswer } from '../workers/treeOperations.ts';

/** What is known of a trial's tree: waiting, none (with a reason), or there. */
export type TreeState =
  | { readonly state: 'waiting' }
  | { readonly state: 'none'; readonly reason: string }
  | { readonly state: 'there'; readonly answer: TreeAnswer };

/** Has the tree of a trial laid out in a worker, once for as long as it is looked at. */
export function useTree(sheet: Sheet, trial: Trial | null): TreeState {
  const [known, setKnown] = useState<{ readonly id: string; readonly state: TreeState } | null>(null);
  const id = trial?.state === 'done' ? trial.id : null;
  const { matrix } = sheet;
  // biome-ignore lint/correctness/useExhaustiveDependencies: a finished trial does not change
  useEffect(() => {
    const result = id === null ? null : resultOf(id);
    if (id === null || trial === null || result === null) return;
    const heldLast = Int32Array.from(trial.heldLast);
    const task = pool.run('tree', { key: matrix, trial: id, result, heldLast }, { lane: 'quick', matrices: [matrix] });
    void task.reply.then((reply) => {
      if (!reply.ok) {
        if (reply.failure.kind !== 'stopped') setKnown({ id, state: { state: 'none', reason: reply.failure.message } });
        return;
      }
      const none = 'Column LU works column by column: it has no fronts and no assembly tree. Choose a trial on fronts.';
      setKnown({
        id,
        state: reply.value === null ? { state: 'none', reason: none } : { state: 'there', answer: reply.value },
      });
    });
    return () => task.stop();
  }, [id, matrix]);
  return known !== null && known.id === id ? known.state : { state: 'waiting' };
}
