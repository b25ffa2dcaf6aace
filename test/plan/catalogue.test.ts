import { describe, expect, it } from "vitest";
import { findingCodes } from "../../server/src/notation/codes.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { catalogue, type FindingCode } from "../../server/src/plan/findings.ts";
import { explain, pages } from "../../server/src/report/pages.ts";

const codes = Object.keys(catalogue) as FindingCode[];

function found(text: string) {
  const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
  return note.findings().map(({ finding }) => finding);
}

describe("the catalogue", () => {
  it.each(codes)("%s: its example gives it, and the mended one has no error", (code) => {
    const { breaks, keeps } = catalogue[code];
    expect(found(breaks).map((one) => one.code)).toContain(code);
    const left = found(keeps);
    expect(left.map((one) => one.code)).not.toContain(code);
    expect(left.filter((one) => one.severity === "error").map((one) => one.message)).toEqual([]);
  });

  it("knows every code that a note may name, and no other", () => {
    expect([...codes].sort()).toEqual([...findingCodes].sort());
  });

  it.each(codes)("%s: its sentences are whole, and its page says them", (code) => {
    const { title, explanation } = catalogue[code];
    expect(title).toMatch(/^[a-z]/);
    expect(explanation).toMatch(/^[A-Z`].*[.]$/s);
    const page = explain(code) ?? "";
    expect(page).toContain(explanation);
    expect(page).toContain("not approved data");
    expect(pages().find((one) => one.name === `${code}.md`)?.text).toBe(page);
  });

  it.each(codes)("%s: every message of its example is one plain sentence with a way out", (code) => {
    for (const { message } of found(catalogue[code].breaks)) {
      expect(message).toMatch(/^[A-Z0-9`«\p{L}].*[.?]$/su);
      expect(message).not.toMatch(/NaN|undefined|null|\[object/);
    }
  });
});
