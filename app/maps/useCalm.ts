import { useEffect, useState } from 'react';
import { type MapsState, mapsStore } from './mapsStore.ts';

/**
 * Words beside the maps follow the hand at a calmer pace than the maps: they cost more than the drawing. They are written when the hand
 * has rested so long, and while it moves at most so often; in milliseconds.
 */
const rest = 90;
const longest = 420;

const listeners = new Set<() => void>();
let timer = 0;
let since = 0;
let leave: (() => void) | null = null;

/** One clock for all of them, so that they change in the same frame. */
function changed(): void {
  const now = performance.now();
  if (timer === 0) since = now;
  else clearTimeout(timer);
  timer = window.setTimeout(tell, Math.max(0, Math.min(rest, since + longest - now)));
}

function tell(): void {
  timer = 0;
  for (const listener of [...listeners]) listener();
}

/** A part of the maps' state, a little behind it; the last change always arrives. */
export function useCalm<T>(select: (state: MapsState) => T): T {
  const [value, setValue] = useState(() => select(mapsStore.getState()));
  // biome-ignore lint/correctness/useExhaustiveDependencies: the selector reads nothing but the state
  useEffect(() => {
    const arrive = () => setValue(() => select(mapsStore.getState()));
    listeners.add(arrive);
    leave ??= mapsStore.subscribe(changed);
    arrive();
    return () => {
      listeners.delete(arrive);
      if (listeners.size > 0) return;
      leave?.();
      leave = null;
      clearTimeout(timer);
      timer = 0;
    };
  }, []);
  return value;
}
