import { proxy, type Remote, wrap } from 'comlink';
import { plain } from './failure.ts';
import type {
  Answer,
  Ask,
  Early,
  Failure,
  Heard,
  MatrixKey,
  Operation,
  Reply,
  Supply,
  WorkerDesk,
} from './protocol.ts';
import { canShare } from './shared.ts';
import type { Stock } from './stock.ts';

/** `quick` answers the hand (pictures, hover) and is never kept waiting by a `long` one (reading, ordering, proving). */
export type Lane = 'quick' | 'long';

export interface JobOptions<K extends Operation> {
  readonly lane: Lane;
  /** higher goes first among the waiting; default 0 */
  readonly priority?: number;
  /** matrices the operation works on; supplied to the worker if it does not hold them */
  readonly matrices?: readonly MatrixKey[];
  /** key of the matrix that the worker itself makes and will hold */
  readonly makes?: MatrixKey;
  readonly hear?: (heard: Heard<Early<K>>) => void;
}

/** A job handed in. `reply` always settles, and always with a value. */
export interface Task<T> {
  readonly reply: Promise<Reply<T>>;
  stop(): void;
}

/** How long a worker may go on after its stop flag is set before it is ended, in milliseconds. */
const graceAfterStop = 1500;
/** More threads than this gain nothing here: trials are few, and each worker may hold its own copy of the matrix. */
const mostWorkers = 6;

const lost = plain(
  'worker-lost',
  'worker-lost',
  'The worker that did this stopped unexpectedly; most often the browser was short of memory. Nothing else is lost: a fresh worker has taken its place, and you can start this again.',
);
const stopped = plain('stopped', 'stopped', 'Stopped on request.');

interface Waiting {
  readonly lane: Lane;
  readonly priority: number;
  readonly serial: number;
  readonly matrices: readonly MatrixKey[];
  start(clerk: Clerk): void;
  settle(failure: Failure): void;
}

/** One worker thread and what the page knows about it. */
class Clerk {
  static made = 0;
  readonly name = `fillcast-${performance.timeOrigin}-${Clerk.made++}`;
  readonly worker = new Worker(new URL('./engine.worker.ts', import.meta.url), { type: 'module', name: this.name });
  readonly desk: Remote<WorkerDesk> = wrap<WorkerDesk>(this.worker);
  readonly holds = new Set<MatrixKey>();
  readonly lane: Lane;
  /** ends the job in hand with a failure; null while idle */
  abandon: ((failure: Failure) => void) | null = null;
  gone = false;

  constructor(lane: Lane, onLost: (clerk: Clerk) => void) {
    this.lane = lane;
    const report = () => {
      if (!this.gone) onLost(this);
    };
    this.worker.addEventListener('error', (event) => {
      event.preventDefault();
      report();
    });
    this.worker.addEventListener('messageerror', report);
    void this.desk.ready().then(() => {
      // granted only when the worker no longer exists: the one sign of a silent death
      if (navigator.locks !== undefined && !this.gone) void navigator.locks.request(this.name, report);
    });
  }

  end(failure: Failure): void {
    this.gone = true;
    this.worker.terminate();
    this.abandon?.(failure);
    this.abandon = null;
  }
}

/** Hands jobs to workers: one at a time each, by lane and priority. A worker that dies is replaced; its job fails, no other. */
export class WorkerPool {
  private readonly clerks: Clerk[] = [];
  private waiting: Waiting[] = [];
  private serial = 0;
  private readonly limit: Record<Lane, number>;
  private readonly stockOf: (key: MatrixKey) => Stock | null;

  constructor(stockOf: (key: MatrixKey) => Stock | null, threads = navigator.hardwareConcurrency || 2) {
    this.stockOf = stockOf;
    this.limit = { quick: 1, long: Math.max(1, Math.min(mostWorkers, threads - 1)) };
  }

  /** Starts the workers ahead of the first job, so that the first file does not wait for them. */
  warm(): void {
    if (this.clerks.length === 0) {
      this.hire('long');
      this.hire('quick');
    }
  }

