import { changeSheet, type SheetId, sheetById } from './sheets.ts';
import { follow } from './tasks.ts';
import { pool } from './vault.ts';

/** Surveys the matrix of a sheet; facts are put on the sheet as they arrive. */
export function runSurvey(id: SheetId): void {
  const sheet = sheetById(id);
  if (sheet === null) return;
  changeSheet(id, () => ({ survey: { state: 'running', fraction: 0, phase: 'surveying', failure: null, facts: {} } }));
  const task = pool.run(
    'survey',
    { key: sheet.matrix },
    {
      lane: 'long',
      priority: 5,
      matrices: [sheet.matrix],
      hear: ({ fraction, phase, early }) =>
        changeSheet(id, ({ survey }) => ({
          survey: {
            ...survey,
            fraction,
            phase,
            facts: early === null ? survey.facts : { ...survey.facts, [early.name]: early.fact },
          },
        })),
    },
  );
  follow(id, 'survey', task);
  void task.reply.then((reply) =>
    changeSheet(id, ({ survey }) =>
      reply.ok
        ? { survey: { ...survey, state: 'done', fraction: 1, facts: reply.value } }
        : { survey: { ...survey, state: 'failed', failure: reply.failure } },
    ),
  );
}
