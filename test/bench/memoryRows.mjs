import { measureMemory } from "./measureMemory.mjs";
import { atMost, compared } from "./rows.mjs";

/** Peak memory of a server with one note open and edited. */
export async function memoryRows({ subject, echo, standIn, aimed }) {
  const ours = await measureMemory(aimed, subject, standIn);
  const theirs = await measureMemory(aimed, echo, standIn);
  const heading = {
    measure: `Peak memory, ${aimed.toLocaleString("en-US")} lines opened and edited 40 times`,
  };
  if (ours === null || theirs === null)
    return [heading, { measure: "resident", value: "not readable on this system" }];
  const aims = aimed === 10_000 ? [atMost(ours, 110, "under 110 MB")] : [];
  return [heading, compared("resident", ours, theirs, { unit: "MB", aims })];
}
