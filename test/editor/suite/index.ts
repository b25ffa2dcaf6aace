import { commandTests } from "./commandTests.ts";
import { noteTests } from "./noteTests.ts";
import { hasPage } from "./page.ts";
import { pageTests } from "./pageTests.ts";
import { previewTests } from "./previewTests.ts";
import { reviewTests } from "./reviewTests.ts";
import { runTests } from "./runTests.ts";
import { writingPageTests, writingTests } from "./writingTests.ts";

/** The suite for Node's extension host. */
export function run(): Promise<void> {
  // A desktop build has no page that could be asked: its run is the shorter for it, and says so by its count.
  return runTests([
    ...noteTests,
    ...writingTests,
    ...(hasPage ? [...writingPageTests, ...pageTests, ...previewTests] : []),
    ...reviewTests,
    ...commandTests,
  ]);
}
