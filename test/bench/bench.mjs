// Measures the built server and command line on generated notes and prints what was reached beside what is
// aimed at. A missed aim is said and no failure: the exit code is 1 only for a crash or a wrong answer, and 2
// for wrong usage.
//
//   node test/bench/bench.mjs [--smoke] [--no-peers] [--stand-in]
//
// --smoke     short notes and few repetitions; the peers only if they are there already
// --no-peers  without the peers
// --stand-in  the echo server in the place of the measured one: how even-handed the measuring is
import { existsSync } from "node:fs";
import { cpus } from "node:os";
import { fileURLToPath } from "node:url";
import { parseArgs } from "node:util";
import { bundle } from "./bundle.mjs";
import { checkRows } from "./checkRows.mjs";
import { coldStartRows } from "./coldStartRows.mjs";
import { editRows } from "./editRows.mjs";
import { inProcessRows } from "./inProcessRows.mjs";
import { memoryRows } from "./memoryRows.mjs";
import { peerRows } from "./peerRows.mjs";
import { standInAnswers } from "./standInAnswers.mjs";
import { table } from "./table.mjs";

try {
  await run(options());
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
}

function options() {
  try {
    const flag = { type: "boolean", default: false };
    return parseArgs({ options: { smoke: flag, "no-peers": flag, "stand-in": flag } }).values;
  } catch (error) {
    console.error(error.message);
    process.exit(2);
  }
}

async function run({ smoke, "no-peers": noPeers, "stand-in": standsIn }) {
  const built = (path) => fileURLToPath(new URL(`../../dist/server/${path}`, import.meta.url));
  const node = (path) => [process.execPath, [path, "--stdio"]];
  const echo = node(await bundle("echoServer.mjs"));
  const server = built("main.node.cjs");
  if (!standsIn && !existsSync(server))
    throw new Error(`There is no ${server}: build it with npm run build.`);
  const bench = {
    lengths: smoke ? [100, 1000] : [100, 1000, 10_000, 50_000],
    aimed: smoke ? 1000 : 10_000,
    smoke,
    echo,
    subject: standsIn ? echo : node(server),
    standIn: standsIn ? standInAnswers() : null,
    commandLine: built("cli.cjs"),
    peers: !noPeers,
  };

  const rows = [];
  const parts = { editRows, coldStartRows, memoryRows, peerRows, inProcessRows, checkRows };
  for (const [name, part] of Object.entries(parts)) {
    console.error(
      `${name.replace(/Rows$/, "").replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`)} ...`,
    );
    rows.push(...(await part(bench)));
  }

  console.log(
    `node ${process.version}, ${cpus().length} cores of ${cpus()[0]?.model.trim() ?? "an unknown kind"}`,
  );
  console.log(
    "Medians; over stdio by turns with an echo server that answers with payloads of the same size.",
  );
  console.log(`\n${table(rows)}`);
  const aimed = rows.filter(({ met }) => met);
  console.log(`\n${aimed.filter(({ met }) => met === "yes").length} of ${aimed.length} aims met.`);
}
