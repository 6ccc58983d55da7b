import { expect, type Page, test } from '@playwright/test';
import { open } from './support.ts';

/** Presses Tab until the focus stands on something whose name or text fits; fails after a whole round. */
async function tabTo(page: Page, wanted: RegExp): Promise<void> {
  const seen: string[] = [];
  for (let k = 0; k < 160; k++) {
    await page.keyboard.press('Tab');
    const name = await page.evaluate(() => {
      const at = document.activeElement;
      if (at === null || at === document.body) return '';
      return `${at.getAttribute('aria-label') ?? ''} ${at.textContent ?? ''}`.trim().slice(0, 200);
    });
    seen.push(name.slice(0, 40));
    if (wanted.test(name)) return;
  }
  throw new Error(`no way by Tab to ${wanted}; met ${[...new Set(seen)].join(' | ')}`);
}

/** From one tab of a strip to another, by arrow keys. */
async function tabStripTo(page: Page, wanted: string): Promise<void> {
  for (let k = 0; k < 8; k++) {
    if ((await page.evaluate(() => document.activeElement?.textContent)) === wanted) return;
    await page.keyboard.press('ArrowRight');
  }
  throw new Error(`no tab ${wanted}`);
}

test('the whole job without a mouse: open, map, trial, proof, handover', async ({ page }) => {
  await open(page);
  await tabTo(page, /^Open Seepage under a weir/);
  await page.keyboard.press('Enter');
  await expect(
    page
      .getByRole('row', { name: /minimum degree/ })
      .locator('[data-cell]')
      .first(),
  ).toBeVisible({
    timeout: 60_000,
  });

  // the maps: to the map of the matrix, crosshair, zoom
  await tabTo(page, /^Map of as read/);
  await page.keyboard.press('ArrowDown');
  const reading = page.getByRole('region', { name: 'Under the crosshair' });
  await expect(reading).toContainText('row, column');
  const before = await page.locator('.legend').textContent();
  for (let k = 0; k < 6; k++) await page.keyboard.press('+');
  await expect(page.locator('.legend')).not.toHaveText(before ?? '');
  await page.keyboard.press('0');
  await page.keyboard.press('Escape');

  // the ledger: choose a trial by its name
  await tabTo(page, /^C, minimum degree/);
  await page.keyboard.press('Enter');

  // the panels: proof, then handover
  await tabTo(page, /^Survey/);
  await tabStripTo(page, 'Proof');
  await tabTo(page, /^Run the proof/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('region', { name: 'Proof', exact: true })).toContainText('Trust', { timeout: 60_000 });

  await page.keyboard.press('Shift+Tab');
  await page.getByRole('tab', { name: 'Proof' }).focus();
  await tabStripTo(page, 'Handover');
  await tabTo(page, /^Save the permutation/);
  const waiting = page.waitForEvent('download');
  await page.keyboard.press('Enter');
  expect((await waiting).suggestedFilename()).toContain('minimum-degree');
});

test('a dialog takes the focus, keeps it, and gives it back', async ({ page }) => {
  await open(page);
  await tabTo(page, /^Open Seepage under a weir/);
  await page.keyboard.press('Enter');
  await expect(
    page
      .getByRole('row', { name: /minimum degree/ })
      .locator('[data-cell]')
      .first(),
  ).toBeVisible({
    timeout: 60_000,
  });
  await tabTo(page, /^Add a trial/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('dialog')).toBeVisible();
  for (let k = 0; k < 5; k++) await page.keyboard.press('Tab');
  expect(await page.evaluate(() => document.activeElement?.closest('dialog') !== null)).toBe(true);
  await page.keyboard.press('Escape');
  await expect(page.getByRole('dialog')).toBeHidden();
  expect(await page.evaluate(() => document.activeElement?.textContent)).toContain('Add a trial');
});

test('at 200 % zoom and at the least width nothing is lost sideways', async ({ page }) => {
  for (const width of [640, 390]) {
    await page.setViewportSize({ width, height: 500 });
    await open(page);
    await page.getByRole('button', { name: /^Open Seepage under a weir, / }).click();
    await expect(page.getByRole('application', { name: /^Map of/ }).last()).toBeVisible({ timeout: 60_000 });
    const wide = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
    expect(wide).toBeLessThanOrEqual(0);
  }
});

test('reduced motion: nothing on the page moves by itself', async ({ page }) => {
  await page.emulateMedia({ reducedMotion: 'reduce' });
  await open(page);
  const moving = await page.evaluate(() => document.getAnimations().filter((a) => a.playState === 'running').length);
  expect(moving).toBe(0);
});
