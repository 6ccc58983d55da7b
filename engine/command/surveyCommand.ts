import { surveyJson } from '../survey/json.ts';
import { survey } from '../survey/survey.ts';
import { loadMatrix, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output } from './output.ts';
import type { Call } from './parse.ts';

/** `survey FILE`: the facts of a matrix. */
export async function surveyCommand(call: Call, out: Output): Promise<number> {
  const loaded = await loadMatrix(call);
  const facts = survey(loaded.matrix);
  const notes = loaded.notes.map((note) => note.text);
  if (call.flag('json')) {
    out.line(jsonText({ matrix: matrixJson(loaded), survey: surveyJson(facts), notes }));
    return 0;
  }
  out.line(matrixLine(loaded));
  for (const note of notes) out.line(`  ${note}`);
  out.line('');
  for (const fact of Object.values(facts)) {
    if (fact !== null && typeof fact === 'object' && 'sentence' in fact) out.line(String(fact.sentence));
  }
  return 0;
}
