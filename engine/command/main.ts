import { createWriteStream } from 'node:fs';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { dispatch } from './dispatch.ts';

process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  // the reader of a pipe went away: nothing left to say
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});

process.exitCode = await dispatch(process.argv.slice(2), {
  line: (text) => process.stdout.write(`${text}\n`),
  error: (text) => process.stderr.write(`${text}\n`),
  file: async (path, chunks) => pipeline(Readable.from(chunks), createWriteStream(path)),
});
