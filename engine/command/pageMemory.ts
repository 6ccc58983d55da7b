/** What a run in the page may use, where a call does not say: three quarters of 8 GiB, as the page reckons. */
export const usualPageMemory = 6 * 2 ** 30;
