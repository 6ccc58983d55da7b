import { describe, expect, it } from 'vitest';
import { Desk } from '../../app/workers/desk.ts';
import type { Heard } from '../../app/workers/protocol.ts';

const heard: Heard<unknown>[] = [];
const hear = (h: Heard<unknown>) => heard.push(h);

async function withExample() {
  const desk = new Desk();
  const made = await desk.run('example', { key: 'm', id: 'distribution-network', size: 12_000 }, [], null, hear);
  if (!made.ok) throw new Error(made.failure.message);
  return { desk, made: made.value };
}

describe('a desk does the work of a worker without a thread', () => {
  it('makes an example, surveys it and runs a trial', async () => {
    const { desk, made } = await withExample();
    expect(made.summary.rows).toBe(made.stock.loaded.matrix.rows);
    const survey = await desk.run('survey', { key: 'm' }, [], null, hear);
    expect(survey.ok && survey.value.components.value?.count).toBe(1);
    expect(heard.some((h) => h.early !== null)).toBe(true);
    const { defaultChoice } = await import('../../app/workers/rules.ts');
    const choice = defaultChoice('cholesky', 'minimum-degree');
    const trial = await desk.run('trial', { key: 'm', choice, heldLast: new Int32Array(0) }, [], null, hear);
    expect(trial.ok && (trial.value.outcome.counts.factorEntries ?? 0)).toBeGreaterThan(made.summary.rows);
  });

  it('turns everything thrown into one typed reply', async () => {
    const desk = new Desk();
    const missing = await desk.run('survey', { key: 'nowhere' }, [], null, hear);
    expect(missing).toMatchObject({ ok: false, failure: { kind: 'internal' } });
    const { desk: other } = await withExample();
    const { defaultChoice } = await import('../../app/workers/rules.ts');
    const impossible = { ...defaultChoice('cholesky', 'natural'), ordering: 'imported' as const };
    const refused = await other.run(
      'trial',
      { key: 'm', choice: impossible, heldLast: new Int32Array(0) },
      [],
      null,
      hear,
    );
    expect(refused).toMatchObject({ ok: false, failure: { kind: 'input', code: 'trial-impossible' } });
  });

  it('stops at the next sign of life once the flag is set', async () => {
    const { desk } = await withExample();
    const stop = Int32Array.of(1);
    expect(await desk.run('survey', { key: 'm' }, [], stop, hear)).toMatchObject({
      ok: false,
      failure: { kind: 'stopped' },
    });
  });

  it('works on a matrix it was supplied with, and forgets it when told to', async () => {
    const { made } = await withExample();
    const desk = new Desk();
    const supply = [{ key: 'other', stock: made.stock }];
    expect((await desk.run('survey', { key: 'other' }, supply, null, hear)).ok).toBe(true);
    desk.forget('other');
    expect((await desk.run('survey', { key: 'other' }, [], null, hear)).ok).toBe(false);
  });
});
