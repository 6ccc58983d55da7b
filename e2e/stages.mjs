/** The stages of the job, each as the steps that lead to it on a freshly opened page. */
export const stages = {
  async empty(page) {
    await page.getByRole('button', { name: /Open Seepage under a weir, / }).waitFor();
  },
  async trials(page) {
    await page.getByRole('button', { name: /Open Heat sink, / }).click();
    await page
      .getByRole('row', { name: /nested dissection/ })
      .getByRole('gridcell')
      .nth(3)
      .waitFor();
    await page.waitForTimeout(1500);
  },
  async maps(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: /^D, / }).click();
    const map = page.getByRole('application', { name: /^Map of nested dissection.*fill-in/ });
    await map.waitFor();
    const box = await map.boundingBox();
    await page.mouse.move(box.x + 0.8 * box.width, box.y + 0.86 * box.height);
    await page.waitForTimeout(600);
  },
  async tree(page) {
    await stages.trials(page);
    await page.getByRole('tab', { name: 'Tree' }).click();
    await page.getByRole('application', { name: /^Assembly tree/ }).waitFor();
    await page.waitForTimeout(300);
  },
  async comparison(page) {
    await stages.trials(page);
    await page.getByRole('tab', { name: 'Comparison' }).click();
    await page.locator('.chart').first().waitFor();
  },
  async forecast(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: /^D, / }).click();
    await page.getByRole('tab', { name: 'Forecast' }).click();
    await page.getByText('Memory, by layout').waitFor();
    await page.getByText('More workers').scrollIntoViewIfNeeded();
  },
  async proof(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: /^C, / }).click();
    await page.getByRole('tab', { name: 'Proof' }).click();
    await page.getByRole('button', { name: 'Run the proof' }).click();
    await page.getByText('Forecast against proof', { exact: true }).first().waitFor();
    await page.waitForTimeout(300);
  },
  async handover(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: /^C, / }).click();
    await page.getByRole('tab', { name: 'Handover' }).click();
    await page.getByRole('button', { name: 'Save all as one zip' }).waitFor();
    await page.waitForTimeout(300);
  },
  async add(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: 'Add a trial…' }).click();
    await page.waitForTimeout(200);
  },
  async settings(page) {
    await page.getByRole('button', { name: /^target/ }).click();
    await page.waitForTimeout(200);
  },
  async term(page) {
    await stages.trials(page);
    await page.getByRole('button', { name: 'fill ratio: what it means' }).click();
    await page.waitForTimeout(200);
  },
};
