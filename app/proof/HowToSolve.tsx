import type { ProofWish } from '../workers/proofOperations.ts';

const mostRefine = 20;

/** How a proof solves: right-hand sides, refinement, precision, transpose. */
export function HowToSolve(props: {
  readonly wish: ProofWish;
  readonly change: (part: Partial<ProofWish>) => void;
  /** right-hand sides that came with the matrix */
  readonly given: number;
  readonly fronts: boolean;
}) {
  const { wish, change, given, fronts } = props;
  return (
    <details className="how-to-solve">
      <summary>How it solves</summary>
      <div className="fields">
        <label className="field">
          <span>most refinement steps</span>
          <input
            type="number"
            min={0}
            max={mostRefine}
            step={1}
            value={wish.refine}
            onChange={(event) =>
              change({ refine: Math.max(0, Math.min(mostRefine, Math.trunc(Number(event.target.value)))) })
            }
          />
        </label>
        <label className="field">
          <span>seed of the random right-hand sides</span>
          <input
            type="number"
            min={1}
            max={2147483646}
            step={1}
            value={wish.seed}
            onChange={(event) =>
              change({ seed: Math.max(1, Math.min(2147483646, Math.trunc(Number(event.target.value)))) })
            }
          />
        </label>
        <label className="field">
          <span>factors kept in</span>
          <select
            value={wish.precision}
            disabled={!fronts}
            onChange={(event) => change({ precision: event.target.value as ProofWish['precision'] })}
          >
            <option value="double">double precision</option>
            <option value="single">single precision, refined in double</option>
          </select>
        </label>
        <label className="field">
          <span>solves with</span>
          <select
            value={wish.transposed ? 'transposed' : 'plain'}
            onChange={(event) => change({ transposed: event.target.value === 'transposed' })}
          >
            <option value="plain">A · x = b</option>
            <option value="transposed">Aᵀ · x = b</option>
          </select>
        </label>
        {given === 0 ? null : (
          <label>
            <input type="checkbox" checked={wish.given} onChange={(event) => change({ given: event.target.checked })} />{' '}
            the {given} right-hand sides that came with the matrix
          </label>
        )}
      </div>
      <p className="small soft">
        A·1 and two random right-hand sides are always solved, so that no verdict rests on one vector.
      </p>
    </details>
  );
}
