import { Term } from '../help/Term.tsx';
import type { Column } from './columns.ts';
import type { Order } from './order.ts';

/** Heads of the ledger: press to sort, press again to turn round, a third time for the order of adding. */
export function LedgerHead(props: { columns: readonly Column[]; order: Order; onOrder: (order: Order) => void }) {
  const { columns, order, onOrder } = props;
  const next = (by: Column['name']): Order => {
    if (order.by !== by) return { by, falling: false };
    return order.falling ? { by: null, falling: false } : { by, falling: true };
  };
  return (
    <thead>
      <tr>
        <th scope="col" className="ledger-stamp">
          <span className="unseen">on the sheet</span>
        </th>
        <th scope="col" className="ledger-what">
          <Term name="ordering">trial</Term>
        </th>
        {columns.map(({ name, head, term }) => {
          const sorted = order.by === name;
          return (
            <th key={name} scope="col" aria-sort={sorted ? (order.falling ? 'descending' : 'ascending') : 'none'}>
              <span className="ledger-head">
                <button type="button" className="sort" onClick={() => onOrder(next(name))}>
                  {head}
                  <span aria-hidden="true" className="sort-mark">
                    {sorted ? (order.falling ? '▾' : '▴') : ''}
                  </span>
                </button>
                <Term name={term}>?</Term>
              </span>
            </th>
          );
        })}
        <th scope="col">
          <span className="unseen">state</span>
        </th>
      </tr>
    </thead>
  );
}
