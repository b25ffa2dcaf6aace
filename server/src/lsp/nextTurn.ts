/** Lets in what lies in the queue already before the work goes on. */
export function nextTurn(): Promise<void> {
  return new Promise((resolve) => setImmediate(resolve));
}
