import type { Pattern } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';
import { withHeldLast } from '../ordering/heldLast.ts';
import { minimumDegree } from '../ordering/minimumDegree.ts';
import { minimumFill } from '../ordering/minimumFill.ts';
import { natural } from '../ordering/natural.ts';
import { nestedDissection } from '../ordering/nestedDissection.ts';
import type { OrderingMethod, OrderingOptions, OrderingResult } from '../ordering/ordering.ts';
import { reverseCuthillMcKee } from '../ordering/reverseCuthillMcKee.ts';
import type { Choice, OrderingName } from './choice.ts';
import type { TrialInput } from './context.ts';

/** Methods that need nothing but the pattern. */
const methods: Partial<Record<OrderingName, OrderingMethod<OrderingOptions>>> = {
  natural,
  'reverse-cuthill-mckee': reverseCuthillMcKee,
  'minimum-degree': minimumDegree,
  'minimum-fill': minimumFill,
  'nested-dissection': nestedDissection,
};

/** Whether a postorder of the elimination tree follows the requested order: after fill-reducing methods only. */
export function takesPostorder(ordering: OrderingName): boolean {
  return !['natural', 'reverse-cuthill-mckee', 'sloan', 'imported'].includes(ordering);
}

/** Runs the ordering of a choice on a pattern. The requested order: no postorder applied. */
export function runOrdering(pattern: Pattern, choice: Choice, input: TrialInput, progress: Progress): OrderingResult {
  const options: OrderingOptions = {
    seed: choice.seed,
    ...(input.heldLast === null ? {} : { heldLast: input.heldLast }),
  };
  if (choice.ordering === 'imported' && input.imported !== null) {
    return { order: withHeldLast(input.imported, input.heldLast ?? undefined), notes: [] };
  }
  const method = methods[choice.ordering];
  if (method === undefined) throw new Error(`no method for ${choice.ordering}`);
  return method(pattern, options, progress);
}
