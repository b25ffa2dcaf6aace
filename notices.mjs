// Writes dist/THIRD-PARTY-NOTICES.txt: the licence of every package that is bundled, by what the bundler took in.
import { readdir, readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";

/** Licences that a bundle may carry beside its own. */
const allowed = new Set([
  "MIT",
  "ISC",
  "BSD-2-Clause",
  "BSD-3-Clause",
  "Apache-2.0",
  "0BSD",
  "Python-2.0",
  "BlueOak-1.0.0",
]);

export async function writeNotices(metafiles) {
  const inputs = metafiles.flatMap((one) => Object.keys(one.inputs));
  const folders = new Set(
    inputs.flatMap((path) => /^.*node_modules\/(?:@[^/]+\/)?[^/]+/.exec(path)?.[0] ?? []),
  );
  const notices = await Promise.all([...folders].sort().map(noticeOf));
  const head = "Plumbline holds parts of these packages, each under its own licence.\n";
  await writeFile(
    "dist/THIRD-PARTY-NOTICES.txt",
    [head, ...new Set(notices)].join(`\n${"-".repeat(72)}\n\n`),
  );
}

async function noticeOf(folder) {
  const { name, version, license } = JSON.parse(await readFile(join(folder, "package.json"), "utf8"));
  if (!allowed.has(license)) throw new Error(`${name} is under ${license}, which a bundle may not carry.`);
  // What a package holds of others it tells in a file of its own.
  const files = (await readdir(folder)).filter((one) =>
    /^(licen[cs]e|notices?|third-?party-?notices)\b/i.test(one),
  );
  const texts = await Promise.all(files.sort().map((file) => readFile(join(folder, file), "utf8")));
  if (!files.some((one) => /^licen[cs]e/i.test(one))) throw new Error(`${name} has no text of its licence.`);
  const text = texts.map((one) => one.replaceAll("\r\n", "\n").trim()).join("\n\n");
  return `${name} ${version} (${license})\n\n${text}\n`;
}
