import type { ReactNode } from 'react';

/** A table that scrolls sideways where it is wider than its place, by keyboard too. */
export function WideTable({ label, children }: { label: string; children: ReactNode }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reachable by keyboard
    <section className="wide-table" tabIndex={0} aria-label={label}>
      {children}
    </section>
  );
}
