import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, composeOrders, identityOrder, type NewToOld, positionOf } from '../matrix/permutation.ts';
import { permutePattern } from '../matrix/permute.ts';
import type { Progress } from '../matrix/progress.ts';
import { relabellingOf } from '../ordering/bestOf.ts';
import { columnMinimumDegree } from '../ordering/columnMinimumDegree.ts';
import { geometricDissection } from '../ordering/geometricDissection.ts';
import { withHeldLast } from '../ordering/heldLast.ts';
import { minimumDegree } from '../ordering/minimumDegree.ts';
import { minimumFill } from '../ordering/minimumFill.ts';
import { natural } from '../ordering/natural.ts';
import { nestedDissection } from '../ordering/nestedDissection.ts';
import type { OrderingOptions, OrderingResult } from '../ordering/ordering.ts';
import { reverseCuthillMcKee } from '../ordering/reverseCuthillMcKee.ts';
import { sloan } from '../ordering/sloan.ts';
import type { NodeCoordinates } from '../problems/examples/example.ts';
import type { Choice, OrderingName } from './choice.ts';

/** What an ordering may use beside the pattern; numbered like its columns. */
export interface OrderingCompanions {
  readonly heldLast: Int32Array | null;
  readonly coordinates: NodeCoordinates | null;
  readonly imported: NewToOld | null;
}

/** Whether a postorder of the elimination tree follows the requested order: after fill-reducing methods only. */
export function takesPostorder(ordering: OrderingName): boolean {
  return !['natural', 'reverse-cuthill-mckee', 'sloan', 'imported'].includes(ordering);
}

/** Orders that stand as they are: no relabelling, no pairing, no method runs on the parts of a matrix. */
export function isFixed(ordering: OrderingName): boolean {
  return ordering === 'natural' || ordering === 'imported';
}

/**
 * Runs the ordering of a choice on a pattern: one method, not a portfolio. The requested order: no postorder applied. With a relabelling, a
 * random renumbering of the unknowns is ordered and the result carried back.
 */
export function runOrdering(
  pattern: Pattern,
  choice: Choice,
  companions: OrderingCompanions,
  progress: Progress,
): OrderingResult {
  if (choice.relabelling === null || isFixed(choice.ordering)) return runMethod(pattern, choice, companions, progress);
  const label = relabellingOf(pattern.columns, choice.relabelling);
  const square = pattern.rows === pattern.columns;
  const other = permutePattern(pattern, square ? label : identityOrder(pattern.rows), label);
  const result = runMethod(other, choice, relabelled(companions, label), progress);
  return { ...result, order: composeOrders(label, result.order) };
}

function relabelled({ heldLast, coordinates }: OrderingCompanions, label: NewToOld): OrderingCompanions {
  const position = heldLast === null ? null : positionOf(label);
  return {
    heldLast: position === null || heldLast === null ? null : heldLast.map((i) => position[i]),
    coordinates: coordinates === null ? null : coordinatesOf(coordinates, label),
    imported: null,
  };
}

/** Coordinates of a list of unknowns, each as a node of its own. */
function coordinatesOf(
  { dimensions, unknownsPerNode, values }: NodeCoordinates,
  unknowns: Int32Array,
): NodeCoordinates {
  const out = new Float64Array(unknowns.length * dimensions);
  for (let k = 0; k < unknowns.length; k++) {
    const node = Math.floor(unknowns[k] / unknownsPerNode);
    for (let d = 0; d < dimensions; d++) out[k * dimensions + d] = values[node * dimensions + d];
  }
  return { dimensions, unknownsPerNode: 1, values: out };
}

function runMethod(
  pattern: Pattern,
  choice: Choice,
  { heldLast, coordinates, imported }: OrderingCompanions,
  progress: Progress,
): OrderingResult {
  const { tuning } = choice;
  const options: OrderingOptions = { seed: choice.seed, ...(heldLast === null ? {} : { heldLast }) };
  const dense = tuning.denseThreshold === null ? {} : { denseThreshold: tuning.denseThreshold };
  const leaf = tuning.leafSize === null ? {} : { leafSize: tuning.leafSize };
  switch (choice.ordering) {
    case 'natural':
      return natural(pattern, options, progress);
    case 'reverse-cuthill-mckee':
      return reverseCuthillMcKee(pattern, options, progress);
    case 'sloan':
      return sloan(pattern, options, progress);
    case 'minimum-degree':
      return minimumDegree(pattern, { ...options, ...dense }, progress);
    case 'minimum-fill':
      return minimumFill(pattern, { ...options, ...dense }, progress);
    case 'nested-dissection':
      return nestedDissection(
        pattern,
        {
          ...options,
          ...dense,
          ...leaf,
          ...(tuning.balance === null ? {} : { balance: tuning.balance }),
          ...(tuning.tries === null ? {} : { tries: tuning.tries }),
        },
        progress,
      );
    case 'geometric-dissection':
      if (coordinates === null) break;
      return geometricDissection(
        pattern,
        {
          ...options,
          ...leaf,
          coordinates: coordinates.values,
          dimensions: coordinates.dimensions,
          unknownsPerNode: coordinates.unknownsPerNode,
        },
        progress,
      );
    case 'column-minimum-degree':
      return columnMinimumDegree(
        pattern,
        {
          ...options,
          ...(tuning.denseThreshold === null
            ? {}
            : { denseRowThreshold: tuning.denseThreshold, denseColumnThreshold: tuning.denseThreshold }),
        },
        progress,
      );
    case 'imported':
      if (imported === null) break;
      return { order: withHeldLast(imported, heldLast ?? undefined), notes: [] };
    case 'best-of':
      break;
  }
  throw new Error(`${choice.ordering} cannot run here`);
}

/** An order in which the two of each pair stand side by side, at the place of the one that came first. */
export function gatherPairs(order: NewToOld, partner: Int32Array): NewToOld {
  const out = new Int32Array(order.length);
  const placed = new Uint8Array(order.length);
  let k = 0;
  for (const i of order) {
    if (placed[i] === 1) continue;
    placed[i] = 1;
    out[k++] = i;
    const j = partner[i];
    if (j === i || placed[j] === 1) continue;
    placed[j] = 1;
    out[k++] = j;
  }
  return asNewToOld(out);
}
