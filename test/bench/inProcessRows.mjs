import { createRequire } from "node:module";
import { bundle } from "./bundle.mjs";
import { measureInProcess } from "./measureInProcess.mjs";
import { compared, single } from "./rows.mjs";

/** Parsing and evaluating without a server, against one scan of the text. */
export async function inProcessRows({ lengths, smoke, standIn }) {
  if (standIn) return [];
  const subject = createRequire(import.meta.url)(await bundle("subject.ts"));
  return lengths.flatMap((lines) => {
    const ms = measureInProcess(lines, subject, smoke ? 5 : Math.max(7, Math.round(40_000 / lines)));
    const rate = (lines / ms.check) * 1000;
    return [
      { measure: `${lines.toLocaleString("en-US")} lines in one process, warm` },
      compared("parse", ms.parse, ms.scan, { against: "scan" }),
      compared("evaluate", ms.evaluate, ms.scan, { against: "scan" }),
      compared("both", ms.check, ms.scan, { against: "scan" }),
      single("both, lines a second", rate, { unit: "lines/s" }),
    ];
  });
}
