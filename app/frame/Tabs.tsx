import type { ReactNode } from 'react';

export interface Tab<Name extends string> {
  readonly name: Name;
  readonly label: string;
}

/** A strip of tabs and the panel that belongs to the chosen one. Arrow keys move along the strip. */
export function Tabs<Name extends string>(props: {
  readonly id: string;
  readonly label: string;
  readonly tabs: readonly Tab<Name>[];
  readonly chosen: Name;
  readonly onChoose: (name: Name) => void;
  readonly className?: string;
  readonly children: ReactNode;
}) {
  const { id, label, tabs, chosen, onChoose, className = '', children } = props;
  const move = (by: number) => {
    const at = tabs.findIndex((t) => t.name === chosen);
    const next = tabs[(at + by + tabs.length) % tabs.length];
    onChoose(next.name);
    document.getElementById(`${id}-${next.name}`)?.focus();
  };
  return (
    <div className={`tabs ${className}`}>
      <div className="tab-strip" role="tablist" aria-label={label}>
        {tabs.map(({ name, label: text }) => (
          <button
            key={name}
            type="button"
            role="tab"
            id={`${id}-${name}`}
            aria-selected={name === chosen}
            aria-controls={`${id}-panel`}
            tabIndex={name === chosen ? 0 : -1}
            onClick={() => onChoose(name)}
            onKeyDown={(event) => {
              if (event.key === 'ArrowRight') move(1);
              else if (event.key === 'ArrowLeft') move(-1);
              else return;
              event.preventDefault();
            }}
          >
            {text}
          </button>
        ))}
      </div>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a panel that scrolls must be reachable by keyboard */}
      <div className="tab-panel" role="tabpanel" id={`${id}-panel`} aria-labelledby={`${id}-${chosen}`} tabIndex={0}>
        {children}
      </div>
    </div>
  );
}
