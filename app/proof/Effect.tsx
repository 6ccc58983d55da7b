import type { Effect, Magnitudes, Range } from '../../engine/prepare/effect.ts';
import { asText, exactly, plainNumber } from '../figures/format.ts';

/** How many times the largest is of the smallest. */
const spread = (range: Range | null): string =>
  range === null ? '–' : asText(plainNumber(range.largest / range.smallest));

const lines: readonly (readonly [string, (m: Magnitudes) => string])[] = [
  ['entries, largest over smallest', (m) => spread(m.entries)],
  ['rows, largest over smallest', (m) => spread(m.rowNorms)],
  ['columns, largest over smallest', (m) => spread(m.columnNorms)],
  ['diagonal, largest over smallest', (m) => spread(m.diagonal)],
  ['zeros on the diagonal', (m) => exactly(m.diagonalZeros)],
  ['columns led by their diagonal', (m) => exactly(m.diagonalDominant)],
];

/** What scaling and matching did to the matrix before it was ordered, also where they made it worse. */
export function EffectTable({ effect }: { effect: Effect }) {
  return (
    <>
      <h3>
        Scaling and matching <span className="kind">exact</span>
      </h3>
      <table className="facts-table against">
        <thead>
          <tr>
            <td />
            <th scope="col">before</th>
            <th scope="col">after</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(([head, say]) => (
            <tr key={head}>
              <th scope="row">{head}</th>
              <td className="figure">{say(effect.before)}</td>
              <td className="figure">{say(effect.after)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}
