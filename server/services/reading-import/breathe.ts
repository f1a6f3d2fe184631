/** Lets everything else that waits have its turn, between two pieces of long work. */
export function breathe(): Promise<void> {
  return new Promise((resolve) => {
    setImmediate(resolve);
  });
}
