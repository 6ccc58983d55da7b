import { asText, bytes, count, seconds, type Written } from '../figures/format.ts';
import type { ShownProof } from '../state/trial.ts';

function written(x: number | null, write: (x: number) => Written) {
  if (x === null) return <td className="soft">–</td>;
  const w = write(x);
  return (
    <td className="figure" title={w.exact}>
      {asText(w)}
    </td>
  );
}

/** What was forecast beside what the run showed. */
export function Against({ proof }: { proof: ShownProof }) {
  const { forecast, report } = proof;
  const lines: readonly (readonly [string, number | null, number | null, (x: number) => Written])[] = [
    ['factor entries', forecast.factorEntries, report.factorEntries, count],
    ['stored, with padding', forecast.storedFactorEntries, report.storedFactorEntries, count],
    ['operations', forecast.operations, proof.operations, count],
    ['executed, with padding', null, report.executedOperations, count],
    ['peak memory', forecast.peakBytes, report.peakBytes, bytes],
    ['numeric factorization', null, proof.seconds.numeric, seconds],
    ['solves and estimates', null, proof.seconds.solve, seconds],
  ];
  return (
    <table className="facts-table against">
      <caption className="unseen">Forecast against proof</caption>
      <thead>
        <tr>
          <td />
          <th scope="col">forecast</th>
          <th scope="col">measured</th>
        </tr>
      </thead>
      <tbody>
        {lines.map(([head, before, after, write]) => (
          <tr key={head}>
            <th scope="row">{head}</th>
            {written(before, write)}
            {written(after, write)}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
