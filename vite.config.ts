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

export default defineConfig({
  root: 'app',
  base: './',
  publicDir: '../public',
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
