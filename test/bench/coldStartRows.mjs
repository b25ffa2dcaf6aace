import { measureColdStart } from "./measureColdStart.mjs";
import { atMost, compared } from "./rows.mjs";

/** From spawning the server to `initialize` answered. */
export async function coldStartRows({ subject, echo, smoke }) {
  const start = await measureColdStart({ subject, echo, repetitions: smoke ? 3 : 25 });
  const aims = [atMost(start.ours / start.echo, 1.5, "1.5 times echo")];
  return [
    { measure: "Start" },
    compared("spawned until initialize is answered", start.ours, start.echo, { aims }),
  ];
}
