import { measuredSymmetry } from '../survey/declared.ts';
import { surveyJson } from '../survey/json.ts';
import { survey } from '../survey/survey.ts';
import { importJson, importLines } from './importSummary.ts';
import { loadMatrix, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output } from './output.ts';
import type { Call } from './parse.ts';

/** `survey FILE`: the facts of a matrix. */
export async function surveyCommand(call: Call, out: Output): Promise<number> {
  const loaded = await loadMatrix(call);
  const facts = survey(loaded.matrix);
  const measured = measuredSymmetry(loaded.symmetry, facts.symmetry);
  if (call.flag('json')) {
    const notes = loaded.notes.map((note) => note.text);
    if (measured.nearly !== null) notes.push(measured.nearly);
    const said = { matrix: matrixJson(loaded), import: importJson(loaded, measured), survey: surveyJson(facts), notes };
    out.line(jsonText(said));
    return 0;
  }
  out.line(matrixLine(loaded));
  for (const line of importLines(loaded, measured)) out.line(line);
  out.line('');
  for (const fact of Object.values(facts)) {
    if (fact !== null && typeof fact === 'object' && 'sentence' in fact) out.line(String(fact.sentence));
  }
  return 0;
}
