import { useId } from 'react';
import { type TermName, terms } from './terms.ts';

/** A term with its explanation on the spot: press it, and the definition opens beside it. */
export function Term({ name, children }: { name: TermName; children?: React.ReactNode }) {
  const id = useId();
  return (
    <>
      <button type="button" className="term" popoverTarget={id} aria-label={`${name}: what it means`}>
        {children ?? name}
      </button>
      <span id={id} popover="auto" className="explanation">
        <strong>{name}</strong> {terms[name]}
      </span>
    </>
  );
}
