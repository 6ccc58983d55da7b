import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { line, open, openExample } from './support.ts';

/** Axe over the page as it stands; the list of what is wrong must be empty. */
async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map((v) => `${v.id}: ${v.nodes.map((n) => n.target.join(' ')).join(', ')}`)).toEqual([]);
}

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`${colorScheme} paper`, () => {
    test.use({ colorScheme });

    test('the first sight, the settings and a full ledger pass the accessibility scan', async ({ page }) => {
      await open(page);
      await expect(page.getByRole('button', { name: /^Open Seepage/ }).first()).toBeVisible();
      await expectAccessible(page);
      await page.getByRole('button', { name: /^target/ }).click();
      await expectAccessible(page);
      await page.keyboard.press('Escape');
      await openExample(page, 'Heat sink');
      await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible();
      await expectAccessible(page);
      await page.getByRole('tab', { name: 'Comparison' }).click();
      await expectAccessible(page);
      await page.getByRole('button', { name: 'Add a trial…' }).click();
      await expectAccessible(page);
    });

    test('every panel and every view passes the accessibility scan', async ({ page }) => {
      await open(page);
      await openExample(page, 'Seepage under a weir');
      await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible({ timeout: 60_000 });
      await page.getByRole('button', { name: /^C, minimum degree/ }).click();
      for (const name of ['Forecast', 'Proof', 'Handover', 'Import', 'Survey']) {
        await page.getByRole('tab', { name }).click();
        await expect(page.getByText('being opened…')).toHaveCount(0);
        if (name === 'Proof') {
          await page.getByRole('button', { name: 'Run the proof' }).click();
          await expect(page.getByRole('region', { name: 'Proof', exact: true })).toContainText('Trust');
        }
        await expectAccessible(page);
      }
      for (const name of ['Tree', 'Comparison', 'Growth', 'Maps']) {
        await page.getByRole('tab', { name }).click();
        await expect(page.getByText('being opened…')).toHaveCount(0);
        await expectAccessible(page);
      }
    });
  });
}

test('the theme can be switched by hand and is remembered, until it is erased', async ({ page }) => {
  await open(page);
  const paper = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
  const light = await paper();
  await page.getByRole('button', { name: /^target/ }).click();
  await page.getByLabel('paper').selectOption('dark');
  const dark = await paper();
  expect(dark).not.toBe(light);
  await page.reload();
  expect(await paper()).toBe(dark);
  await page.getByRole('button', { name: /^target/ }).click();
  await page.getByRole('button', { name: 'Erase all settings' }).click();
  expect(await paper()).toBe(light);
  expect(await page.evaluate(() => localStorage.length)).toBe(0);
});

test('the whole way to a chosen trial goes by keyboard', async ({ page }) => {
  await open(page);
  await expect(page.getByRole('button', { name: /^Open Seepage/ }).first()).toBeVisible();
  const focused = () =>
    page.evaluate(
      () => document.activeElement?.getAttribute('aria-label') ?? document.activeElement?.textContent ?? '',
    );
  const tabTo = async (name: RegExp) => {
    for (let k = 0; k < 80; k++) {
      await page.keyboard.press('Tab');
      if (name.test(await focused())) return;
    }
    throw new Error(`no way by Tab to ${name}`);
  };
  await tabTo(/^Open Heat sink, /);
  await page.keyboard.press('Enter');
  await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible();
  await tabTo(/^Add a trial/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Add a trial' })).toBeVisible();
  await page.keyboard.press('Escape');
  await tabTo(/^C, /);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('button', { name: /^C, .*chosen$/ })).toBeVisible();
  // one cell of the ledger takes the focus; arrows move it and the exact figure is read out under it
  await page.locator('[data-cell="0,0"]').focus();
  await page.keyboard.press('ArrowDown');
  await page.keyboard.press('ArrowRight');
  await expect(page.locator('[data-cell="1,1"]')).toBeFocused();
  await expect(page.locator('.ledger-reading')).toContainText('B fill ratio');
});

test('a phone of 390 pixels sees everything without scrolling sideways', async ({ page }) => {
  await page.setViewportSize({ width: 390, height: 844 });
  await open(page);
  const overflow = () => page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
  expect(await overflow()).toBeLessThanOrEqual(0);
  await openExample(page, 'Heat sink');
  await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible();
  expect(await overflow()).toBeLessThanOrEqual(0);
  await page.getByRole('tab', { name: 'Survey' }).click();
  await expect(page.getByText('The pattern is symmetric.')).toBeVisible();
  expect(await overflow()).toBeLessThanOrEqual(0);
});

test('at 200 % zoom of a small screen everything can still be reached', async ({ page }) => {
  // 1280 × 800 at 200 % is a window of 640 × 400 CSS pixels
  await page.setViewportSize({ width: 640, height: 400 });
  await open(page);
  await openExample(page, 'Heat sink');
  const row = line(page, 'nested dissection').getByRole('gridcell').nth(3);
  await expect(row).toBeVisible();
  await row.scrollIntoViewIfNeeded();
  await expect(row).toBeInViewport();
  expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth)).toBeLessThanOrEqual(0);
});
