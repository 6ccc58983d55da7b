import { scaleLinear } from 'd3';
import { useMemo, useState } from 'react';
import type { TreeBlock } from '../../engine/picture/treePicture.ts';
import { asText, count, exactly, percent } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';
import { notify } from '../state/notices.ts';
import type { Sheet } from '../state/sheets.ts';
import { pool } from '../state/vault.ts';
import { pointTo } from '../state/view.ts';
import type { TreeAnswer } from '../workers/treeOperations.ts';

const width = 560;
const height = 280;
/** Hatching a thinner block would only make it darker. */
const leastHatched = 4;
const margin = { left: 44, right: 8, top: 6, bottom: 30 };

/**
 * The assembly tree as areas: across the work of subtrees, up the operations from the end. Hatched blocks, one above the other from edge
 * to edge, are the critical path. Arrow keys walk from front to front.
 */
export function TreeAreas(props: { sheet: Sheet; trial: string; letter: string; answer: TreeAnswer }) {
  const { sheet, trial, letter, answer } = props;
  const { tree } = answer;
  const [at, setAt] = useState(0);
  const block = tree.blocks[Math.min(at, tree.blocks.length - 1)];
  const x = useMemo(() => scaleLinear([0, 1], [margin.left, width - margin.right]), []);
  const y = useMemo(() => scaleLinear([0, 1], [height - margin.bottom, margin.top]), []);
  // colour by order is for the eye only: the figure stands beside the picture
  const largest = tree.blocks.reduce((m, b) => Math.max(m, b.order), 1);
  const shapes = useMemo(
    () =>
      tree.blocks.map((b, k) => (
        <rect
          key={b.supernode}
          x={x(b.left)}
          y={y(b.top)}
          width={Math.max(0.35, x(b.right) - x(b.left))}
          height={Math.max(0.35, y(b.bottom) - y(b.top))}
          className={b.critical ? 'tree-block tree-critical' : 'tree-block'}
          fillOpacity={0.12 + 0.6 * Math.sqrt(b.order / largest)}
          onPointerEnter={() => setAt(k)}
        />
      )),
    [tree, x, y, largest],
  );
  const step = (key: string): boolean => {
    const to = neighbour(tree.blocks, at, key);
    if (to === null) return false;
    setAt(to);
    return true;
  };
  const show = async () => {
    const reply = await pool.run(
      'front',
      { key: sheet.matrix, trial, supernode: block.supernode },
      { lane: 'quick', matrices: [sheet.matrix] },
    ).reply;
    if (!reply.ok || reply.value === null)
      notify('The unknowns of this front are not at hand; open the tree again.', true);
    else pointTo({ label: `unknowns of a front of ${letter}`, axis: 'unknowns', indices: reply.value });
  };
  const words = `${exactly(tree.fronts)} fronts; the largest has order ${exactly(largest)}; the critical path holds ${asText(percent(tree.criticalOperations / Math.max(1, tree.operations)))} of the operations.`;
  return (
    <div className="tree-areas">
      <div
        className="tree-hand"
        // biome-ignore lint/a11y/noNoninteractiveTabindex: the picture is walked by keys
        tabIndex={0}
        role="application"
        aria-label="Assembly tree; arrow keys go to parent, largest child and neighbours, Enter shows the unknowns in the maps"
        onKeyDown={(event) => {
          if (event.key === 'Enter') void show();
          else if (!step(event.key)) return;
          event.preventDefault();
        }}
      >
        <ChartPlate
          title="Assembly tree, areas of work"
          words={words}
          width={width}
          height={height}
          file={`${letter}-tree`}
        >
          <defs>
            <pattern id="tree-hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
              <path d="M0 2.5H5" className="tree-hatch-line" />
            </pattern>
          </defs>
          {shapes}
          {tree.blocks.map((b) =>
            b.critical && y(b.bottom) - y(b.top) >= leastHatched ? (
              <rect
                key={b.supernode}
                x={x(b.left)}
                y={y(b.top)}
                width={Math.max(0.35, x(b.right) - x(b.left))}
                height={Math.max(0.35, y(b.bottom) - y(b.top))}
                fill="url(#tree-hatch)"
                pointerEvents="none"
              />
            ) : null,
          )}
          {block === undefined ? null : (
            <rect
              x={x(block.left)}
              y={y(block.top)}
              width={Math.max(1, x(block.right) - x(block.left))}
              height={Math.max(1, y(block.bottom) - y(block.top))}
              className="tree-here"
            />
          )}
          <path
            d={`M${margin.left} ${margin.top}V${height - margin.bottom}H${width - margin.right}`}
            className="chart-axis"
            fill="none"
          />
          {[0, 0.5, 1].map((t) => (
            <text key={t} x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
              {100 * t} %
            </text>
          ))}
          {[0, 0.25, 0.5, 0.75, 1].map((t) => (
            <text key={t} x={x(t)} y={height - 17} textAnchor={t === 1 ? 'end' : 'middle'}>
              {100 * t} %
            </text>
          ))}
          <text x={(margin.left + width - margin.right) / 2} y={height - 3} textAnchor="middle" className="chart-note">
            share of all operations: a subtree is as wide as its work
          </text>
          <text transform={`translate(9 ${height / 2}) rotate(-90)`} textAnchor="middle" className="chart-note">
            critical path, from its end
          </text>
        </ChartPlate>
      </div>
      {block === undefined ? null : (
        <p className="small tree-reading" role="status">
          Front of order <span className="figure">{exactly(block.order)}</span>, {exactly(block.columns)} unknowns;{' '}
          {asText(count(block.operations))} operations,{' '}
          {asText(percent(block.subtreeOperations / Math.max(1, tree.operations)))} in its subtree
          {block.critical ? '; on the critical path (hatched)' : ''}.{' '}
          <button type="button" className="plain" onClick={() => void show()}>
            show its unknowns in the maps
          </button>
        </p>
      )}
    </div>
  );
}

/** The drawn front that an arrow key leads to: down to the parent, up to the largest child, left and right to siblings; null for none. */
export function neighbour(blocks: readonly TreeBlock[], at: number, key: string): number | null {
  const here = blocks[at];
  if (here === undefined) return null;
  const find = (fits: (b: TreeBlock) => boolean, better: (a: TreeBlock, b: TreeBlock) => boolean): number | null => {
    let best: number | null = null;
    blocks.forEach((b, k) => {
      if (fits(b) && (best === null || better(b, blocks[best]))) best = k;
    });
    return best;
  };
  switch (key) {
    case 'ArrowDown':
      return find(
        (b) => b.supernode === here.parent,
        () => false,
      );
    case 'ArrowUp':
      return find(
        (b) => b.parent === here.supernode,
        (a, b) => a.subtreeOperations > b.subtreeOperations,
      );
    case 'ArrowLeft':
      return find(
        (b) => b.parent === here.parent && b.left < here.left,
        (a, b) => a.left > b.left,
      );
    case 'ArrowRight':
      return find(
        (b) => b.parent === here.parent && b.left > here.left,
        (a, b) => a.left < b.left,
      );
    default:
      return null;
  }
}
