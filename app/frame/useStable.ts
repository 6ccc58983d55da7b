import { useRef } from 'react';

/** Keeps the last list, and each of its items, as long as they hold the same fields: so that what hangs on them is not made anew. */
export function useStable<T extends object>(list: readonly T[]): readonly T[] {
  const kept = useRef(list);
  const next = list.map((item) => kept.current.find((k) => sameFields(k, item)) ?? item);
  if (next.length !== kept.current.length || next.some((item, k) => item !== kept.current[k])) kept.current = next;
  return kept.current;
}

function sameFields<T extends object>(a: T, b: T): boolean {
  const names = Object.keys(a) as (keyof T)[];
  return names.length === Object.keys(b).length && names.every((name) => Object.is(a[name], b[name]));
}
