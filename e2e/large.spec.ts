import { createWriteStream, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createGzip } from 'node:zlib';
import { expect, test } from '@playwright/test';
import { figure, line, open } from './support.ts';

const k = 1000;

/** The five-point grid of k × k points, lower half, as a gzipped Matrix Market file. */
async function writeGrid(path: string): Promise<void> {
  const zip = createGzip({ level: 1 });
  const file = createWriteStream(path);
  zip.pipe(file);
  zip.write(`%%MatrixMarket matrix coordinate real symmetric\n${k * k} ${k * k} ${3 * k * k - 2 * k}\n`);
  for (let row = 0; row < k; row++) {
    let text = '';
    for (let column = 0; column < k; column++) {
      const j = row * k + column + 1;
      text += `${j} ${j} 4\n`;
      if (column + 1 < k) text += `${j + 1} ${j} -1\n`;
      if (row + 1 < k) text += `${j + k} ${j} -1\n`;
    }
    if (!zip.write(text)) await new Promise<void>((ready) => zip.once('drain', () => ready()));
  }
  zip.end();
  await new Promise<void>((done) => file.once('finish', () => done()));
}

test('a million rows: read, surveyed, ordered, forecast and drawn, against closed forms', async ({ page }) => {
  test.setTimeout(300_000);
  const folder = mkdtempSync(join(tmpdir(), 'fillcast-large-'));
  try {
    const path = join(folder, 'grid.mtx.gz');
    await writeGrid(path);
    await open(page);
    await page.locator('input[type="file"]').first().setInputFiles(path);
    await expect(page.locator('.topline')).toContainText('1,000,000 × 1,000,000', { timeout: 120_000 });
    await expect(page.getByText('The pattern is symmetric.')).toBeVisible({ timeout: 60_000 });
    await expect(line(page, 'natural').locator('[data-head="factor entries"]')).toBeVisible({ timeout: 120_000 });
    // a k × k grid in natural order: nnz(L) = k³ + k − 1 (closed form, counted column by column)
    expect(await figure(page, 'natural', 'factor entries')).toBe(k ** 3 + k - 1);
    await expect(line(page, 'minimum degree').locator('[data-head="factor entries"]')).toBeVisible({
      timeout: 180_000,
    });
    const entries = await figure(page, 'minimum degree', 'factor entries');
    // between the entries of the matrix and 31/4 n log₂ √n, George's count for nested dissection (1973, from memory), which minimum degree stays near
    expect(entries).toBeGreaterThan(3 * k * k);
    expect(entries).toBeLessThan(7.75 * k * k * Math.log2(k));
    const map = page.getByRole('application', { name: /^Map of minimum degree.*fill-in/ });
    await expect(map).toBeVisible({ timeout: 60_000 });
    const words = (await map.getAttribute('aria-label')) ?? '';
    const [, own, fill] = /([\d,]+) entries of the matrix; ([\d,]+) of fill-in/.exec(words) ?? [];
    expect(Number(own.replaceAll(',', ''))).toBe(3 * k * k - 2 * k);
    expect(Number(own.replaceAll(',', '')) + Number(fill.replaceAll(',', ''))).toBe(entries);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
});
