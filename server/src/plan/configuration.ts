import {
  findNodeAtLocation,
  getNodeValue,
  type Node,
  type ParseError,
  parseTree,
  printParseErrorCode,
} from "jsonc-parser";
import { findingCodes } from "../notation/codes.ts";
import { nearestWord } from "../notation/spelling.ts";
import type { FindingCode } from "./findings.ts";
import { type Level, levels, type Severities } from "./severities.ts";

/** The name of the file, in the root of a folder of notes. */
export const CONFIGURATION_FILE = "plumbline.json";

/** What a folder's checked-in `plumbline.json` says. It holds for the editor and the command line alike. */
export interface Configuration {
  readonly severity: Severities;
  /** What is not read, as `.gitignore` writes it. */
  readonly exclude: readonly string[];
  /** Null where it does not say. */
  readonly failOn: "error" | "warning" | "never" | null;
}

export const noConfiguration: Configuration = { severity: {}, exclude: [], failOn: null };

/** What is wrong in the file: a sentence and a stretch of its text. */
export interface ConfigurationProblem {
  readonly message: string;
  readonly start: number;
  readonly end: number;
}

/** Reads the file. With a problem nothing of it holds, so that nothing is lowered by half a file. */
export function readConfiguration(text: string): {
  readonly configuration: Configuration;
  readonly problems: readonly ConfigurationProblem[];
} {
  const errors: ParseError[] = [];
  const root = parseTree(text, errors, { disallowComments: false, allowTrailingComma: true });
  const problems: ConfigurationProblem[] = errors.map(({ error, offset, length }) => ({
    message: `This is not JSON here (${spaced(printParseErrorCode(error))}).`,
    start: offset,
    end: offset + length,
  }));
  if (problems.length > 0) return { configuration: noConfiguration, problems };
  if (root?.type !== "object") {
    const message = 'The file holds one object, such as { "severity": { "bank-over-advice": "error" } }.';
    return { configuration: noConfiguration, problems: [{ message, start: 0, end: text.length }] };
  }
  const tell = (node: Node, message: string) =>
    problems.push({ message, start: node.offset, end: node.offset + node.length });
  for (const { key } of properties(root)) checkKey(key, tell);
  const configuration: Configuration = {
    severity: readSeverity(findNodeAtLocation(root, ["severity"]), tell),
    exclude: readExclude(findNodeAtLocation(root, ["exclude"]), tell),
    failOn: readFailOn(findNodeAtLocation(root, ["failOn"]), tell),
  };
  return { configuration: problems.length > 0 ? noConfiguration : configuration, problems };
}

type Tell = (node: Node, message: string) => void;

const keys = ["severity", "exclude", "failOn"];

function checkKey(key: Node, tell: Tell): void {
  const name = String(key.value);
  if (keys.includes(name) || name === "$schema") return;
  const near = nearestWord(name, keys);
  tell(
    key,
    `"${name}" is no key of this file; ${near ? `did you mean "${near}"?` : "there are severity, exclude and failOn."}`,
  );
}

function properties(node: Node): readonly { readonly key: Node; readonly value: Node }[] {
  return (node.children ?? []).flatMap(({ children }) => {
    const [key, value] = children ?? [];
    return key && value ? [{ key, value }] : [];
  });
}

function readSeverity(node: Node | undefined, tell: Tell): Severities {
  if (!node) return {};
  if (node.type !== "object") {
    tell(node, 'severity is an object of codes and levels, such as { "bank-over-advice": "error" }.');
    return {};
  }
  const severities: { -readonly [Code in FindingCode]?: Level } = {};
  for (const { key, value } of properties(node)) {
    const code = String(key.value);
    const level = levels.find((one) => one === value.value);
    if (!isCode(code)) {
      const near = nearestWord(code, findingCodes);
      tell(
        key,
        `"${code}" is not the code of a finding${near ? `; did you mean "${near}"?` : ": the Problems list shows them."}`,
      );
    } else if (!level) tell(value, `The level of ${code} is "error", "warning" or "information".`);
    else severities[code] = level;
  }
  return severities;
}

function isCode(code: string): code is FindingCode {
  return (findingCodes as readonly string[]).includes(code);
}

function readExclude(node: Node | undefined, tell: Tell): readonly string[] {
  if (!node) return [];
  const value: unknown = getNodeValue(node);
  if (Array.isArray(value) && value.every((one) => typeof one === "string" && one.trim() !== ""))
    return value;
  tell(node, 'exclude is a list of patterns as .gitignore writes them, such as ["drafts/"].');
  return [];
}

function readFailOn(node: Node | undefined, tell: Tell): Configuration["failOn"] {
  if (!node) return null;
  const found = (["error", "warning", "never"] as const).find((one) => one === node.value);
  if (!found) tell(node, 'failOn is "error", "warning" or "never".');
  return found ?? null;
}

/** "CommaExpected" as "comma expected". */
function spaced(code: string): string {
  return code.replace(/([a-z])([A-Z])/g, "$1 $2").toLowerCase();
}

/** What a setting of the same shape says; what is none of the known codes and levels does not count. */
export function severitiesOf(raw: unknown): Severities {
  if (typeof raw !== "object" || raw === null) return {};
  const known = Object.entries(raw).filter(
    ([code, level]) => isCode(code) && levels.some((one) => one === level),
  );
  return Object.fromEntries(known) as Severities;
}
