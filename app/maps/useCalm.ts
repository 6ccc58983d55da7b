import { useEffect, useState } from 'react';
import { type MapsState, mapsStore } from './mapsStore.ts';

/** Words beside the maps follow the hand at most so often, in milliseconds: writing them costs more than drawing the maps. */
const pace = 100;

/** A part of the maps' state as it was at most `pace` ago; the last change always arrives. */
export function useCalm<T>(select: (state: MapsState) => T): T {
  const [value, setValue] = useState(() => select(mapsStore.getState()));
  // biome-ignore lint/correctness/useExhaustiveDependencies: the selector reads nothing but the state
  useEffect(() => {
    let timer = 0;
    const arrive = () => {
      timer = 0;
      setValue(() => select(mapsStore.getState()));
    };
    const leave = mapsStore.subscribe(() => {
      if (timer === 0) timer = window.setTimeout(arrive, pace);
    });
    arrive();
    return () => {
      leave();
      clearTimeout(timer);
    };
  }, []);
  return value;
}
