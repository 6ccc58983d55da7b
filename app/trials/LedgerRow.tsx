import { asText, percent } from '../figures/format.ts';
import { VerdictMark } from '../proof/Verdict.tsx';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { chooseTrial, removeTrial, startTrial, stopTrial, toggleShown } from '../state/trials.ts';
import type { TrialFigures } from '../workers/trialFigures.ts';
import type { Column } from './columns.ts';
import { orderings, sayChoice, sayFactorization } from './explain.ts';
import { FigureCell } from './FigureCell.tsx';
import type { Reading } from './Ledger.tsx';
import type { Range } from './order.ts';
import type { GridPlace } from './useGridKeys.ts';

interface RowProps {
  readonly sheet: Sheet;
  readonly trial: Trial;
  /** null until the trial is finished */
  readonly figures: TrialFigures | null;
  readonly columns: readonly Column[];
  readonly ranges: readonly Range[];
  readonly row: number;
  readonly focusAt: GridPlace;
  readonly onFocusAt: (at: GridPlace) => void;
  readonly onRead: (reading: Reading) => void;
}

/** Running or ended without figures: what happens, in place of the figures. */
function Story({ sheet, trial, span }: { sheet: Sheet; trial: Trial; span: number }) {
  const { state, fraction, phase, failure } = trial;
  if (state === 'waiting') {
    return (
      <td colSpan={span} className="ledger-story soft">
        waiting for a free worker
      </td>
    );
  }
  if (state === 'running') {
    return (
      <td colSpan={span} className="ledger-story">
        <progress value={fraction} max={1} aria-label={`${trial.letter}, ${phase}`} />
        <span className="figure">{asText(percent(Math.floor(fraction * 100) / 100))}</span> {phase}
      </td>
    );
  }
  return (
    <td colSpan={span} className="ledger-story">
      {state === 'stopped' ? 'Stopped.' : failure?.message}{' '}
      <button type="button" className="plain" onClick={() => startTrial(sheet.id, trial.id)}>
        Start again
      </button>
    </td>
  );
}

/** One trial. Pressing its name chooses it for proof and handover; the box puts its maps on the sheet. */
export function LedgerRow(props: RowProps) {
  const { sheet, trial, figures, columns, ranges, row, focusAt, onFocusAt, onRead } = props;
  const { id, letter, choice, heldLast, state } = trial;
  const chosen = sheet.chosen === id;
  const shown = sheet.shown.includes(id);
  const running = state === 'running' || state === 'waiting';
  return (
    <tr className={chosen ? 'chosen' : ''} aria-selected={chosen}>
      <td className="ledger-stamp">
        <label className={`stamp ${shown ? 'stamp-on' : ''}`} title={shown ? 'On the sheet' : 'Put on the sheet'}>
          <input
            type="checkbox"
            checked={shown}
            disabled={figures === null}
            onChange={() => toggleShown(sheet.id, id)}
            aria-label={`${letter} on the sheet`}
          />
          <span aria-hidden="true">{letter}</span>
        </label>
      </td>
      <th scope="row" className="ledger-what">
        <button
          type="button"
          className="what"
          aria-pressed={chosen}
          aria-label={`${letter}, ${sayChoice(choice)}${chosen ? ', chosen' : ''}`}
          onClick={() => chooseTrial(sheet.id, id)}
        >
          <span>
            {orderings[choice.ordering].name}
            {trial.proof.proof === null ? null : <VerdictMark verdict={trial.proof.proof.card.verdict} small />}
          </span>
          <span className="small soft">
            {sayFactorization(choice)}
            {heldLast.length === 0 ? '' : `, ${heldLast.length} held last`}
          </span>
        </button>
      </th>
      {figures === null || running ? (
        <Story sheet={sheet} trial={trial} span={columns.length} />
      ) : (
        columns.map((column, c) => (
          <FigureCell
            key={column.name}
            column={column}
            figure={figures[column.name]}
            range={ranges[c]}
            place={{ row, column: c }}
            focused={focusAt.row === row && focusAt.column === c}
            onFocus={() => onFocusAt({ row, column: c })}
            onRead={(text) => onRead({ trial: letter, column, text })}
          />
        ))
      )}
      <td className="ledger-acts">
        {running ? (
          <button type="button" className="plain small" onClick={() => stopTrial(sheet.id, id)}>
            stop<span className="unseen"> {letter}</span>
          </button>
        ) : (
          <button
            type="button"
            className="strike"
            title={`Strike ${letter} from the ledger`}
            aria-label={`Strike ${letter} from the ledger`}
            onClick={() => removeTrial(sheet.id, id)}
          >
            ×
          </button>
        )}
      </td>
    </tr>
  );
}
