import "./smallYoungSpace.ts";
import { printable } from "../report/printable.ts";
import { run } from "./run.ts";

// A reader that closes the pipe early (`| head`) has seen enough: that is no failure.
process.stdout.on("error", (error: NodeJS.ErrnoException) => {
  process.exit(error.code === "EPIPE" ? 0 : 2);
});
// What only goes along with the result must not change how it ends.
process.stderr.on("error", () => undefined);

run(process.argv).then(
  (code) => {
    process.exitCode = code;
  },
  (error: unknown) => {
    process.stderr.write(`plumbline: ${printable(error instanceof Error ? error.message : String(error))}\n`);
    process.exitCode = 2;
  },
);
