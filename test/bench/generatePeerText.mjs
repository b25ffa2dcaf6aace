/**
 * A document of about so many lines for a general-purpose server, in "json" or "yaml": five lines a point
 * as in a generated note, and 20 findings, which are keys given twice. `middle` is a digit there, and `edit` changes it.
 */
export function generatePeerText(format, lines) {
  const count = Math.floor((lines - 4) / 5);
  const twice = new Set(Array.from({ length: 10 }, (_, k) => Math.floor(((k + 0.5) * count) / 10)));
  const write = format === "json" ? jsonPoint : yamlPoint;
  const points = Array.from({ length: count }, (_, index) =>
    write(index, twice.has(index), index === count - 1),
  );
  const text =
    format === "json"
      ? `{\n  "points": [\n${points.join("\n")}\n  ]\n}\n`
      : `points:\n${points.join("\n")}\n`;
  const all = text.split("\n");
  const line = all.findIndex((one, at) => at >= all.length / 2 && /bank"?: 12/.test(one));
  const character = all[line].search(/bank/) + all[line].slice(all[line].search(/bank/)).indexOf("2");
  const range = { start: { line, character }, end: { line, character: character + 1 } };
  return { text, edit: { change: { range, text: "4" }, back: { range, text: "2" } } };
}

function jsonPoint(index, twice, last) {
  return [
    `    { "phase": "climb", "title": "Turn ${index + 1}", "burn": ${200 + ((index * 37) % 300)},`,
    `      "config": "clean", "altitude": "FL180", "speed": "280 kt",`,
    `      "bank": 12, "side": "left"${twice ? ', "side": "right"' : ""},`,
    `      "remark": "The turn is gentle here, since the cabin is still being cleared."`,
    last ? "    }" : "    },",
  ].join("\n");
}

function yamlPoint(index, twice) {
  return [
    `  - { phase: climb, title: Turn ${index + 1}, burn: ${200 + ((index * 37) % 300)} }`,
    "  - config: { name: clean, altitude: FL180, speed: 280 kt }",
    `    turn: { bank: 12, side: left${twice ? ", side: right, bank: 14" : ""} }`,
    "    remark: The turn is gentle here, since the cabin is still being cleared.",
    "",
  ].join("\n");
}
