import { posix } from "node:path";
import { describe, expect, it } from "vitest";
import type { Entry, FileTree } from "../../server/src/files/fileTree.ts";
import { walk } from "../../server/src/files/walk.ts";

/** Files by their path, and folders that are there but do not say what they hold. */
function treeOf(files: Readonly<Record<string, string>>, locked: readonly string[] = []): FileTree {
  const below = (folder: string) =>
    [...Object.keys(files), ...locked.map((one) => `${one}/…`)]
      .filter((path) => path.startsWith(`${folder}/`))
      .map((path) => path.slice(folder.length + 1).split("/"));
  return {
    async entries(folder) {
      if (locked.includes(folder)) return null;
      const found = new Map(
        below(folder).map(([name = "", ...rest]): [string, Entry] => [
          name,
          { name, kind: rest.length > 0 ? "folder" : "file" },
        ]),
      );
      return found.size === 0 ? null : [...found.values()];
    },
    holds: async (folder, name) => below(folder).some(([first]) => first === name),
    async read(file) {
      const text = files[file];
      return text === undefined ? { kind: "unreadable", why: "not there" } : { kind: "text", text };
    },
    child: posix.join,
    parent: (folder) =>
      folder === "/" ? null : { folder: posix.dirname(folder), name: posix.basename(folder) },
  };
}

async function walked(tree: FileTree) {
  const unreadable: string[] = [];
  const found = await walk(tree, "/plans", (folder) => unreadable.push(folder));
  return { found, unreadable };
}

describe("the notes below a folder", () => {
  it("are told with the folders that cannot be looked into, so that nobody takes them for checked", async () => {
    const tree = treeOf({ "/plans/a.plumb": "", "/plans/in/b.md": "" }, ["/plans/locked"]);
    expect(await walked(tree)).toEqual({
      found: ["/plans/a.plumb", "/plans/in/b.md"],
      unreadable: ["/plans/locked"],
    });
  });

  it("are those that .gitignore leaves, by the very capitals that it writes", async () => {
    const tree = treeOf({
      "/plans/.gitignore": "PLAN.plumb\nOld/\n",
      "/plans/PLAN.plumb": "",
      "/plans/plan.plumb": "",
      "/plans/Old/a.plumb": "",
      "/plans/old/a.plumb": "",
    });
    expect((await walked(tree)).found).toEqual(["/plans/old/a.plumb", "/plans/plan.plumb"]);
  });
});
