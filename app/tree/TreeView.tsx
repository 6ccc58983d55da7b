import { useStore } from 'zustand';
import { asText, bytes, count, exactly, percent, times } from '../figures/format.ts';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { chooseTrial } from '../state/trials.ts';
import { sayChoice } from '../trials/explain.ts';
import type { TreeAnswer } from '../workers/treeOperations.ts';
import { Course } from './Course.tsx';
import { TreeAreas } from './TreeAreas.tsx';
import { useTree } from './useTree.ts';

/** How a trial would run over its fronts: the tree as areas, the fronts along the way, the memory of the stack. */
export function TreeView({ sheet }: { sheet: Sheet }) {
  const done = sheet.trials.filter((t) => t.state === 'done');
  const trial = done.find((t) => t.id === sheet.chosen) ?? (done.length === 0 ? null : done.reduce(lessWork));
  const state = useTree(sheet, trial);
  if (trial === null)
    return <p className="tree-word soft">The tree of a trial is drawn here as soon as one is ready.</p>;
  return (
    <div className="tree-view">
      <div className="tree-head">
        <label>
          <span className="soft small">tree of</span>{' '}
          <select value={trial.id} onChange={(event) => chooseTrial(sheet.id, event.target.value)}>
            {done.map((t) => (
              <option key={t.id} value={t.id}>
                {t.letter} {sayChoice(t.choice)}
              </option>
            ))}
          </select>
        </label>
        {state.state === 'there' ? <Sentence answer={state.answer} /> : null}
      </div>
      {state.state === 'waiting' ? <p className="tree-word soft">being laid out…</p> : null}
      {state.state === 'none' ? <p className="tree-word">{state.reason}</p> : null}
      {state.state === 'there' ? (
        <Pictures sheet={sheet} trial={trial.id} letter={trial.letter} answer={state.answer} />
      ) : null}
    </div>
  );
}

function lessWork(a: Trial, b: Trial): Trial {
  const work = (t: Trial): number => t.outcome?.counts.operations ?? Number.POSITIVE_INFINITY;
  return work(b) < work(a) ? b : a;
}

function Sentence({ answer: { tree } }: { answer: TreeAnswer }) {
  const gain = tree.criticalOperations > 0 ? tree.operations / tree.criticalOperations : 1;
  return (
    <p className="small">
      {exactly(tree.fronts)} fronts, {asText(count(tree.operations))} operations; the critical path has{' '}
      {exactly(tree.criticalFronts)} fronts and{' '}
      {asText(percent(tree.criticalOperations / Math.max(1, tree.operations)))} of the operations: with fronts kept
      whole, at most {asText(times(gain))} faster.
    </p>
  );
}

function Pictures(props: { sheet: Sheet; trial: string; letter: string; answer: TreeAnswer }) {
  const { sheet, trial, letter, answer } = props;
  const { course, size } = answer;
  const { scalarBytes } = useStore(settingsStore, (s) => s.target);
  const width = scalarBytes * (sheet.facts?.complex === true ? 2 : 1);
  const limit = useStore(settingsStore, (s) => s.target.memoryBytes);
  const largest = course.frontOrder.reduce((a, b) => Math.max(a, b), 0);
  return (
    <div className="tree-pictures">
      <TreeAreas sheet={sheet} trial={trial} letter={letter} answer={answer} />
      <Course
        title="Front sizes on the way"
        file={`${letter}-fronts`}
        series={[{ name: 'order of the largest front', values: course.frontOrder, dashed: false }]}
        across={`unknowns eliminated, of ${asText(count(size))}`}
        write={(x) => asText(count(x))}
        limit={null}
        words={`The largest front has order ${exactly(largest)}.`}
      />
      <Course
        title="Memory on the way"
        file={`${letter}-memory`}
        series={[
          { name: 'stack', values: course.stack.map((x) => x * width), dashed: false },
          { name: 'factors so far', values: course.factors.map((x) => x * width), dashed: true },
        ]}
        across="share of the operations done"
        write={(x) => asText(bytes(x))}
        limit={limit}
        unit={1024 ** Math.floor(Math.log2(Math.max(1, course.factors[course.steps - 1] * width)) / 10)}
        words={`The stack is highest, ${asText(bytes(course.peak * width))}, when ${asText(percent(course.peakAt))} of the operations are done; values only, without indices.`}
      />
    </div>
  );
}
