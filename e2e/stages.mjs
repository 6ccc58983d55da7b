/** The stages of the job, each as the steps that lead to it on a freshly opened page. */
export const stages = {
  async empty(page) {
    await page.getByRole('button', { name: /Open Seepage under a weir, / }).waitFor();
  },
};
