import { createHash } from 'node:crypto';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import type { Plugin } from 'vite';
import { defineConfig } from 'vitest/config';

/**
 * The page may talk to nothing but the place it came from: no other origin in any directive.
 * `wasm-unsafe-eval` and `unsafe-eval` are absent on purpose. Styles set from script (element.style) need no exception.
 */
const policy = [
  "default-src 'none'",
  "script-src 'self'",
  "worker-src 'self' blob:",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "font-src 'self'",
  "manifest-src 'self'",
  "connect-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');

/** Headers for cross-origin isolation (shared memory between workers) and for the policy above. */
const headers = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
  'Cross-Origin-Resource-Policy': 'same-origin',
  'Content-Security-Policy': policy,
  'Referrer-Policy': 'no-referrer',
};

/** Builds the service worker beside the page and writes into it which files the build consists of. */
function offline(): Plugin {
  const name = 'service-worker.js';
  return {
    name: 'offline',
    apply: 'build',
    buildStart() {
      this.emitFile({ type: 'chunk', id: resolve(import.meta.dirname, 'app/offline/service.ts'), fileName: name });
    },
    writeBundle({ dir }) {
      if (dir === undefined) return;
      const files = readdirSync(dir, { recursive: true, withFileTypes: true })
        .filter((entry) => entry.isFile() && entry.name !== name && !entry.parentPath.endsWith('screens'))
        .map((entry) => join(entry.parentPath, entry.name).slice(dir.length + 1))
        .sort();
      const hash = createHash('sha256');
      for (const file of files) hash.update(file).update(readFileSync(join(dir, file)));
      const list = { version: hash.digest('hex').slice(0, 12), files: files.map((file) => `./${file}`) };
      const path = join(dir, name);
      writeFileSync(path, `const __PRECACHE__ = ${JSON.stringify(list)};\n${readFileSync(path, 'utf8')}`);
    },
  };
}

export default defineConfig({
  root: 'app',
  base: './',
  publicDir: '../public',
  plugins: [offline()],
  build: { outDir: '../dist', emptyOutDir: true, target: 'es2022' },
  worker: { format: 'es' },
  server: { headers },
  preview: { headers, port: 4173 },
  test: {
    root: '.',
    include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
    environment: 'node',
    testTimeout: 60_000,
    pool: 'forks',
  },
});
