import type { Sheet } from '../state/sheets.ts';
import { sayChoice } from '../trials/explain.ts';
import { Files } from './Files.tsx';
import { PermutationExport } from './PermutationExport.tsx';

/** What the engineer leaves with: files that carry the chosen trial into another solver and to colleagues. */
export function HandoverPanel({ sheet }: { sheet: Sheet }) {
  const trial = sheet.trials.find((t) => t.id === sheet.chosen);
  if (trial === undefined) {
    return <p className="soft">Choose a trial in the ledger by pressing its name; its files are made here.</p>;
  }
  if (trial.state !== 'done')
    return <p className="soft">Trial {trial.letter} is not finished, so there is nothing to hand over yet.</p>;
  return (
    <section className="handover" aria-label="Handover">
      <p>
        <span className="stamp stamp-still">{trial.letter}</span> {sayChoice(trial.choice)}
      </p>
      <ul className="handover-cautions small" aria-label="Cautions">
        {trial.choice.pivoting === 'threshold' ? (
          <li>
            Pivoting can add entries and memory: the forecast is no guarantee, and the sheet adds a margin for it.
          </li>
        ) : null}
        {trial.proof.proof === null ? <li>Nothing is proven yet: run the proof before relying on it.</li> : null}
        <li>
          A small residual does not show that the model is right. Where people rely on the result, local codes and
          licensed practice decide.
        </li>
      </ul>
      <Files key={trial.id} sheet={sheet} trial={trial} />
      <PermutationExport key={`order ${trial.id}`} sheet={sheet} trial={trial} />
    </section>
  );
}
