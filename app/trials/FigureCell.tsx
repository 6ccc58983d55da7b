import type { TrialFigure } from '../workers/trialFigures.ts';
import type { Column } from './columns.ts';
import type { Range } from './order.ts';
import type { GridPlace } from './useGridKeys.ts';

interface CellProps {
  readonly column: Column;
  readonly figure: TrialFigure;
  readonly range: Range;
  readonly place: GridPlace;
  readonly focused: boolean;
  readonly onFocus: () => void;
  readonly onRead: (text: string) => void;
}

/** How the exact figure is read out under the ledger. */
function readingOf({ column, figure, range }: CellProps): string {
  if (figure.value === null) return figure.reason ?? 'not defined';
  const parts = [`${column.write(figure.value).exact}, ${figure.kind}`];
  if (range.best !== null && figure.value === range.best) parts.push('the best of the trials');
  else if (range.best !== null && range.best > 0 && column.best === 'least') {
    parts.push(`${(figure.value / range.best).toPrecision(3)} times the best`);
  }
  if (range.limit !== null && figure.value > range.limit) parts.push('above your limit');
  if (figure.reason !== null) parts.push(figure.reason);
  return parts.join('; ');
}

/** A figure with its bar: length against the largest of the column, a dashed mark at the limit, a sign before the best. */
export function FigureCell(props: CellProps) {
  const { column, figure, range, place, focused, onFocus, onRead } = props;
  const read = () => onRead(readingOf(props));
  const common = {
    'data-cell': `${place.row},${place.column}`,
    'data-head': column.head,
    tabIndex: focused ? 0 : -1,
    onMouseEnter: read,
    onFocus: () => {
      onFocus();
      read();
    },
  };
  const { value } = figure;
  if (value === null) {
    return (
      <td {...common} className="figure-cell soft" title={figure.reason ?? ''}>
        –<span className="unseen">{figure.reason}</span>
      </td>
    );
  }
  const written = column.write(value);
  const share = range.most > 0 ? Math.max(0, Math.min(1, value / range.most)) : 0;
  const over = range.limit !== null && value > range.limit;
  const best = range.best !== null && value === range.best;
  return (
    <td {...common} className="figure-cell" title={`${written.exact}, ${figure.kind}`}>
      <span className="reading-of">
        {best ? (
          <span className="best" title="best of the trials">
            <svg viewBox="0 0 12 11" width="11" height="10" aria-hidden="true" focusable="false">
              <path d="M6 1L11 10H1Z" fill="none" stroke="currentColor" strokeWidth="1.4" />
              <circle cx="6" cy="7" r="1.3" fill="currentColor" />
            </svg>
            <span className="unseen">best: </span>
          </span>
        ) : null}
        {over ? <span className="over">above limit </span> : null}
        <span className="digits">{written.digits}</span>
        <span className="unit">{written.unit}</span>
      </span>
      <span className="bar" aria-hidden="true">
        <span className={over ? 'bar-over' : ''} style={{ width: `${share * 100}%` }} />
        {range.limit === null ? null : <i style={{ left: `${(range.limit / range.most) * 100}%` }} />}
      </span>
      {figure.kind === 'exact' ? null : <span className="kind">{figure.kind}</span>}
    </td>
  );
}
