import { initialize } from "./initialize.mjs";
import { median } from "./median.mjs";
import { startServer } from "./startServer.mjs";

/** Median ms from spawning a server until `initialize` is answered, by turns in one and the other. */
export async function measureColdStart({ subject, echo, repetitions }) {
  const timings = { ours: [], echo: [] };
  for (let turn = 0; turn < repetitions; turn++) {
    timings.ours.push(await coldStart(subject));
    timings.echo.push(await coldStart(echo));
  }
  return { ours: median(timings.ours), echo: median(timings.echo) };
}

async function coldStart(command) {
  const start = performance.now();
  const server = startServer(...command);
  await initialize(server);
  const ms = performance.now() - start;
  await server.stop();
  return ms;
}
