/** Waits for what another process does in its own time; what never comes fails with the check's own message. */
export async function eventually(check: () => void | Promise<void>): Promise<void> {
  const until = Date.now() + 20_000;
  for (;;) {
    try {
      await check();
      return;
    } catch (error) {
      if (until < Date.now()) throw error;
      await new Promise((done) => setTimeout(done, 20));
    }
  }
}
