/**
 * Errors that a user can act on. Anything else thrown is an internal fault (exit status 1).
 */

/** Why something was refused or could not be completed; decides the exit status of the command line. */
export type FaultKind =
  /** the input or the call is wrong: exit status 2 */
  | 'input'
  /** the work could not be completed on this input: exit status 3 */
  | 'not-completed'
  /** the work would not fit in memory, refused or caught: exit status 3 */
  | 'memory';

/** Where in a file or matrix the trouble is; everything optional, 1-based where a text editor is (line, column of text). */
export interface FaultPlace {
  readonly file?: string;
  readonly member?: string;
  /** line of the text, 1-based */
  readonly line?: number;
  /** field in the line, 1-based */
  readonly field?: number;
  /** byte offset from the start of the (unpacked) file, 0-based */
  readonly byteOffset?: number;
  /** original row, 0-based */
  readonly row?: number;
  /** original column, 0-based */
  readonly column?: number;
}

/** A way out that a front end can offer as a button or an option. */
export interface Repair {
  /** stable word, e.g. "read-as-0-based" */
  readonly id: string;
  /** one sentence for the user */
  readonly text: string;
}

/** A refusal with place, reason, and repairs. `message` is complete by itself: where, what was expected, how to mend it. */
export class Fault extends Error {
  override readonly name = 'Fault';
  readonly kind: FaultKind;
  /** stable word for tests and front ends, e.g. "index-out-of-range" */
  readonly code: string;
  readonly place: FaultPlace;
  readonly repairs: readonly Repair[];

  constructor(kind: FaultKind, code: string, message: string, place: FaultPlace = {}, repairs: readonly Repair[] = []) {
    super(message);
    this.kind = kind;
    this.code = code;
    this.place = place;
    this.repairs = repairs;
  }
}
