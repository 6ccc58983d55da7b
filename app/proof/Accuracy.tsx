import type { AccuracyCard } from '../../engine/numeric/accuracy/card.ts';
import { asText, exactly, plainNumber } from '../figures/format.ts';
import { pointTo } from '../state/view.ts';

const number = (x: number | null) => (x === null ? null : asText(plainNumber(x)));

/** A pivot with a way into the maps. */
function PivotPlace({ place }: { place: NonNullable<AccuracyCard['smallestPivot']> }) {
  const { modulus, row, column } = place;
  return (
    <>
      {number(modulus)}{' '}
      <button
        type="button"
        className="plain"
        onClick={() => pointTo({ label: 'this pivot', axis: 'entries', indices: Int32Array.of(row, column) })}
      >
        row {exactly(row + 1)}
        {column === row ? '' : `, column ${exactly(column + 1)}`}
      </button>
    </>
  );
}

/** The sign of a determinant: +1, −1, or a point of the unit circle. */
function signOf([re, im]: readonly [number, number]): string {
  return im === 0 ? (re < 0 ? '−1' : '+1') : `${number(re)} ${im < 0 ? '−' : '+'} ${number(Math.abs(im))}i`;
}

/** Every measured figure of the run; what is not defined says why. */
export function Accuracy({ card }: { card: AccuracyCard }) {
  const { pivots, missing } = card;
  const lines: readonly (readonly [field: string, head: string, text: React.ReactNode])[] = [
    ['backwardError', 'backward error, normwise', number(card.backwardError)],
    ['componentwiseBackwardError', 'backward error, componentwise', number(card.componentwiseBackwardError)],
    ['unrefinedBackwardError', 'before refinement, normwise', number(card.unrefinedBackwardError)],
    ['conditionEstimate', 'condition estimate, 1-norm', number(card.conditionEstimate)],
    ['forwardErrorEstimate', 'forward error estimate', number(card.forwardErrorEstimate)],
    ['trustedDigits', 'digits that can be trusted', card.trustedDigits === null ? null : `about ${card.trustedDigits}`],
    ['pivotGrowth', 'pivot growth', number(card.pivotGrowth)],
    [
      'smallestPivot',
      'smallest pivot',
      card.smallestPivot === null ? null : <PivotPlace key="smallest" place={card.smallestPivot} />,
    ],
    [
      'largestPivot',
      'largest pivot',
      card.largestPivot === null ? null : <PivotPlace key="largest" place={card.largestPivot} />,
    ],
    ['pivotRatio', 'largest over smallest pivot', number(card.pivotRatio)],
    ['pivots', 'pivots off the diagonal', exactly(pivots.offDiagonal)],
    ['pivots', 'delayed', exactly(pivots.delayed)],
    ['pivots', '2×2', exactly(pivots.twoByTwo)],
    ['pivots', 'replaced', exactly(pivots.perturbed)],
    ['inertia', 'inertia (+, −, 0)', card.inertia === null ? null : card.inertia.map(exactly).join(', ')],
    ['logAbsDeterminant', 'log |det A|', number(card.logAbsDeterminant)],
    ['determinantSign', 'sign of det A', card.determinantSign === null ? null : signOf(card.determinantSign)],
  ];
  return (
    <table className="facts-table">
      <caption className="unseen">Accuracy of the run, all measured</caption>
      <tbody>
        {lines.map(([field, head, text]) => (
          <tr key={head}>
            <th scope="row">{head}</th>
            <td className={text === null ? 'soft small' : 'figure'}>{text ?? missing[field] ?? 'not defined'}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
