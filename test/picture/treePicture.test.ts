import { describe, expect, it } from 'vitest';
import { workOfFronts } from '../../engine/forecast/frontWork.ts';
import { parallelProfile } from '../../engine/forecast/parallel.ts';
import { graphOf } from '../../engine/graph/graph.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { nestedDissection } from '../../engine/ordering/nestedDissection.ts';
import { frontCourse } from '../../engine/picture/frontCourse.ts';
import { treePicture } from '../../engine/picture/treePicture.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../engine/symbolic/assemblyTree.ts';
import { stackPeak } from '../../engine/symbolic/stack.ts';

const treeOfGrid = (k: number) => {
  const a = modelProblems.grid2d5(k);
  const { order } = nestedDissection(a, {}, noProgress);
  return assemblyTree(analyseGraph(graphOf(a), order, { postorder: true }));
};

describe('the assembly tree as areas', () => {
  const tree = treeOfGrid(40);
  const work = workOfFronts('cholesky', tree);
  const picture = treePicture(tree, work, 1e9);

  it('widths are the work of subtrees: those of the roots make up all of it, children fit side by side into their parents', () => {
    const at = new Map(picture.blocks.map((b) => [b.supernode, b]));
    expect(picture.blocks.length).toBe(tree.count);
    const roots = picture.blocks.filter((b) => tree.parent[b.supernode] < 0);
    expect(roots.reduce((sum, b) => sum + b.right - b.left, 0)).toBeCloseTo(1, 12);
    for (const b of picture.blocks) {
      const children = picture.blocks.filter((c) => tree.parent[c.supernode] === b.supernode);
      const own = b.right - b.left - children.reduce((sum, c) => sum + c.right - c.left, 0);
      expect(own * picture.operations).toBeCloseTo(b.operations, 3);
      const sorted = [...children].sort((x, y) => x.left - y.left);
      sorted.forEach((c, k) => {
        expect(c.left).toBeGreaterThanOrEqual(b.left - 1e-12);
        expect(c.right).toBeLessThanOrEqual(b.right + 1e-12);
        if (k > 0) expect(c.left).toBeGreaterThanOrEqual(sorted[k - 1].right - 1e-12);
        expect(c.bottom).toBeCloseTo((at.get(b.supernode) as (typeof picture.blocks)[0]).top, 12);
      });
    }
  });

  it('the critical path is the one of the parallel profile, one front above the other up to the edge', () => {
    expect(picture.criticalOperations).toBe(parallelProfile(tree, work, [1]).sequentialFrontsPath);
    const way = picture.blocks.filter((b) => b.critical).sort((x, y) => x.bottom - y.bottom);
    expect(way.length).toBe(picture.criticalFronts);
    expect(way[0].bottom).toBe(0);
    expect(way[way.length - 1].top).toBeCloseTo(1, 12);
    for (let k = 1; k < way.length; k++) expect(tree.parent[way[k].supernode]).toBe(way[k - 1].supernode);
  });

  it('keeps the largest subtrees when there are too many, and says how many fronts there are', () => {
    const few = treePicture(tree, work, 50);
    expect(few.blocks.length).toBeLessThanOrEqual(50);
    expect(few.fronts).toBe(tree.count);
    const least = Math.min(...few.blocks.map((b) => b.subtreeOperations));
    const drawn = new Set(few.blocks.map((b) => b.supernode));
    for (const b of picture.blocks) if (!drawn.has(b.supernode)) expect(b.subtreeOperations).toBeLessThanOrEqual(least);
  });
});

describe('the course of a run over fronts', () => {
  const tree = treeOfGrid(30);
  const work = workOfFronts('cholesky', tree);
  const layout = { blocks: 'packed', parent: 'before' } as const;
  const course = frontCourse(tree, work, layout, false, 200);

  it('its peak is the one of the forecast, and the steps show it', () => {
    expect(course.peak).toBe(stackPeak(tree, layout));
    expect(Math.max(...course.stack)).toBe(course.peak);
    expect(course.peakAt).toBeGreaterThan(0);
    expect(course.peakAt).toBeLessThanOrEqual(1);
  });
  it('factors only grow, up to all that is stored', () => {
    for (let k = 1; k < 200; k++) expect(course.factors[k]).toBeGreaterThanOrEqual(course.factors[k - 1]);
    expect(course.factors[199]).toBe(tree.storedFactorEntries);
  });
  it('the largest front is in it', () => {
    expect(Math.max(...course.frontOrder)).toBe(Math.max(...tree.frontOrder));
  });
});
