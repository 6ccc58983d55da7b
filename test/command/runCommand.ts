import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { dispatch } from '../../engine/command/dispatch.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';

const folder = mkdtempSync(join(tmpdir(), 'command-'));

/** Runs a call without a process. */
export async function runCommand(...words: string[]): Promise<{ status: number; out: string; error: string }> {
  let out = '';
  let error = '';
  const status = await dispatch(words, {
    line: (text) => {
      out += `${text}\n`;
    },
    error: (text) => {
      error += `${text}\n`;
    },
    file: async (path, chunks) => writeFileSync(path, Buffer.concat([...chunks])),
  });
  return { status, out, error };
}

/** A file of this run's own folder. */
export function tempFile(name: string, content: string | Uint8Array = ''): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

/** A real matrix as a Matrix Market file, general coordinate. */
export function matrixFile(name: string, a: SparseMatrix): string {
  const lines = ['%%MatrixMarket matrix coordinate real general', `${a.rows} ${a.columns} ${a.rowIndex.length}`];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      lines.push(`${a.rowIndex[p] + 1} ${j + 1} ${a.values?.[p] ?? 1}`);
    }
  }
  return tempFile(name, `${lines.join('\n')}\n`);
}
