import { useRef } from 'react';
import { useStore } from 'zustand';
import { setSettings, settingsStore } from '../state/settings.ts';

const least = 0.2;
const most = 0.8;
const step = 0.04;

/** The rule between sheet and ledger: dragged, or moved by the arrow keys. */
export function Splitter() {
  const share = useStore(settingsStore, (s) => s.ledgerShare);
  const holding = useRef(false);
  const set = (value: number) => setSettings({ ledgerShare: Math.min(most, Math.max(least, value)) });
  return (
    // biome-ignore lint/a11y/useSemanticElements: a movable separator is a slider of its own kind; hr takes no focus
    <div
      className="splitter"
      role="separator"
      tabIndex={0}
      aria-orientation="horizontal"
      aria-label="Height of the lower band"
      aria-valuemin={least * 100}
      aria-valuemax={most * 100}
      aria-valuenow={Math.round(share * 100)}
      onPointerDown={(event) => {
        holding.current = true;
        event.currentTarget.setPointerCapture(event.pointerId);
      }}
      onPointerMove={(event) => {
        const frame = event.currentTarget.closest('.app')?.getBoundingClientRect();
        if (holding.current && frame !== undefined) set((frame.bottom - event.clientY) / frame.height);
      }}
      onPointerUp={() => {
        holding.current = false;
      }}
      onKeyDown={(event) => {
        if (event.key === 'ArrowUp') set(share + step);
        else if (event.key === 'ArrowDown') set(share - step);
        else return;
        event.preventDefault();
      }}
    />
  );
}
