// Holds the package against the list of what ships: nothing is missing from it and nothing has slipped in.
//   node test/packaging/checkVsix.mjs            compares and ends with 1 where they differ
//   node test/packaging/checkVsix.mjs --update   writes the list anew
import { readFileSync, writeFileSync } from "node:fs";
import { promisify } from "node:util";
import yauzl from "yauzl";

const list = new URL("vsix.txt", import.meta.url);

async function entriesOf(path) {
  const zip = await promisify(yauzl.open)(path, { lazyEntries: true });
  const names = [];
  return new Promise((resolve, reject) => {
    zip.on("entry", ({ fileName }) => {
      names.push(fileName);
      zip.readEntry();
    });
    zip.on("end", () => resolve(names.sort()));
    zip.on("error", reject);
    zip.readEntry();
  });
}

const names = await entriesOf("dist/plumbline.vsix");
if (process.argv.includes("--update")) {
  writeFileSync(list, `${names.join("\n")}\n`);
} else {
  const wanted = readFileSync(list, "utf8").trim().split("\n");
  const missing = wanted.filter((name) => !names.includes(name));
  const extra = names.filter((name) => !wanted.includes(name));
  for (const name of missing) console.error(`The package lacks ${name}.`);
  for (const name of extra)
    console.error(`The package holds ${name}, which test/packaging/vsix.txt does not list.`);
  if (missing.length + extra.length > 0) {
    console.error("If that is meant: node test/packaging/checkVsix.mjs --update");
    process.exit(1);
  }
  console.log(`The package holds the ${names.length} files that it should.`);
}
