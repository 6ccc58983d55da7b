import { Fault, type Repair } from '../matrix/fault.ts';
import { guessColumns } from './coordinateGuess.ts';
import { quoted } from './marketHeader.ts';
import type { FileKind } from './recognise.ts';

/** A file of another kind, with the line that would write a matrix for us in a general-purpose scripting library. */
export function refuseForeign(file: string, what: string): Fault {
  return new Fault(
    'input',
    'other-format',
    `${file}, byte 0: this looks like ${what}; expected a matrix in text form. Write it as Matrix Market text, for instance with scipy.io.mmwrite("matrix.mtx", A).`,
    { file, byteOffset: 0 },
  );
}

/** Text without a banner: what it seems to hold, and the readings that can be confirmed. */
export function refuseWithoutBanner(file: string, head: Uint8Array, kind: FileKind): Fault {
  const guess = guessColumns(head);
  const place = { file, line: guess.firstLine };
  const first = `the first line is "${quoted(guess.first)}"`;
  if (kind === 'node-dof-table') {
    return new Fault(
      'input',
      'node-dof-table',
      `${file}, line ${guess.firstLine}: expected a Matrix Market banner; ${first}, which looks like a table of node, dof, node, dof, value. It can be read as one; each node and dof becomes a row, kept as its label.`,
      place,
      [{ id: 'read-as-node-table', text: 'Read as a table of node, dof, node, dof, value' }],
    );
  }
  if (kind !== 'coordinate-text') {
    return new Fault(
      'input',
      'no-banner',
      `${file}, line ${guess.firstLine}: expected the banner "%%MatrixMarket matrix coordinate real general", and ${first}. If this is coordinate text, write lines of row, column, value.`,
      place,
    );
  }
  const repairs: Repair[] = [
    { id: 'read-as-coordinate-text', text: `Read as coordinate text: ${guess.columns}, counted from ${guess.base}` },
  ];
  if (guess.oneTriangle) {
    repairs.push({ id: 'read-as-symmetric-text', text: 'Read as coordinate text, one triangle of a symmetric matrix' });
  }
  return new Fault(
    'input',
    'no-banner',
    `${file}, line ${guess.firstLine}: expected the banner "%%MatrixMarket matrix coordinate real general"; ${first}. It looks like coordinate text: ${guess.columns}, counted from ${guess.base}, ${guess.size}. It can be read so.`,
    place,
    repairs,
  );
}
