import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    include: ["test/**/*.test.ts"],
    exclude: ["test/editor/**"],
    // Property tests and spawned servers share two cores here; a slow machine must not fail a right answer.
    testTimeout: 60_000,
  },
});
