import type { Loaded } from '../exchange/loaded.ts';
import type { Measured } from '../survey/declared.ts';

/** What the file held and what was made of it, as JSON: nothing is changed without a note here. */
export function importJson(loaded: Loaded, measured: Measured): Record<string, unknown> {
  return {
    file: loaded.name,
    format: loaded.format,
    storedEntries: loaded.storedEntries,
    entries: loaded.matrix.rowIndex.length,
    duplicates: loaded.duplicates,
    explicitZeros: loaded.explicitZeros,
    notFinite: loaded.notFinite,
    declaredSymmetry: loaded.symmetry,
    measuredSymmetry: measured.words,
    rightHandSides: loaded.rightHandSides?.columns ?? 0,
    labels: loaded.labels !== null,
    notes: loaded.notes.map(({ code, text, offers }) => ({ code, text, read: (offers ?? []).map((o) => o.id) })),
  };
}

/** The same in lines; other readings on offer stand under their note as the words that choose them. */
export function importLines(loaded: Loaded, measured: Measured): string[] {
  const zeros = loaded.explicitZeros === null ? 'no values' : `${loaded.explicitZeros} explicit zeros`;
  const lines = [
    `  ${loaded.format}; ${loaded.storedEntries} entries in the file, ${loaded.matrix.rowIndex.length} after expansion; ${loaded.duplicates} duplicates, ${zeros}`,
    `  declared ${loaded.symmetry}, measured: ${measured.words}`,
  ];
  for (const note of loaded.notes) {
    lines.push(`  ${note.text}`);
    for (const offer of note.offers ?? []) lines.push(`    --read ${offer.id}: ${offer.text}`);
  }
  if (measured.nearly !== null) lines.push(`  ${measured.nearly}`, '    --read symmetrise');
  return lines;
}
