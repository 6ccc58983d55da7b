import type { Proof } from '../../engine/trial/proof.ts';

type VerdictName = Proof['card']['verdict'];

const said: Readonly<Record<VerdictName, string>> = {
  green: 'Trust',
  amber: 'With care',
  red: 'Do not trust this',
};

/** A shape for each verdict, so that colour is never the only sign: disc, triangle, crossed square. */
function Shape({ verdict }: { verdict: VerdictName }) {
  return (
    <svg viewBox="0 0 16 16" className={`verdict-shape verdict-${verdict}`} aria-hidden="true" focusable="false">
      {verdict === 'green' ? <circle cx="8" cy="8" r="6.5" /> : null}
      {verdict === 'amber' ? <path d="M8 1.5L15 14.5H1Z" /> : null}
      {verdict === 'red' ? <path d="M1.5 1.5h13v13h-13z" /> : null}
      {verdict === 'red' ? <path d="M4.5 4.5l7 7m0-7l-7 7" className="verdict-cross" /> : null}
    </svg>
  );
}

/** The verdict in a word and a shape. */
export function VerdictMark({ verdict, small = false }: { verdict: VerdictName; small?: boolean }) {
  return (
    <span className={small ? 'verdict verdict-small' : 'verdict'} title={said[verdict]}>
      <Shape verdict={verdict} />
      <span className={small ? 'unseen' : ''}>{said[verdict]}</span>
    </span>
  );
}
