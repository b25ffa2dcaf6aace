import { nearestWord } from "../notation/spelling.ts";
import { catalogue } from "../plan/findings.ts";
import { explain as explanation } from "../report/pages.ts";
import { emit } from "./output.ts";
import { UsageError } from "./usageError.ts";

/** `plumbline explain CODE`: the page of a finding, as the editor opens it; without a code, what there is. */
export async function explain(code: string | undefined): Promise<number> {
  if (code === undefined) {
    await emit(everyCode(), {});
    return 0;
  }
  const text = explanation(code.toLowerCase());
  if (text === null) {
    const codes = Object.keys(catalogue);
    const nearest = nearestWord(code, codes);
    throw new UsageError(
      `There is no finding ${code}${nearest ? `; did you mean ${nearest}?` : ": `plumbline explain` lists them."}`,
    );
  }
  await emit(text.endsWith("\n") ? text : `${text}\n`, {});
  return 0;
}

/** Every code with its title, in the catalogue's order. */
function everyCode(): string {
  const entries = Object.entries(catalogue);
  const width = Math.max(...entries.map(([code]) => code.length));
  return entries.map(([code, { title }]) => `${code.padEnd(width)}  ${title}\n`).join("");
}
