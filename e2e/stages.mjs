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
};
