import { findNodeAtLocation, type Node, type ParseError, parseTree, printParseErrorCode } from "jsonc-parser";
import { findingCodes } from "../notation/codes.ts";
import { nearestWord } from "../notation/spelling.ts";
import { catalogue, type FindingCode } from "./findings.ts";
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
  for (const { key } of properties(root, tell)) checkKey(key, tell);
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

function properties(node: Node, tell: Tell): readonly { readonly key: Node; readonly value: Node }[] {
  const seen = new Set<string>();
  return (node.children ?? []).flatMap(({ children }) => {
    const [key, value] = children ?? [];
    if (!key || !value) return [];
    const name = String(key.value);
    if (seen.has(name)) tell(key, `"${name}" is given twice: take one out.`);
    seen.add(name);
    return [{ key, value }];
  });
}

const severityForm = 'severity is an object of codes and levels, such as { "bank-over-advice": "error" }.';

function readSeverity(node: Node | undefined, tell: Tell): Severities {
  if (!node) return {};
  if (node.type !== "object") {
    tell(node, severityForm);
    return {};
  }
  const severities: { -readonly [Code in FindingCode]?: Level } = {};
  for (const { key, value } of properties(node, tell)) {
    const code = String(key.value);
    const wrong = mistakeIn(code, value.value);
    if (wrong === null) severities[code as FindingCode] = value.value as Level;
    else tell(wrong.at === "code" ? key : value, wrong.message);
  }
  return severities;
}

/** What is wrong with a code's level, in the code or in the level; null where it holds. */
function mistakeIn(
  code: string,
  level: unknown,
): { readonly at: "code" | "level"; readonly message: string } | null {
  if (!isCode(code)) {
    const near = nearestWord(code, findingCodes);
    const way = near ? `; did you mean "${near}"?` : ": the Problems list shows them.";
    return { at: "code", message: `"${code}" is not the code of a finding${way}` };
  }
  if (!levels.some((one) => one === level))
    return { at: "level", message: `The level of ${code} is "error", "warning" or "information".` };
  if (catalogue[code].severity === "error" && level !== "error")
    return {
      at: "level",
      message: `${code} is an error, and an error is never lowered: write "error", or take it out.`,
    };
  return null;
}

function isCode(code: string): code is FindingCode {
  return (findingCodes as readonly string[]).includes(code);
}

function readExclude(node: Node | undefined, tell: Tell): readonly string[] {
  if (!node) return [];
  if (node.type !== "array") {
    tell(node, 'exclude is a list of patterns as .gitignore writes them, such as ["drafts/"].');
    return [];
  }
  return (node.children ?? []).flatMap((one) => {
    const message = mistakeInPattern(one.value);
    if (message) tell(one, message);
    return message ? [] : [one.value as string];
  });
}

/** Patterns that would leave out nothing, and nobody would know. */
function mistakeInPattern(pattern: unknown): string | null {
  if (typeof pattern !== "string" || pattern.trim() === "")
    return 'A pattern is a text as .gitignore writes it, such as "drafts/".';
  if (pattern.startsWith("../")) return "Only what lies in this folder can be left out.";
  if (pattern.startsWith("./"))
    return `Patterns start at this folder by themselves: write "${pattern.slice(1)}".`;
  if (pattern.startsWith("#")) return "A pattern that begins with # is a remark, and leaves nothing out.";
  return pattern.includes("\\") ? "Folders are separated by / in a pattern." : null;
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

/** What a setting of the same shape says; what is none of the known codes and levels does not count, and is told. */
export function severitiesOf(raw: unknown): {
  readonly severities: Severities;
  readonly problems: readonly string[];
} {
  if (raw === undefined || raw === null) return { severities: {}, problems: [] };
  if (typeof raw !== "object" || Array.isArray(raw)) return { severities: {}, problems: [severityForm] };
  const read = Object.entries(raw).map((entry) => ({ entry, wrong: mistakeIn(...entry) }));
  return {
    severities: Object.fromEntries(read.filter(({ wrong }) => !wrong).map(({ entry }) => entry)),
    problems: read.flatMap(({ wrong }) => wrong?.message ?? []),
  };
}
