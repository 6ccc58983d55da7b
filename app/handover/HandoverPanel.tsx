import type { Sheet } from '../state/sheets.ts';
import { sayChoice } from '../trials/explain.ts';
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
      <PermutationExport key={trial.id} sheet={sheet} trial={trial} />
    </section>
  );
}
