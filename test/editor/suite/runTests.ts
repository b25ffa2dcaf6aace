import { hasPage, page } from "./page.ts";
import type { Test } from "./workbench.ts";

/** Runs tests in the extension host. Throws where one failed, as the editor expects it. */
export async function runTests(tests: readonly Test[]): Promise<void> {
  let failed = 0;
  for (const [name, test] of tests) {
    try {
      await test();
      console.log(`  ok    ${name}`);
    } catch (error) {
      failed++;
      const why = error instanceof Error ? (error.stack ?? error.message) : String(error);
      console.log(`  FAIL  ${name}\n        ${why}`);
      // The picture helps whoever reads the failure; that it cannot be taken is no failure of its own.
      if (hasPage) await page.screenshot(`failed-${failed}`).catch(() => undefined);
    }
  }
  console.log(`editor: ${tests.length - failed} passed, ${failed} failed`);
  if (failed > 0) throw new Error(`${failed} of ${tests.length} editor tests failed.`);
}
