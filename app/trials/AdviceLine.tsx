import type { Advice } from './advice.ts';

/** What the ledger says in words, above it. */
export function AdviceLine({ advice }: { advice: Advice }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: it scrolls where it is long, so it must be reachable by keyboard
    <div className="advice small" role="status" aria-label="Advice" tabIndex={0}>
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
