import { transfer } from 'comlink';
import { Cancelled } from '../../engine/matrix/progress.ts';
import { failureOf } from './failure.ts';
import { jobs } from './jobs.ts';
import type { Answer, Ask, Early, Heard, MatrixKey, Operation, Reply, Supply, WorkerDesk } from './protocol.ts';
import { Shelf } from './shelf.ts';

/** Least time between two signs of life, in milliseconds: twenty a second is smooth enough and costs nothing. */
const hearEvery = 50;

/** The work of one worker, free of any thread: it runs the same way in tests. */
export class Desk implements WorkerDesk {
  private readonly shelf = new Shelf();

  async ready(): Promise<void> {}

  async run<K extends Operation>(
    operation: K,
    ask: Ask<K>,
    supply: Supply,
    stop: Int32Array | null,
    hear: (heard: Heard<Early<K>>) => void,
  ): Promise<Reply<Answer<K>>> {
    try {
      for (const { key, stock } of supply) this.shelf.put(key, stock);
      let last = Number.NEGATIVE_INFINITY;
      const progress = (fraction: number, phase: string) => {
        if (stop !== null && Atomics.load(stop, 0) === 1) throw new Cancelled();
        const now = performance.now();
        if (now - last < hearEvery) return;
        last = now;
        hear({ fraction, phase, early: null });
      };
      const early = (part: Early<K>, fraction: number, phase: string) => hear({ fraction, phase, early: part });
      const job = jobs[operation];
      const given: ArrayBuffer[] = [];
      const giveAway = (...buffers: ArrayBuffer[]) => void given.push(...buffers);
      const value = await job(ask, { shelf: this.shelf, progress, early, giveAway });
      return transfer({ ok: true as const, value }, given);
    } catch (thrown) {
      return { ok: false, failure: failureOf(thrown) };
    }
  }

  forget(key: MatrixKey): void {
    this.shelf.drop(key);
  }
}
