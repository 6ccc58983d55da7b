import { Fault } from '../../engine/matrix/fault.ts';
import { Cancelled } from '../../engine/matrix/progress.ts';
import type { Failure } from './protocol.ts';

/** Puts whatever was thrown into the one shape that crosses threads. */
export function failureOf(thrown: unknown): Failure {
  if (thrown instanceof Fault) {
    const { kind, code, message, place, repairs } = thrown;
    return { kind, code, message, place, repairs };
  }
  if (thrown instanceof Cancelled) return plain('stopped', 'stopped', thrown.message);
  const message = thrown instanceof Error ? thrown.message : String(thrown);
  if (thrown instanceof RangeError && /alloc|length|size/i.test(message)) {
    return plain(
      'memory',
      'allocation-refused',
      `The browser refused memory for this step (${message}). Nothing else is lost.`,
    );
  }
  return plain('internal', 'internal-fault', `A fault inside the program: ${message}`);
}

/** A failure without place and repairs. */
export function plain(kind: Failure['kind'], code: string, message: string): Failure {
  return { kind, code, message, place: {}, repairs: [] };
}
