import { commandTests } from "./commandTests.ts";
import { noteTests } from "./noteTests.ts";
import { hasPage, page } from "./page.ts";
import { pageTests } from "./pageTests.ts";
import { previewTests } from "./previewTests.ts";
import type { Test } from "./workbench.ts";

// A desktop build has no page that could be asked: its run is the shorter for it, and says so by its count.
const tests: readonly Test[] = [
  ...noteTests,
  ...(hasPage ? [...pageTests, ...previewTests] : []),
  ...commandTests,
];

/** Runs the suite in the extension host. Throws where a test failed, as the editor expects it. */
export async function run(): Promise<void> {
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
