import type { Flavour } from "../../server/src/notation/document.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import type { Note } from "../../server/src/plan/note.ts";
import { demoFiles } from "./sampleText.ts";

/** Opens a text as one more note of the demo folder, whose cards and limits it sees. */
export function besideDemo(text: string, flavour: Flavour = "plumb", name = "note.plumb"): Note {
  const folder = createFolder({ today: "2026-12-01" });
  for (const file of demoFiles) folder.open(`file:///demo/${file.name}`, file.text, file.flavour);
  return folder.open(`file:///demo/${name}`, text, flavour);
}
