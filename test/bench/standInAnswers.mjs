import { findings } from "./generateNote.mjs";

/** Answers of about the size of a real server's, for an echo server that stands in for one. */
export function standInAnswers() {
  const range = (line) => ({ start: { line, character: 2 }, end: { line, character: 14 } });
  const items = Array.from({ length: findings }, (_, at) => ({
    range: range(at * 50),
    severity: 1,
    code: "bank-over-limit",
    codeDescription: { href: "file:///bench/pages/bank-over-limit.md" },
    source: "plumbline",
    message:
      "Bank 33 is more than the 30 that pipit-rules allows in climb; at 250 kt the warning comes at 70.",
    relatedInformation: [
      {
        location: { uri: "file:///bench/note.plumb", range: range(11) },
        message: "The row: must any bank 30",
      },
    ],
  }));
  const hints = Array.from({ length: 36 }, (_, at) => ({
    position: { line: at, character: 30 },
    label: [{ value: "≈ margin 1.85, ratio 1.88" }],
    paddingLeft: true,
    data: { uri: "file:///bench/note.plumb", version: 1, line: at },
  }));
  return { diagnostics: { kind: "full", items }, hints };
}
