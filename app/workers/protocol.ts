/**
 * The one vocabulary between the page and its workers. Only plain data and typed arrays cross; no functions, no classes.
 * An operation is a name with what it asks and what it answers; jobs.ts does them, pool.ts hands them out.
 */

import type { FaultKind, FaultPlace, Repair } from '../../engine/matrix/fault.ts';
import type { Operations } from './operations.ts';
import type { Stock } from './stock.ts';

export type Operation = keyof Operations;
export type Ask<K extends Operation> = Operations[K]['ask'];
export type Answer<K extends Operation> = Operations[K]['answer'];
/** What an operation can hand over before it is finished (survey facts as they become known). */
export type Early<K extends Operation> = Operations[K]['early'];

/** Names a matrix that a worker holds or is supplied with; unique in one visit of the page. */
export type MatrixKey = string;

/** Everything that can end an operation without an answer, in one shape. */
export interface Failure {
  /** the engine's kinds, and three of the workers: stopped on request, the worker died, a fault inside the program */
  readonly kind: FaultKind | 'stopped' | 'worker-lost' | 'internal';
  /** stable word */
  readonly code: string;
  /** complete by itself: where, what, how to mend it */
  readonly message: string;
  readonly place: FaultPlace;
  readonly repairs: readonly Repair[];
}

export type Reply<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly failure: Failure };

/** A sign of life of a running operation. */
export interface Heard<E> {
  /** share done, 0 to 1 */
  readonly fraction: number;
  /** what is being done, in a few words */
  readonly phase: string;
  /** a part of the answer, ahead of it */
  readonly early: E | null;
}

/** Matrices that an operation needs and that its worker does not hold yet. */
export type Supply = readonly { readonly key: MatrixKey; readonly stock: Stock }[];

/** What a worker offers. Every call ends in one reply; nothing is thrown across. */
export interface WorkerDesk {
  /** Ready for work, and holding the lock by which its death is noticed. */
  ready(): Promise<void>;
  run<K extends Operation>(
    operation: K,
    ask: Ask<K>,
    supply: Supply,
    /** shared flag, 1 once the operation is to stop; null without shared memory (then the worker is ended instead) */
    stop: Int32Array | null,
    hear: (heard: Heard<Early<K>>) => void,
  ): Promise<Reply<Answer<K>>>;
  /** Lets go of a matrix. */
  forget(key: MatrixKey): void;
}
