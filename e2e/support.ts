import { readFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import { expect, type Locator, type Page } from '@playwright/test';

const matrices = join(import.meta.dirname, '../test/reference/matrices');

/** Path of a reference matrix. */
export function reference(name: string): string {
  return join(matrices, name);
}

/** Opens the page and waits for its worked examples. */
export async function open(page: Page): Promise<void> {
  await page.goto('/');
  await expect(page.getByRole('heading', { name: 'Drop a matrix on this sheet' })).toBeVisible();
}

/** Drops files on the page, as from a file manager. */
export async function drop(page: Page, files: readonly (string | { name: string; content: string })[]): Promise<void> {
  const list = files.map((f) =>
    typeof f === 'string'
      ? { name: basename(f), content: readFileSync(f, 'latin1') }
      : { name: f.name, content: f.content },
  );
  const transfer = await page.evaluateHandle((given) => {
    const data = new DataTransfer();
    for (const { name, content } of given) {
      data.items.add(new File([Uint8Array.from(content, (c) => c.charCodeAt(0))], name));
    }
    return data;
  }, list);
  await page.dispatchEvent('body', 'dragenter', { dataTransfer: transfer });
  await page.dispatchEvent('body', 'drop', { dataTransfer: transfer });
}

/** The line of the ledger whose ordering has that name. */
export function line(page: Page, ordering: string): Locator {
  return page.getByRole('row').filter({ has: page.getByRole('rowheader', { name: ordering }) });
}

/** The exact figure of a trial, read from its cell. */
export async function figure(page: Page, ordering: string, column: string): Promise<number> {
  const cell = line(page, ordering).locator(`[data-head="${column}"]`);
  await expect(cell).toBeVisible({ timeout: 30_000 });
  const exact = (await cell.getAttribute('title')) ?? '';
  return Number(exact.split(', ')[0].replaceAll(',', '').replace(/ .*/, ''));
}

/** Opens a worked example, the smallest unless a size is given. */
export async function openExample(page: Page, title: string, size?: number): Promise<void> {
  const name = size === undefined ? new RegExp(`^Open ${title}, `) : `Open ${title} with ${size}`;
  await page.getByRole('button', { name }).click();
}
