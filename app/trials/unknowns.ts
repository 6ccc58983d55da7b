export type Unknowns =
  | { readonly ok: true; readonly list: readonly number[] }
  | { readonly ok: false; readonly why: string };

/** Longest list a person may type; longer ones come as a file. */
const mostListed = 100_000;

/**
 * Unknowns as a person writes them: "7, 20-31", counted from 1, separated by commas or spaces.
 * @returns 0-based, increasing, each once; or why not.
 */
export function parseUnknowns(text: string, order: number): Unknowns {
  const found = new Set<number>();
  for (const part of text.split(/[\s,;]+/).filter((p) => p !== '')) {
    const match = /^(\d+)(?:[-–](\d+))?$/.exec(part);
    if (match === null) return { ok: false, why: `"${part}" is not a number or a range like 20-31.` };
    const from = Number(match[1]);
    const to = match[2] === undefined ? from : Number(match[2]);
    if (from < 1 || to > order) return { ok: false, why: `"${part}" is not within 1 … ${order}.` };
    if (to < from) return { ok: false, why: `"${part}" runs backwards.` };
    if (found.size + to - from >= mostListed)
      return { ok: false, why: `More than ${mostListed} unknowns: drop them as a file.` };
    for (let i = from; i <= to; i++) found.add(i - 1);
  }
  if (found.size === order && order > 0)
    return { ok: false, why: 'All unknowns are listed: nothing would be left to eliminate.' };
  return { ok: true, list: [...found].sort((a, b) => a - b) };
}
