import { nearestWord } from "../notation/spelling.ts";
import { catalogue } from "../plan/findings.ts";
import { explain as explanation } from "../report/pages.ts";
import { emit } from "./output.ts";
import { UsageError } from "./usageError.ts";

/** `plumbline explain CODE`: the page of a finding, as the editor opens it. */
export async function explain(code: string): Promise<number> {
  const text = explanation(code.toLowerCase());
  if (text === null) {
    const codes = Object.keys(catalogue);
    const nearest = nearestWord(code, codes);
    throw new UsageError(
      `There is no finding ${code}${nearest ? `; did you mean ${nearest}?` : `. There are ${codes.join(", ")}.`}`,
    );
  }
  await emit(text.endsWith("\n") ? text : `${text}\n`, {});
  return 0;
}
