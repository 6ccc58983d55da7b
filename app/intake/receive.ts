/** Takes in files that were dropped or chosen together. */
export function receive(files: readonly File[]): void {
  console.info(files.length);
}
