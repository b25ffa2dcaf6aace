/** How the machine does work after what lies in the event queue already. */
export type Soon = (work: () => void) => void;

/** Lets in what lies in the queue before the work goes on. */
export function nextTurn(soon: Soon): Promise<void> {
  return new Promise((resolve) => soon(resolve));
}
