import { ErrorCodes, ResponseError } from "vscode-languageserver";

type Check = (value: unknown) => boolean;

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null;
const isString: Check = (value) => typeof value === "string";
const isDocument: Check = (value) => isObject(value) && isString(value.uri);
/** Negative and huge numbers are let in: a place beyond the text is brought to its edge. */
const isPosition: Check = (value) =>
  isObject(value) && Number.isInteger(value.line) && Number.isInteger(value.character);
const isRange: Check = (value) => isObject(value) && isPosition(value.start) && isPosition(value.end);
const isList =
  (check: Check): Check =>
  (value) =>
    Array.isArray(value) && value.every(check);

const checks = {
  textDocument: isDocument,
  openedDocument: (value) => isDocument(value) && isString((value as Record<string, unknown>).text),
  position: isPosition,
  positions: isList(isPosition),
  range: isRange,
  context: isObject,
  fixContext: (value) => isObject(value) && Array.isArray(value.diagnostics),
  newName: isString,
  query: isString,
  line: Number.isInteger,
  from: Number.isInteger,
  to: Number.isInteger,
  form: (value) => value === "text" || value === "markdown" || value === "html",
  oldText: isString,
  oldName: isString,
  others: isList((one) => isObject(one) && isString(one.uri) && (one.text === null || isString(one.text))),
  contentChanges: isList(
    (one) => isObject(one) && isString(one.text) && (one.range === undefined || isRange(one.range)),
  ),
  changes: isList(isDocument),
  files: isList(isObject),
  previousResultIds: isList((one) => isObject(one) && isString(one.uri)),
} satisfies Record<string, Check>;
type Part = keyof typeof checks;

/** Under which name the protocol sends a part, where it is not the part's own. */
const sentAs: Partial<Record<Part, string>> = { openedDocument: "textDocument", fixContext: "context" };

const ofNote: readonly Part[] = ["textDocument"];
const ofPlace: readonly Part[] = ["textDocument", "position"];
const ofRange: readonly Part[] = ["textDocument", "range"];

/** What each request and notification cannot do without, by the name that the log has for it. */
const needed: Readonly<Record<string, readonly Part[]>> = {
  diagnostic: ofNote,
  "workspace diagnostic": ["previousResultIds"],
  "inlay hint": ofRange,
  "resolve a hint": ["position"],
  hover: ofPlace,
  completion: ofPlace,
  definition: ofPlace,
  references: [...ofPlace, "context"],
  "document highlight": ofPlace,
  "prepare rename": ofPlace,
  rename: [...ofPlace, "newName"],
  "workspace symbol": ["query"],
  "code action": [...ofRange, "fixContext"],
  "document symbol": ofNote,
  "folding range": ofNote,
  "selection range": [...ofNote, "positions"],
  "semantic tokens": ofNote,
  "semantic tokens of a range": ofRange,
  "signature help": ofPlace,
  formatting: ofNote,
  "range formatting": ofRange,
  "formatting on Enter": ofPlace,
  points: ofNote,
  fences: ofNote,
  "the values of a line": [...ofNote, "line"],
  "lines to copy": [...ofNote, "from", "to", "form"],
  compare: [...ofNote, "oldText", "oldName", "others"],
  open: ["openedDocument"],
  change: [...ofNote, "contentChanges"],
  save: ofNote,
  close: ofNote,
  "watched files": ["changes"],
  "renamed files": ["files"],
  "deleted files": ["files"],
  "created files": ["files"],
};

/** Refuses what is not as the protocol has it, before anything is done with it. */
export function refuseMalformed(name: string, params: unknown): void {
  for (const part of needed[name] ?? []) {
    const key = sentAs[part] ?? part;
    if (isObject(params) && checks[part](params[key])) continue;
    throw new ResponseError(
      ErrorCodes.InvalidParams,
      `Plumbline cannot answer ${name}: its ${key} is missing or not as the protocol has it.`,
    );
  }
}