  run<K extends Operation>(operation: K, ask: Ask<K>, options: JobOptions<K>): Task<Answer<K>> {
    let done = false;
    let settle!: (reply: Reply<Answer<K>>) => void;
    const reply = new Promise<Reply<Answer<K>>>((resolve) => {
      settle = (r) => {
        done = true;
        resolve(r);
      };
    });
    const flag = canShare ? new Int32Array(new SharedArrayBuffer(4)) : null;
    let clerk: Clerk | null = null;
    const job: Waiting = {
      lane: options.lane,
      priority: options.priority ?? 0,
      serial: this.serial++,
      matrices: options.matrices ?? [],
      settle: (failure) => settle({ ok: false, failure }),
      start: (hired) => {
        clerk = hired;
        hired.abandon = (failure) => settle({ ok: false, failure });
        const hear = (heard: Heard<Early<K>>) => {
          if (!done) options.hear?.(heard);
        };
        const call = hired.desk.run(operation, ask, this.supplyFor(hired, job.matrices), flag, proxy(hear));
        void call.then(
          (answer) => {
            const reply = answer as Reply<Answer<K>>;
            if (reply.ok && options.makes !== undefined) hired.holds.add(options.makes);
            this.release(hired, () => settle(reply));
          },
          (thrown) =>
            this.release(hired, () => settle({ ok: false, failure: plain('internal', 'call-failed', String(thrown)) })),
        );
      },
    };
    this.waiting.push(job);
    this.assign();
    const stop = () => {
      if (done) return;
      if (clerk === null) {
        this.waiting = this.waiting.filter((w) => w !== job);
        settle({ ok: false, failure: stopped });
        return;
      }
      const at = clerk;
      if (flag === null) return this.replace(at, stopped);
      Atomics.store(flag, 0, 1);
      setTimeout(() => {
        if (!done) this.replace(at, stopped);
      }, graceAfterStop);
    };
    return { reply, stop };
  }

  /** Lets every worker forget a matrix. */
  forget(key: MatrixKey): void {
    for (const clerk of this.clerks) {
      if (clerk.holds.delete(key)) void clerk.desk.forget(key);
    }
  }

  /** The matrices among `keys` that the worker does not hold yet; from now on it does. */
  private supplyFor(clerk: Clerk, keys: readonly MatrixKey[]): Supply {
    const supply: { key: MatrixKey; stock: Stock }[] = [];
    for (const key of keys) {
      if (clerk.holds.has(key)) continue;
      const stock = this.stockOf(key);
      if (stock === null) continue;
      clerk.holds.add(key);
      supply.push({ key, stock });
    }
    return supply;
  }

  private release(clerk: Clerk, answer: () => void): void {
    if (!clerk.gone) clerk.abandon = null;
    answer();
    this.assign();
  }

  private replace(clerk: Clerk, failure: Failure): void {
    const at = this.clerks.indexOf(clerk);
    if (at >= 0) this.clerks.splice(at, 1);
    clerk.end(failure);
    this.assign();
  }

  private hire(lane: Lane): Clerk {
    const clerk = new Clerk(lane, (dead) => this.replace(dead, lost));
    this.clerks.push(clerk);
    return clerk;
  }

  /** Gives waiting jobs to idle workers, hiring up to the limit of the lane. */
  private assign(): void {
    this.waiting.sort((a, b) => b.priority - a.priority || a.serial - b.serial);
    for (const job of [...this.waiting]) {
      const clerk = this.idle(job);
      if (clerk === null) continue;
      this.waiting = this.waiting.filter((w) => w !== job);
      job.start(clerk);
    }
  }

  /** An idle worker of the job's lane: best one that holds its matrices already. */
  private idle(job: Waiting): Clerk | null {
    const lane = this.clerks.filter((c) => c.lane === job.lane);
    const free = lane.filter((c) => c.abandon === null);
    const knows = (c: Clerk) => job.matrices.every((key) => c.holds.has(key));
    return free.find(knows) ?? free[0] ?? (lane.length < this.limit[job.lane] ? this.hire(job.lane) : null);
  }
}
