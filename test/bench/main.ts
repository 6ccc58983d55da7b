/**
 * `npm run bench -- NAME [arguments]`: runs test/bench/NAME/main.ts. Benchmarks print ratios against a reference measured in the same run.
 */
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';

const here = import.meta.dirname;
const names = readdirSync(here, { withFileTypes: true })
  .filter((entry) => entry.isDirectory() && existsSync(join(here, entry.name, 'main.ts')))
  .map((entry) => entry.name);
const wanted = process.argv[2];
if (wanted === undefined || !names.includes(wanted)) {
  console.error(`Which benchmark? ${names.join(', ')}`);
  process.exitCode = 2;
} else {
  process.argv.splice(2, 1);
  await import(pathToFileURL(join(here, wanted, 'main.ts')).href);
}
