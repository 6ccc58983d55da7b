/**
 * Orderings against the outside figures (test/reference/README.md): the approximate minimum degree of Eigen 3.4 and the reverse
 * Cuthill–McKee of SciPy 1.10.1. Further open matrices take part where FILLCAST_MATRICES names their folder, else they are skipped.
 */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { minimumFill } from '../../engine/ordering/minimumFill.ts';
import { natural } from '../../engine/ordering/natural.ts';
import { reverseCuthillMcKee } from '../../engine/ordering/reverseCuthillMcKee.ts';
import { sloan } from '../../engine/ordering/sloan.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { profileOf } from '../../engine/symbolic/profile.ts';
import { fetchedFolder, figures, readableNames, readReference } from '../support/reference.ts';

const square = readableNames().filter((name) => figures[name].orderings?.['minimum-degree'] !== undefined);
const mean = (ratios: number[]): number => Math.exp(ratios.reduce((s, r) => s + Math.log(r), 0) / ratios.length);

describe(`orderings against the outside figures, ${square.length} matrices${fetchedFolder === null ? ' (further ones skipped)' : ''}`, () => {
  const matrices = square.map((name) => ({ name, a: readReference(name), outside: figures[name].orderings ?? {} }));

  it('minimum degree: factor entries ≤ 1.02 × on the geometric mean, none above 1.15 ×', () => {
    const ratios = matrices.map(({ name, a, outside }) => {
      const { order } = minimumDegree(a, {}, noProgress);
      const ratio = analyse(a, order, { postorder: false }).factorEntries / outside['minimum-degree'].factorEntries;
      expect(ratio, name).toBeLessThan(1.15);
      return ratio;
    });
    expect(mean(ratios)).toBeLessThan(1.02);
  });
  it('minimum fill: operations below those of minimum degree on the geometric mean', () => {
    const ratios = matrices.map(({ a }) => {
      const fill = analyse(a, minimumFill(a, {}, noProgress).order, { postorder: false });
      const degree = analyse(a, minimumDegree(a, {}, noProgress).order, { postorder: false });
      const operations = (counts: Int32Array): number => counts.reduce((sum, c) => sum + c * c, 0);
      return operations(fill.columnCount) / operations(degree.columnCount);
    });
    expect(mean(ratios)).toBeLessThan(1);
  });
  it('reverse Cuthill–McKee: bandwidth ≤ 1.00 × on the geometric mean', () => {
    const ratios = matrices
      .filter(({ outside }) => (outside['reverse-cuthill-mckee']?.bandwidth ?? 0) > 0)
      .map(({ a, outside }) => {
        const { order } = reverseCuthillMcKee(a, {}, noProgress);
        return profileOf(graphOf(a), order).bandwidth / (outside['reverse-cuthill-mckee'].bandwidth ?? 1);
      });
    expect(mean(ratios)).toBeLessThanOrEqual(1);
  });
  it('Sloan: envelope below that of the natural order and of reverse Cuthill–McKee on the geometric mean', () => {
    const of = (order: typeof natural, a: (typeof matrices)[number]['a']): number =>
      profileOf(graphOf(a), order(a, {}, noProgress).order).envelope + 1;
    expect(mean(matrices.map(({ a }) => of(sloan, a) / of(natural, a)))).toBeLessThan(1);
    expect(mean(matrices.map(({ a }) => of(sloan, a) / of(reverseCuthillMcKee, a)))).toBeLessThan(1);
  });
});
