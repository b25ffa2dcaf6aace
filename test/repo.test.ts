import { existsSync, readdirSync, readFileSync } from "node:fs";
import { posix } from "node:path";
import { describe, expect, it } from "vitest";
import { hintKinds } from "../server/src/features/hintKinds.ts";

const root = new URL("../", import.meta.url);
const read = (path: string) => readFileSync(new URL(path, root), "utf8");
const exists = (path: string) => existsSync(new URL(path, root));
const filesIn = (folder: string, ending: string) =>
  readdirSync(new URL(folder, root), { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(ending))
    .map((name) => posix.join(folder, name.replaceAll("\\", "/")));

interface Manifest {
  readonly main: string;
  readonly browser: string;
  readonly bin: Readonly<Record<string, string>>;
  readonly files: readonly string[];
  readonly contributes: {
    readonly languages: readonly { readonly configuration: string }[];
    readonly grammars: readonly { readonly path: string; readonly scopeName: string }[];
    readonly commands: readonly {
      readonly command: string;
      readonly title: string;
      readonly category?: string;
    }[];
    readonly configuration: { readonly properties: Readonly<Record<string, Setting>> };
    readonly keybindings: readonly { readonly command: string }[];
    readonly walkthroughs: readonly {
      readonly steps: readonly {
        readonly description: string;
        readonly completionEvents: readonly string[];
      }[];
    }[];
  };
}

interface Setting {
  readonly description?: string;
  readonly markdownDescription?: string;
  readonly items?: { readonly enum: readonly string[]; readonly enumDescriptions: readonly string[] };
  readonly default?: unknown;
}

describe("the manifest", () => {
  const manifest = JSON.parse(read("package.json")) as Manifest;
  const { commands, configuration, grammars, languages } = manifest.contributes;

  it("lists the commands that the client registers", () => {
    const registered = [...read("client/src/commands.ts").matchAll(/"(plumbline\.\w+)":/g)].map(
      ([, id]) => id,
    );
    expect(commands.map(({ command }) => command).sort()).toEqual(registered.sort());
  });

  it("names files that are there", () => {
    const named = [...languages.map((one) => one.configuration), ...grammars.map((one) => one.path)];
    const others = read("package.json").match(/(?:client\/media|syntaxes)\/[^"*]+\.\w+/g) ?? [];
    expect(others).toContain("client/media/preview.css");
    expect([...named, ...others].filter((path) => !exists(path))).toEqual([]);
    for (const { path, scopeName } of grammars) expect(JSON.parse(read(path))).toMatchObject({ scopeName });
  });

  it("puts every command under one head, and names none that is not there", () => {
    const { keybindings, walkthroughs } = manifest.contributes;
    expect(commands.filter(({ category }) => category !== "Plumbline")).toEqual([]);
    const ids = commands.map(({ command }) => command);
    const steps = walkthroughs.flatMap((one) => one.steps);
    expect(steps.length).toBeLessThanOrEqual(6);
    const named = [
      ...keybindings.map(({ command }) => command),
      ...[...JSON.stringify(steps).matchAll(/[cC]ommand:(plumbline\.\w+)/g)].map(([, id]) => id),
    ];
    expect(named.length).toBeGreaterThan(steps.length);
    expect(named.filter((id) => !ids.includes(id ?? ""))).toEqual([]);
    for (const { completionEvents } of steps) expect(completionEvents).toHaveLength(1);
  });

  it("describes every setting, and the kinds of hints as the server knows them", () => {
    const { properties } = configuration;
    for (const [name, { description, markdownDescription }] of Object.entries(properties))
      expect(description ?? markdownDescription, name).toMatch(/^[A-Z].*\.$/);
    const kinds = properties["plumbline.hints.kinds"];
    expect(
      Object.fromEntries(
        (kinds?.items?.enum ?? []).map((kind, i) => [kind, kinds?.items?.enumDescriptions[i]]),
      ),
    ).toEqual(hintKinds);
    expect(kinds?.default).toEqual(Object.keys(hintKinds));
  });

  it("starts what the build writes", () => {
    const build = read("build.mjs");
    const outputs = [manifest.main, manifest.browser, ...Object.values(manifest.bin)].map((path) =>
      posix.normalize(path),
    );
    expect(outputs.filter((path) => !build.includes(`"${path}"`))).toEqual([]);
    expect(outputs.filter((path) => !manifest.files.includes(path))).toEqual([]);
  });

  it("ships what is there", () => {
    const shipped = manifest.files.filter((path) => !path.startsWith("dist/"));
    expect(shipped.filter((path) => !exists(path.replace(/\/\*.*$/, "")))).toEqual([]);
  });

  it("has no setting that nothing reads", () => {
    const code = [...filesIn("server/src/lsp", ".ts"), ...filesIn("client/src", ".ts")].map(read).join("\n");
    // The client's library reads the trace by itself.
    const names = Object.keys(configuration.properties).filter((name) => name !== "plumbline.trace.server");
    const readBy = (name: string) =>
      new RegExp(name.replace("plumbline.", "").replaceAll(".", String.raw`\??\.`)).test(code);
    expect(names.filter((name) => !readBy(name))).toEqual([]);
  });
});

describe("imports", () => {
  /** What each layer may import from the others, and which packages. */
  const layers: Readonly<
    Record<string, { readonly from: readonly string[]; readonly packages: RegExp | null }>
  > = {
    flight: { from: [], packages: null },
    notation: { from: [], packages: null },
    plan: { from: ["flight", "notation"], packages: /^jsonc-parser$/ },
    report: { from: ["flight", "notation", "plan"], packages: /^sarif$/ },
    features: { from: ["flight", "notation", "plan", "report"], packages: null },
    files: { from: [], packages: /^ignore$/ },
    disk: { from: ["notation", "plan", "report", "features", "files"], packages: /^(?!vscode)/ },
    lsp: {
      from: ["flight", "notation", "plan", "report", "features", "files"],
      packages: /^vscode-languageserver$/,
    },
    cli: {
      from: ["flight", "notation", "plan", "report", "features", "files", "disk"],
      packages: /^(?!vscode)/,
    },
  };

  interface Import {
    readonly statement: string;
    readonly target: string;
  }

  const importsOf = (file: string): readonly Import[] =>
    [
      ...read(file).matchAll(
        /^(?:import|export)\b[^;"]*?\bfrom "([^"]+)";|\bimport\("([^"]+)"\)|^import "([^"]+)";/gm,
      ),
    ].map(([statement, ...targets]) => ({
      statement,
      target: targets.find((one) => one !== undefined) ?? "",
    }));

  it.each(Object.keys(layers))("of %s run one way", (layer) => {
    const allowed = layers[layer];
    const folder = `server/src/${layer}`;
    const files = exists(folder) ? filesIn(folder, ".ts") : [];
    const wrong = files.flatMap((file) =>
      importsOf(file).flatMap(({ target }) => {
        if (!target.startsWith(".")) {
          return allowed?.packages?.test(target)
            ? []
            : [`${file} imports ${target}, but ${layer} uses no such package`];
        }
        const [to = ""] = posix.relative("server/src", posix.join(posix.dirname(file), target)).split("/");
        if (to === layer || allowed?.from.includes(to)) return [];
        return [
          `${file} imports ${to}; ${layer} may import ${allowed?.from.join(", ") || "nothing but itself"}`,
        ];
      }),
    );
    expect(wrong).toEqual([]);
    expect(files.length).toBeGreaterThan(0);
  });

  it("of the client take types alone from the server, and those from its protocol", () => {
    const wrong = filesIn("client/src", ".ts").flatMap((file) =>
      importsOf(file)
        .filter(({ target }) => target.includes("server/"))
        .filter(
          ({ statement, target }) =>
            !(statement.startsWith("import type") && target.endsWith("/lsp/protocol.ts")),
        )
        .map(({ statement }) => `${file}: ${statement}`),
    );
    expect(wrong).toEqual([]);
  });

  it("are seen by this test", () => {
    expect(importsOf("client/src/extension.ts").map(({ target }) => target)).toEqual([
      "vscode",
      "vscode-languageclient/node",
      "./activate.ts",
    ]);
  });
});

describe("the code", () => {
  const code = ["server/src", "client/src", "test"].flatMap((folder) => filesIn(folder, ".ts"));

  it("knows no clock, no chance and nothing asynchronous below the server and the command line", () => {
    const pure = ["flight", "notation", "plan", "report", "features"].flatMap((layer) =>
      filesIn(`server/src/${layer}`, ".ts"),
    );
    const impure =
      /\bDate\.now\b|\bnew Date\(\)|\bMath\.random\b|\bsetTimeout\b|\bperformance\.now\b|\basync [(\w]|\bawait \w|\bprocess\./;
    const withoutComments = (text: string) => text.replace(/\/\*[\s\S]*?\*\/|^\s*\/\/.*$/gm, "");
    expect(pure.filter((file) => impure.test(withoutComments(read(file))))).toEqual([]);
  });

  it("is never excused from the type checker, nor from the linter's ban of any", () => {
    const excuse = /@ts-(?:ignore|expect-error|nocheck)\b|biome-ignore[^\n]*noExplicitAny/;
    expect(code.filter((file) => file !== "test/repo.test.ts" && excuse.test(read(file)))).toEqual([]);
  });

  it("skips no test and runs none alone", () => {
    const skipped = /\b(?:it|test|describe)\.(?:skip|only|todo|fails|skipIf|runIf)\b/;
    const tests = code.filter((file) => file.endsWith(".test.ts"));
    expect(tests.filter((file) => skipped.test(read(file)))).toEqual([]);
    expect(tests.length).toBeGreaterThan(3);
  });
});
