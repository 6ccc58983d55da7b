import type { SparseMatrix } from '../../matrix/pattern.ts';
import { Random } from '../../matrix/random.ts';
import { TripletBuilder } from '../builder.ts';
import type { WorkedExample } from './example.ts';

/**
 * Conductances of a town's low-voltage network: streets hang from ring mains, houses from streets, a few ties between streets,
 * one substation node that meets every ring. Symmetric, nearly a tree.
 */
function make(nodes: number): { matrix: SparseMatrix; coordinates: null } {
  const random = new Random(4211);
  const b = new TripletBuilder(nodes, nodes);
  const cable = (i: number, j: number, siemens: number): void => {
    if (i === j) return;
    b.add(i, i, siemens);
    b.add(j, j, siemens);
    b.add(i, j, -siemens);
    b.add(j, i, -siemens);
  };
  const rings = Math.max(3, Math.round(nodes / 400));
  const perRing = 40;
  const ringNodes = Math.min(nodes - 1, rings * perRing);
  for (let k = 0; k < ringNodes; k++) {
    const start = k - (k % perRing);
    const length = Math.min(perRing, ringNodes - start);
    if (k === start) cable(0, 1 + k, 40 + 20 * random.next());
    cable(1 + k, 1 + start + ((k - start + 1) % length), 25 + 10 * random.next());
  }
  for (let i = 1 + ringNodes; i < nodes; i++) {
    // most houses join the street of the house before, others open a new street on a ring
    const streetGoesOn = i > 1 + ringNodes && random.next() < 0.88;
    cable(
      i,
      streetGoesOn ? i - 1 - random.below(Math.min(3, i - 1 - ringNodes)) : 1 + random.below(ringNodes),
      2 + 6 * random.next(),
    );
    if (random.next() < 0.02) cable(i, 1 + ringNodes + random.below(i - ringNodes), 1);
  }
  for (let i = 0; i < nodes; i++) b.add(i, i, i === 0 ? 100 : 0.002 + 0.01 * random.next());
  return { matrix: b.build(), coordinates: null };
}

export const network: WorkedExample = {
  id: 'distribution-network',
  title: 'Distribution network',
  sentence:
    "A town's cables between ring mains, streets and houses: nearly a tree, and hardly any fill if ordered well.",
  sizes: [12_000, 60_000],
  sizeMeans: 'nodes',
  make,
};
