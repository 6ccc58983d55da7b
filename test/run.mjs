/**
 * `npm test`: installs what is missing, then type check, lint, unit and reference tests, build, browser tests.
 * Ends with one line "N passed, N failed" and a matching exit status. Plain JavaScript: it runs before anything is installed.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { delimiter, join } from 'node:path';

const root = join(import.meta.dirname ?? new URL('.', import.meta.url).pathname, '..');
const cache = join(root, '.cache');
let passed = 0;
let failed = 0;
let skipped = 0;

function run(command, args, env = {}) {
  console.log(`\n> ${command} ${args.join(' ')}`);
  const done = spawnSync(command, args, { cwd: root, stdio: 'inherit', env: { ...process.env, ...env } });
  return done.status === 0;
}

/** One named step counted as one test. */
function step(name, ok) {
  if (ok) passed++;
  else {
    failed++;
    console.error(`FAILED: ${name}`);
  }
  return ok;
}

function onPath(name) {
  for (const folder of (process.env.PATH ?? '').split(delimiter)) {
    if (folder !== '' && existsSync(join(folder, name))) return join(folder, name);
  }
  return null;
}

function findChromium() {
  return ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'].map(onPath).find((p) => p !== null);
}

/** Debian's package when root; else the test tool's own download. */
function ensureChromium() {
  if (findChromium()) return true;
  if (process.getuid?.() === 0 && onPath('apt-get')) {
    run('apt-get', ['update', '-q']);
    run('apt-get', ['install', '-y', '-q', 'chromium'], { DEBIAN_FRONTEND: 'noninteractive' });
    if (findChromium()) return true;
  }
  if (run('npx', ['playwright', 'install', 'chromium'])) return true;
  console.error(
    'No Chromium found and none could be installed. Install the package "chromium" and run npm test again.',
  );
  return false;
}

function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

/** Adds a report's counts; a run that left no report, or failed with no failure counted, is itself a failure. */
function count(name, ok, counts) {
  if (counts === null) {
    step(`${name} left no report`, false);
    return;
  }
  passed += counts.passed;
  failed += counts.failed;
  skipped += counts.skipped;
  if (counts.passed === 0) step(`${name} ran no test`, false);
  else if (!ok && counts.failed === 0) step(`${name} ended with an error outside its tests`, false);
}

function unitCounts(report) {
  if (report === null) return null;
  return { passed: report.numPassedTests, failed: report.numFailedTests, skipped: report.numPendingTests };
}

function browserCounts(report) {
  if (report === null) return null;
  const { expected, flaky, unexpected, skipped: left } = report.stats;
  return { passed: expected + flaky, failed: unexpected, skipped: left };
}

function main() {
  mkdirSync(cache, { recursive: true });
  if (!existsSync(join(root, 'node_modules', '.package-lock.json'))) {
    if (!step('npm ci', run('npm', ['ci', '--no-audit', '--no-fund']))) return;
  }
  step('types', run('npm', ['run', '-s', 'test:types']));
  step('format and lint', run('npm', ['run', '-s', 'test:lint']));

  const unitReport = join(cache, 'unit.json');
  rmSync(unitReport, { force: true });
  const unitOk = run('npx', [
    'vitest',
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${unitReport}`,
  ]);
  count('unit and reference tests', unitOk, unitCounts(readJson(unitReport)));

  if (!step('build', run('npm', ['run', '-s', 'build']))) return;
  if (!step('Chromium is here', ensureChromium())) return;
  const browserReport = join(root, 'e2e', 'results', 'results.json');
  rmSync(browserReport, { force: true });
  const browserOk = run('npm', ['run', '-s', 'test:browser']);
  count('browser tests', browserOk, browserCounts(readJson(browserReport)));
}

main();
console.log(
  skipped > 0 ? `\n${passed} passed, ${failed} failed, ${skipped} skipped` : `\n${passed} passed, ${failed} failed`,
);
process.exitCode = failed > 0 || passed === 0 ? 1 : 0;
