import { noteTests } from "../suite/noteTests.ts";
import { runTests } from "../suite/runTests.ts";
import { webTests } from "./webTests.ts";

/** The suite for the browser's extension host. What opens no other note comes first. */
export function run(): Promise<void> {
  return runTests([...webTests, ...noteTests]);
}
