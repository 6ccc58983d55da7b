import { notify } from '../state/notices.ts';
import { pool } from '../state/vault.ts';
import { mapsStore } from './mapsStore.ts';
import { paneControls } from './paneControl.ts';

/** Asks why the entry under the crosshair is in the factor, and shows the path that made it. */
export async function askWhy(): Promise<void> {
  const { cursor } = mapsStore.getState();
  const control = cursor === null ? undefined : paneControls.get(cursor.pane);
  if (cursor === null || control === undefined) return;
  const { pane } = control;
  if (pane.trial === null) {
    notify('This is the matrix as read: fill-in is on the maps of the trials.');
    return;
  }
  const reply = await pool.run(
    'whyFill',
    { key: pane.matrix, trial: pane.trial, row: cursor.row, column: cursor.column },
    { lane: 'quick', matrices: [pane.matrix], priority: 2 },
  ).reply;
  // the hand may have gone on meanwhile
  if (mapsStore.getState().cursor !== cursor) return;
  if (!reply.ok) {
    if (reply.failure.kind !== 'stopped') notify(reply.failure.message, true);
    return;
  }
  if (reply.value === null) {
    notify('There is no fill-in at this place: the matrix has an entry here, or the factor has none.');
    return;
  }
  const { positions, unknowns } = reply.value;
  mapsStore.setState({ pinned: true, path: { pane: pane.id, positions, unknowns } });
  // the path lies on the diagonal, often far from the entry it explains
  if (!Array.from(positions).every((k) => control.inSight({ row: k, column: k })) || !control.inSight(cursor)) {
    control.goToAll(positions);
  }
}
