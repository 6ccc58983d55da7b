import { graphOf } from '../../engine/graph/graph.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';
import { choleskyOperations } from '../../engine/symbolic/operations.ts';
import { profileOf } from '../../engine/symbolic/profile.ts';
import { runOrdering, takesPostorder } from '../../engine/trial/order.ts';
import type { Job } from './jobs.ts';
import { type FigureName, figureNames, type TrialFigure, type TrialFigures } from './trialFigures.ts';

export const trial: Job<'trial'> = ({ key, choice, heldLast }, { shelf, progress }) => {
  const { loaded, coordinates, imported } = shelf.get(key);
  const { matrix } = loaded;
  const graph = shelf.derive(key, 'graph', () => graphOf(matrix));
  const started = performance.now();
  const held = heldLast.length === 0 ? null : heldLast;
  const { order, notes } = runOrdering(matrix, choice, { matrix, coordinates, imported, heldLast: held }, progress);
  const ordered = performance.now();
  const symbolic = analyseGraph(graph, order, { postorder: takesPostorder(choice.ordering) }, progress);
  const analysed = performance.now();
  const { bandwidth, envelope } = profileOf(graph, order);
  const lower = (graph.neighbour.length + 2 * graph.order) / 2;
  const known: Partial<Record<FigureName, number>> = {
    factorEntries: symbolic.factorEntries,
    fillIn: symbolic.factorEntries - lower,
    fillRatio: symbolic.factorEntries / lower,
    operations: choleskyOperations(symbolic.columnCount),
    largestFront: symbolic.largestFront,
    treeHeight: symbolic.treeHeight,
    bandwidth,
    envelope,
    orderingSeconds: (ordered - started) / 1e3,
    symbolicSeconds: (analysed - ordered) / 1e3,
  };
  const figures = figureNames.map((name): [FigureName, TrialFigure] => {
    const value = known[name] ?? null;
    const kind = name.endsWith('Seconds') ? 'measured' : 'exact';
    return [name, { value, kind, reason: value === null ? 'not forecast yet' : null }];
  });
  return { figures: Object.fromEntries(figures) as unknown as TrialFigures, notes, result: { order } };
};
