import type { ReactNode } from 'react';

/** The frame of a survey sheet: an outer line, a scale bar along all four edges, an inner line; crosses of the grid inside. */
export function Neatline({ children, className = '' }: { children: ReactNode; className?: string }) {
  return (
    <div className={`neatline ${className}`}>
      <div className="neatline-inner">
        <svg className="graticule" aria-hidden="true" focusable="false">
          <defs>
            <pattern id="crosses" width="96" height="96" patternUnits="userSpaceOnUse" x="48" y="48">
              <path d="M43 48h10M48 43v10" stroke="currentColor" strokeWidth="1" fill="none" />
            </pattern>
          </defs>
          <rect width="100%" height="100%" fill="url(#crosses)" />
        </svg>
        {children}
      </div>
    </div>
  );
}
