/**
 * The house keeps its plan: imports go one way, engine/ depends on nothing outside itself, files stay readable, every path that a
 * guide names exists.
 */
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';

const root = resolve(import.meta.dirname, '..');

function filesUnder(folder: string, ending: RegExp): string[] {
  const out: string[] = [];
  for (const entry of readdirSync(join(root, folder), { withFileTypes: true })) {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) out.push(...filesUnder(path, ending));
    else if (ending.test(entry.name)) out.push(path);
  }
  return out;
}

/** Module names a source file imports. */
function importsOf(source: string): string[] {
  const out: string[] = [];
  for (const match of source.matchAll(/(?:^|\n)\s*(?:import|export)\s[^;]*?from\s+'([^']+)'/g)) out.push(match[1]);
  for (const match of source.matchAll(/(?:^|\n)\s*import\s+'([^']+)'/g)) out.push(match[1]);
  for (const match of source.matchAll(/\bimport\(\s*'([^']+)'\s*\)/g)) out.push(match[1]);
  return out;
}

const base = ['matrix', 'graph'];
const middle = [...base, 'exchange', 'survey', 'prepare', 'ordering', 'symbolic', 'problems'];
const upper = [...middle, 'forecast', 'picture', 'numeric'];

/** room -> the rooms it may import besides itself */
const allowed: Readonly<Record<string, readonly string[]>> = {
  matrix: [],
  graph: ['matrix'],
  problems: ['matrix'],
  exchange: base,
  survey: base,
  prepare: base,
  ordering: base,
  symbolic: base,
  forecast: [...base, 'symbolic'],
  picture: [...base, 'symbolic'],
  numeric: [...base, 'symbolic'],
  trial: upper,
  handover: [...upper, 'trial'],
  command: [...upper, 'trial', 'handover'],
};

function wrongImports(file: string): string[] {
  const source = readFileSync(join(root, file), 'utf8');
  const [, room] = file.split('/');
  const wrong: string[] = [];
  for (const name of importsOf(source)) {
    if (!name.startsWith('.')) {
      if (!(room === 'command' && (name.startsWith('node:') || name === 'fflate')))
        wrong.push(`${file} imports ${name}`);
      continue;
    }
    const target = relative(root, resolve(root, dirname(file), name));
    const [top, targetRoom] = target.split('/');
    if (!existsSync(join(root, target))) wrong.push(`${file} imports ${name}, which does not exist`);
    else if (top === 'app') {
      // unpacking uses a library, so it lives outside the engine; the command line shares it with the page
      if (!(room === 'command' && targetRoom === 'unpack')) wrong.push(`${file} imports ${target}`);
    } else if (top !== 'engine') wrong.push(`${file} imports ${target}`);
    else if (targetRoom !== room && !(allowed[room] ?? []).includes(targetRoom))
      wrong.push(`${file} imports ${target}`);
  }
  return wrong;
}

describe('the house', () => {
  it('reads imports of every form (the reader is itself tested)', () => {
    const source =
      "import a from './a.ts';\nimport {\n  b,\n} from '../b.ts';\nexport { c } from 'c';\nimport './d.css';\nawait import('./e.ts');\n";
    expect(importsOf(source).sort()).toEqual(['../b.ts', './a.ts', './d.css', './e.ts', 'c']);
  });

  it('engine/: imports go one way and nothing comes from outside', () => {
    expect(filesUnder('engine', /\.ts$/).flatMap(wrongImports)).toEqual([]);
  });

  it('engine/: every folder is a room of the plan', () => {
    const rooms = readdirSync(join(root, 'engine'), { withFileTypes: true }).map((entry) => entry.name);
    expect(rooms.filter((room) => !(room in allowed))).toEqual([]);
  });

  it('app/: only workers reach into the engine with code; the rest takes types and plain vocabularies', () => {
    const wrong: string[] = [];
    for (const file of filesUnder('app', /\.tsx?$/)) {
      const folder = file.split('/')[1];
      if (folder === 'workers' || folder === 'unpack') continue;
      const source = readFileSync(join(root, file), 'utf8').replace(/import type [^;]+;/g, '');
      for (const name of importsOf(source)) {
        if (!name.startsWith('.')) continue;
        const target = relative(root, resolve(root, dirname(file), name));
        if (target.startsWith('engine/') && !vocabularies.has(target)) wrong.push(`${file} imports ${target}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it('no source file is longer than 500 lines', () => {
    const long: string[] = [];
    for (const folder of ['app', 'engine', 'test', 'e2e']) {
      for (const file of filesUnder(folder, /\.(ts|tsx|mjs|css)$/)) {
        const lines = readFileSync(join(root, file), 'utf8').split('\n').length - 1;
        if (lines > 500) long.push(`${file}: ${lines}`);
      }
    }
    expect(long).toEqual([]);
  });

  it('the top level holds what the plan names and nothing else', () => {
    const known = new Set([
      'app',
      'engine',
      'test',
      'e2e',
      'public',
      'package.json',
      'package-lock.json',
      'vite.config.ts',
      'tsconfig.json',
      'README.md',
      'DEVELOPERS.md',
      'LICENSE',
      'node_modules',
      'dist',
    ]);
    const extra = readdirSync(root).filter((name) => !name.startsWith('.') && !known.has(name));
    expect(extra).toEqual([]);
  });

  it('every path a guide names exists', () => {
    const missing: string[] = [];
    const guides = [
      'README.md',
      'DEVELOPERS.md',
      ...['app', 'engine', 'test', 'e2e'].flatMap((f) => filesUnder(f, /^README\.md$/)),
    ];
    for (const guide of guides) {
      const text = readFileSync(join(root, guide), 'utf8');
      for (const [, path] of text.matchAll(/`((?:app|engine|test|e2e|public)\/[\w./-]*)`/g)) {
        if (!existsSync(join(root, path))) missing.push(`${guide}: ${path}`);
      }
    }
    expect(missing).toEqual([]);
    expect(statSync(join(root, 'DEVELOPERS.md')).size).toBeGreaterThan(500);
  });
});

/** Engine files that are plain words and constants, safe to load on the page's own thread. */
const vocabularies = new Set([
  'engine/trial/choice.ts',
  'engine/matrix/fault.ts',
  'engine/matrix/progress.ts',
  'engine/picture/window.ts',
]);
