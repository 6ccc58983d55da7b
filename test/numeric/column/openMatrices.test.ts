/**
 * Column LU on the open matrices: proof against outside figures (dense LAPACK; see test/reference/README.md) and against the bounds of
 * the symbolic room. More matrices where FILLCAST_MATRICES names a folder.
 */
import { expect, test } from 'vitest';
import { entryCount } from '../../../engine/matrix/pattern.ts';
import { identityOrder, type NewToOld } from '../../../engine/matrix/permutation.ts';
import { permutePattern } from '../../../engine/matrix/permute.ts';
import { noProgress } from '../../../engine/matrix/progress.ts';
import { accuracyCard } from '../../../engine/numeric/accuracy/card.ts';
import { factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { columnPlan } from '../../../engine/numeric/column/columnPlan.ts';
import { minimumDegree } from '../../../engine/ordering/minimumDegree.ts';
import { rowMergeBound } from '../../../engine/symbolic/rowMerge.ts';
import { randomOrder } from '../../support/random.ts';
import { fetchedFolder, figures, readableNames, readReference } from '../../support/reference.ts';

const square = readableNames().filter((name) => {
  const f = figures[name];
  return f.rows === f.columns && f.field !== 'pattern' && f.rows <= 3500;
});
const regular = square.filter((name) => figures[name].structuralRank === figures[name].rows && name !== 'can_1072');
const where = fetchedFolder === null ? 'committed matrices only; the further ones are skipped' : 'all open matrices';

test(`verdict and condition, ${where}`, () => {
  expect(regular.length).toBeGreaterThan(5);
  for (const name of regular) {
    const a = readReference(name);
    const f = figures[name];
    const plan = columnPlan(a, (block) => minimumDegree(block, {}, noProgress).order);
    const factor = factorizeColumns(a, plan.columnOrder, { ...plan, threshold: 0.1 });
    const card = accuracyCard(a, factor);
    expect(card.backwardError as number, name).toBeLessThan(1e-15);
    expect(card.componentwiseBackwardError as number, name).toBeLessThan(1e-14);
    expect(card.verdict, name).not.toBe('red');
    if (typeof f.condition1 === 'number' && f.condition1 < 1e13) {
      expect(card.conditionEstimate as number, name).toBeLessThanOrEqual(f.condition1 * 1.01);
      expect(card.conditionEstimate as number, name).toBeGreaterThanOrEqual(f.condition1 / 3);
    }
    if (typeof f.logAbsDeterminant === 'number') {
      const error = Math.abs((card.logAbsDeterminant as number) - f.logAbsDeterminant);
      expect(error / Math.max(1, Math.abs(f.logAbsDeterminant)), name).toBeLessThan(1e-8);
      if (f.field === 'real' && f.symmetry === 'general')
        expect(card.determinantSign?.[0], name).toBe(f.determinantSign);
    }
  }
});

const unsymmetric = regular.filter((name) => figures[name].symmetry === 'general');

test(`partial pivoting stays inside the range of the forecast, every column of it; ${where}`, () => {
  let checked = 0;
  for (const name of unsymmetric) {
    const a = readReference(name);
    const orders: NewToOld[] = [identityOrder(a.columns), minimumDegree(a, {}, noProgress).order];
    if (a.columns <= 600) orders.push(randomOrder(a.columns, 12));
    for (const order of orders) {
      const bound = rowMergeBound(a, order);
      const { factors, lowerEntries, upperEntries } = factorizeColumns(a, order);
      expect(lowerEntries, name).toBeLessThanOrEqual(bound.lowerEntries);
      expect(upperEntries, name).toBeLessThanOrEqual(bound.upperEntries);
      const row = new Int32Array(a.columns).fill(1);
      for (let p = 0; p < factors.upper.pointer[a.columns]; p++) row[factors.upper.index[p]]++;
      let beyond = 0;
      for (let k = 0; k < a.columns; k++) {
        if (row[k] > bound.upper[k]) beyond++;
        if (factors.lower.pointer[k + 1] - factors.lower.pointer[k] + 1 > bound.lower[k]) beyond++;
      }
      expect(beyond, name).toBe(0);
      // every entry survives, barring cancellation, which column LU keeps as a place
      expect(lowerEntries + upperEntries - a.columns).toBeGreaterThanOrEqual(entryCount(a));
      checked++;
    }
  }
  expect(checked).toBeGreaterThanOrEqual(9);
});

test(`on block form too: low ≤ actual ≤ high over the diagonal blocks; ${where}`, () => {
  for (const name of unsymmetric) {
    const a = readReference(name);
    const plan = columnPlan(a, (block) => minimumDegree(block, {}, noProgress).order);
    const { plannedRow, columnOrder, blockStart } = plan;
    const factor = factorizeColumns(a, columnOrder, { ...plan });
    const rowOrder = identityOrder(a.columns);
    for (let k = 0; k < a.columns; k++) rowOrder[k] = plannedRow[columnOrder[k]];
    const permuted = permutePattern(a, rowOrder, columnOrder);
    let low = 0;
    let high = 0;
    for (let b = 0; b + 1 < blockStart.length; b++) {
      const [start, end] = [blockStart[b], blockStart[b + 1]];
      const rowIndex: number[] = [];
      const columnPointer = new Int32Array(end - start + 1);
      for (let k = start; k < end; k++) {
        for (let p = permuted.columnPointer[k]; p < permuted.columnPointer[k + 1]; p++) {
          if (permuted.rowIndex[p] >= start) rowIndex.push(permuted.rowIndex[p] - start);
        }
        columnPointer[k - start + 1] = rowIndex.length;
      }
      const block = { rows: end - start, columns: end - start, columnPointer, rowIndex: Int32Array.from(rowIndex) };
      const bound = rowMergeBound(block, identityOrder(end - start));
      low += rowIndex.length;
      high += bound.lowerEntries + bound.upperEntries - (end - start);
    }
    expect(factor.report.factorEntries, name).toBeGreaterThanOrEqual(low);
    expect(factor.report.factorEntries, name).toBeLessThanOrEqual(high);
    expect(low + factor.offDiagonalBlockEntries, name).toBe(entryCount(a));
  }
});
