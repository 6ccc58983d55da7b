/**
 * The speed of the hand on the maps: `npm run build && npm run bench -- maps [side]`. Opens the built page in Chromium, reads the five-point
 * grid of `side` × `side` (1000), puts the matrix and the factor of its minimum degree trial side by side, then zooms and drags.
 * Prints the time from the file's last byte to the first picture, and, over the frames, the time of the page's own thread (script,
 * style, paint) for each and the intervals between them, against a frame of a 60 Hz display (16.7 ms) as reference.
 */
import { type ChildProcess, spawn } from 'node:child_process';
import { createWriteStream, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { delimiter, join, resolve } from 'node:path';
import { type Browser, chromium, type Page } from '@playwright/test';

const side = Number(process.argv[2] ?? 1000);
const root = resolve(import.meta.dirname, '../../..');
const port = 4191;

async function writeGrid(path: string, k: number): Promise<void> {
  const out = createWriteStream(path);
  const n = k * k;
  out.write(`%%MatrixMarket matrix coordinate real symmetric\n${n} ${n} ${3 * n - 2 * k}\n`);
  for (let row = 0; row < k; row++) {
    let text = '';
    for (let column = 0; column < k; column++) {
      const j = row * k + column + 1;
      text += `${j} ${j} 4\n`;
      if (column + 1 < k) text += `${j + 1} ${j} -1\n`;
      if (row + 1 < k) text += `${j + k} ${j} -1\n`;
    }
    if (!out.write(text)) await new Promise<void>((ready) => out.once('drain', () => ready()));
  }
  await new Promise<void>((done) => out.end(() => done()));
}

interface Event {
  readonly name: string;
  readonly ph: string;
  readonly ts: number;
  readonly dur?: number;
  readonly tid: number;
  readonly pid: number;
}

/** Records the page's threads while something is done. */
async function traced(page: Page, act: () => Promise<void>): Promise<Event[]> {
  const session = await page.context().newCDPSession(page);
  const events: Event[] = [];
  session.on('Tracing.dataCollected', ({ value }) => events.push(...(value as unknown as Event[])));
  const over = new Promise<void>((done) => session.once('Tracing.tracingComplete', () => done()));
  await session.send('Tracing.start', {
    transferMode: 'ReportEvents',
    traceConfig: { includedCategories: ['devtools.timeline', 'disabled-by-default-devtools.timeline', 'toplevel'] },
  });
  await act();
  await session.send('Tracing.end');
  await over;
  return events;
}

const quantile = (x: readonly number[], q: number): number =>
  [...x].sort((a, b) => a - b)[Math.min(x.length - 1, Math.floor(q * x.length))];

/** Work of the page's own thread in each frame, and the intervals between frames, milliseconds. */
function framesOf(events: readonly Event[]): { work: number[]; intervals: number[] } {
  const fires = events.filter((e) => e.name === 'FireAnimationFrame');
  const { tid, pid } = fires[0];
  const starts = fires
    .filter((e) => e.tid === tid && e.pid === pid)
    .map((e) => e.ts)
    .sort((a, b) => a - b);
  // several callbacks of one frame follow each other at once
  const frames = starts.filter((t, k) => k === 0 || t - starts[k - 1] > 2000);
  const tasks = events.filter((e) => e.ph === 'X' && e.tid === tid && e.pid === pid && e.name === 'RunTask');
  const work = frames.slice(0, -1).map((from, k) => {
    const to = frames[k + 1];
    let busy = 0;
    for (const { ts, dur = 0 } of tasks) {
      const begin = Math.max(ts, from);
      const end = Math.min(ts + dur, to);
      if (end > begin) busy += end - begin;
    }
    return busy / 1000;
  });
  return { work, intervals: frames.slice(1).map((t, k) => (t - frames[k]) / 1000) };
}

/** In the page: a wheel event and a move of the pointer in every frame, in and out again, around a wandering point. */
async function zoomAtDisplayRate(map: Element, frames: number): Promise<void> {
  const box = map.getBoundingClientRect();
  for (let k = 0; k < frames; k++) {
    await new Promise(requestAnimationFrame);
    const at = {
      clientX: box.left + box.width * (0.6 + 0.2 * Math.sin(k / 23)),
      clientY: box.top + box.height * (0.6 + 0.2 * Math.cos(k / 31)),
      bubbles: true,
      cancelable: true,
    };
    map.dispatchEvent(new PointerEvent('pointermove', { ...at, pointerId: 1, pointerType: 'mouse' }));
    map.dispatchEvent(new WheelEvent('wheel', { ...at, deltaY: k % 120 < 70 ? -40 : 56 }));
  }
}

function report(title: string, events: readonly Event[]): void {
  const { work, intervals } = framesOf(events);
  const reference = 1000 / 60;
  const say = (name: string, value: number, goal: string) =>
    console.log(
      `  ${name.padEnd(48)} ${value.toFixed(1).padStart(7)} ms   ${(value / reference).toFixed(2)} of a 60 Hz frame${goal}`,
    );
  console.log(`${title}: ${work.length} frames`);
  say('work of the page thread, median', quantile(work, 0.5), '');
  say('work of the page thread, 95 % of frames within', quantile(work, 0.95), '   goal 12 ms');
  say('interval between frames, 95 % within', quantile(intervals, 0.95), '');
  say('longest interval between frames', Math.max(...intervals), '   goal 34 ms');
}

async function main(): Promise<void> {
  if (!existsSync(join(root, 'dist/index.html'))) throw new Error('Build the page first: npm run build.');
  const folder = mkdtempSync(join(tmpdir(), 'fillcast-maps-'));
  const file = join(folder, `grid-${side}.mtx`);
  await writeGrid(file, side);
  let server: ChildProcess | null = null;
  let browser: Browser | null = null;
  try {
    const vite = join(root, 'node_modules/vite/bin/vite.js');
    server = spawn(process.execPath, [vite, 'preview', '--port', String(port), '--strictPort'], { cwd: root });
    await new Promise((up) => server?.stdout?.once('data', up));
    const executablePath = (process.env.PATH ?? '')
      .split(delimiter)
      .map((at) => join(at, 'chromium'))
      .find((path) => existsSync(path));
    browser = await chromium.launch({
      ...(executablePath === undefined ? {} : { executablePath }),
      args: ['--no-sandbox', '--disable-gpu'],
    });
    const page = await browser.newPage({ viewport: { width: 1280, height: 800 } });
    await page.goto(`http://localhost:${port}/`);
    await page.locator('input[type="file"]').first().setInputFiles(file);
    const began = Date.now();
    await page.getByRole('application').first().waitFor({ timeout: 120_000 });
    const read = Date.now();
    await page
      .getByRole('application', { name: /entries of the matrix/ })
      .first()
      .waitFor({ timeout: 120_000 });
    console.log(`read in ${(read - began) / 1000} s; first picture ${Date.now() - read} ms after`);
    const map = page.getByRole('application', { name: /minimum degree.*fill-in/ });
    await map.waitFor({ timeout: 300_000 });
    await page
      .getByRole('row', { name: /nested dissection/ })
      .getByRole('gridcell')
      .nth(3)
      .waitFor({ timeout: 300_000 });
    await page.waitForTimeout(3000);
    for (const letter of ['B', 'A']) {
      const box = page.getByRole('checkbox', { name: `${letter} on the sheet` });
      if (await box.isChecked()) await box.uncheck({ force: true });
    }
    console.log(
      `on the sheet: ${await page.getByRole('application').evaluateAll((all) => all.map((m) => m.getAttribute('aria-label')?.slice(0, 90)).join(' | '))}`,
    );
    await page.waitForTimeout(3000);
    const area = await map.boundingBox();
    if (area === null) throw new Error('The map is not in sight.');
    const x = area.x + 0.6 * area.width;
    const y = area.y + 0.6 * area.height;
    const hover = await traced(page, async () => {
      await page.mouse.move(x, y);
      await map.evaluate(zoomAtDisplayRate, 240);
    });
    const drag = await traced(page, async () => {
      await page.mouse.down();
      for (let k = 0; k < 150; k++) await page.mouse.move(x + 60 * Math.sin(k / 9), y + 60 * Math.cos(k / 7));
      await page.mouse.up();
    });
    for (const [name, events] of [
      ['zooming at the display rate, the crosshair moving', hover],
      ['dragging', drag],
    ] as const) {
      report(name, events);
    }
  } finally {
    await browser?.close();
    server?.kill();
    rmSync(folder, { recursive: true, force: true });
  }
}

await main();
