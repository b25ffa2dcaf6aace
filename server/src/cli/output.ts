import { writeFile } from "node:fs/promises";
import type { Severity } from "../plan/finding.ts";
import type { Paint } from "../report/findingsText.ts";
import type { Common } from "./run.ts";
import { UsageError } from "./usageError.ts";

/** Writes a result where it was asked for. */
export async function emit(text: string, { output }: Pick<Common, "output">): Promise<void> {
  if (output === undefined) {
    await new Promise<void>((resolve) => process.stdout.write(text, () => resolve()));
    return;
  }
  await writeFile(output, text).catch((error: NodeJS.ErrnoException) => {
    throw new UsageError(`${output} cannot be written (${error.code ?? error.message}).`);
  });
}

/** Colours where a terminal reads them; `NO_COLOR` and `FORCE_COLOR` are heard (no-color.org, common practice). */
export function painter({ color, output }: Pick<Common, "color" | "output">): Paint {
  return usesColor(color, output)
    ? (severity, text) => `\u001b[${codes[severity]}m${text}\u001b[0m`
    : (_, text) => text;
}

function usesColor(color: Common["color"], output: string | undefined): boolean {
  if (color !== "auto") return color === "always";
  if (process.env.NO_COLOR) return false;
  if (process.env.FORCE_COLOR) return process.env.FORCE_COLOR !== "0";
  return output === undefined && process.stdout.isTTY === true;
}

/** The severity is written in words too, so that nothing is said by colour alone. */
const codes: Readonly<Record<Severity, string>> = {
  error: "1;31",
  warning: "1;33",
  information: "36",
  hint: "2",
};
