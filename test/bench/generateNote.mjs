/**
 * Writes a `.plumb` note of exactly `lines` lines (100 or more) with exactly `findings` findings.
 *
 * A head of 15 lines holds a card, limits and a setting; then every five lines are one of prose, one
 * point of three bar lines, and a blank one. Ten points make a sector: its first restates the weight,
 * the others burn. Every fourth point has a tolerance, by turns on its bank and on its speed. Ten points,
 * spread evenly, break the bank limit and hold a stale claim, two findings each, so that the answers are
 * of one size at every length.
 *
 * With `restated: false` the weight is stated once and a kilogram burnt at each point, so that an edit of
 * a burn reaches every point below it.
 */
export function generateNote(lines, { restated = true } = {}) {
  const count = Math.floor((lines - head.length) / 5);
  const broken = new Set(
    Array.from({ length: brokenPoints }, (_, k) => Math.floor(((k + 0.5) * count) / brokenPoints)),
  );
  const legs = restated ? sector : sector.slice(1, -1);
  const all = [...head];
  for (let index = 0; index < count; index++) {
    all.push(prose[index % prose.length]);
    all.push(...point(index, legs[index % legs.length], { broken: broken.has(index), restated }), "");
  }
  while (all.length < lines) all.push(prose[all.length % prose.length]);
  return `${all.join("\n")}\n`;
}

const brokenPoints = 10;

/** What `check` has to find in a generated note. */
export const findings = 2 * brokenPoints;

const head = [
  "# A generated note",
  "",
  '| aircraft pipitwing-52 "Pipitwing 52, an invented twin jet"',
  '| source "invented for the benchmark" issue 1; basis vsr; reference 60 t; mass 36 t to 64 t, landing 58 t',
  "| config clean stall 136 kt, load -1 to 2.5; config flaps-5 stall 125 kt, load 0 to 2, vfe 230 kt",
  "| config flaps-15 stall 116 kt, load 0 to 2, vfe 210 kt, takeoff; config flaps-30 stall 107 kt, load 0 to 2, vfe 180 kt, landing",
  "| wing 110 m2, chord 3.8 m; vmo 320 kt; mmo 0.80; ceiling FL390; vmca 100 kt; warning 1.03",
  "| lift-mach clean 0.30 1.00, 0.50 0.92, 0.70 0.79, 0.80 0.68; cg-effect 14 % 1.000, 24 % 0.991, 34 % 0.983",
  "| buffet clean 0.40 1.25, 0.60 1.06, 0.74 0.82, 0.80 0.62",
  "",
  '| limits pipit-rules "Invented operator"; source "operations manual, invented" issue 3; must any bank 30',
  "| must takeoff, departure, missed ratio 1.13, vs 1.2; should climb ratio 1.18, vs 1.25; should any overshoot 15",
  "| must approach, circling, landing ratio 1.23, vs 1.3; must takeoff bank 15 when engine-out; should any buffet 1.3 above FL250",
  "",
  "| fly pipitwing-52; under pipit-rules; rules ifr; qnh 1013 hPa; isa +4; cg 22 %",
];

/** One sector, each leg with speeds well inside what its configuration and the limits ask. */
const sector = [
  { phase: "takeoff", config: "flaps-15", altitude: "900 ft", speed: "v2min + 25 kt", spread: "5 kt" },
  { phase: "departure", config: "flaps-5", altitude: "3200 ft", speed: "195 kt", spread: "5 kt" },
  { phase: "climb", config: "clean", altitude: "9000 ft", speed: "250 kt", spread: "5 kt" },
  { phase: "climb", config: "clean", altitude: "FL180", speed: "280 kt", spread: "5 kt" },
  { phase: "climb", config: "clean", altitude: "FL260", speed: "M 0.68", spread: "0.01" },
  { phase: "cruise", config: "clean", altitude: "FL350", speed: "M 0.74", spread: "0.01" },
  { phase: "descent", config: "clean", altitude: "FL240", speed: "290 kt", spread: "5 kt" },
  { phase: "hold", config: "clean", altitude: "FL090", speed: "215 kt", spread: "5 kt" },
  { phase: "approach", config: "flaps-15", altitude: "2500 ft", speed: "165 kt", spread: "5 kt" },
  { phase: "landing", config: "flaps-30", altitude: "700 ft", speed: "vref + 25 kt", spread: "5 kt" },
];

const prose = [
  "The turn is gentle here, since the cabin is still being cleared.",
  "Traffic from the north joins at this place most mornings; the crew keep a lookout.",
  "Terrain lies to the left, and it rises slowly towards the lake.",
  "Nothing else to note, but the wind tends to veer after noon.",
];

function point(index, leg, { broken, restated }) {
  const weighed = restated ? index % 10 === 0 : index === 0;
  const burn = restated ? 200 + ((index * 37) % 300) : 1;
  const mass = weighed
    ? `weight ${(restated ? 56 + (index % 17) / 10 : 62).toFixed(1)} t`
    : `burn ${burn} kg`;
  const tolerance = index % 4 === 3 ? (index % 8 === 3 ? "bank" : "speed") : "none";
  const speed = tolerance === "speed" ? `${leg.speed} +- ${leg.spread}` : leg.speed;
  const bank = `${broken ? 33 : 12}${tolerance === "bank" ? " +- 3" : ""} ${index % 2 === 0 ? "left" : "right"}`;
  return [
    `| phase ${leg.phase} "Turn ${index + 1}"; ${mass}`,
    `| config ${leg.config}; altitude ${leg.altitude}; speed ${speed}`,
    `| bank ${bank}${broken ? "; claim stall 250 kt" : ""}`,
  ];
}
