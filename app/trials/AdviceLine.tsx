import type { Advice } from './advice.ts';

/** What the ledger says in words, above it. */
export function AdviceLine({ advice }: { advice: Advice }) {
  const { sentences, reasons, cautions } = advice;
  const more = reasons.filter((reason) => !sentences.includes(reason));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: it scrolls where it is long, so it must be reachable by keyboard
    <section className="advice small" aria-label="Advice" tabIndex={0}>
      <div role="status" className="advice-said">
        {sentences.map((sentence) => (
          <p key={sentence}>{sentence}</p>
        ))}
      </div>
      {more.length === 0 && cautions.length === 0 ? null : (
        <details>
          <summary>why{cautions.length === 0 ? '' : ', and what could go wrong'}</summary>
          {more.map((reason) => (
            <p key={reason}>{reason}</p>
          ))}
          {cautions.map((caution) => (
            <p key={caution} className="advice-caution">
              <strong>Caution.</strong> {caution}
            </p>
          ))}
        </details>
      )}
    </section>
  );
}
