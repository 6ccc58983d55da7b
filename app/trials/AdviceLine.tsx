import type { Advice } from './advice.ts';

/** What the ledger says in words, above it. */
export function AdviceLine({ advice }: { advice: Advice }) {
  return (
    <div className="advice small" role="status">
      {advice.sentences.map((sentence) => (
        <p key={sentence}>{sentence}</p>
      ))}
      {advice.cautions.map((caution) => (
        <p key={caution} className="advice-caution">
          <strong>Caution.</strong> {caution}
        </p>
      ))}
    </div>
  );
}
