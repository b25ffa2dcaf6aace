import { tests } from "./tests.ts";

/** Runs the suite in the extension host. Throws where a test failed, as the editor expects it. */
export async function run(): Promise<void> {
  let failed = 0;
  for (const [name, test] of tests) {
    try {
      await test();
      console.log(`  ok    ${name}`);
    } catch (error) {
      failed++;
      console.log(
        `  FAIL  ${name}\n        ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
      );
    }
  }
  console.log(`editor: ${tests.length - failed} passed, ${failed} failed`);
  if (failed > 0) throw new Error(`${failed} of ${tests.length} editor tests failed.`);
}
