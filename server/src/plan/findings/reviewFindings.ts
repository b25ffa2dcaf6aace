import { entry, flown, ruled } from "./entry.ts";

const takeoffBank = (more: string) => ruled("must any bank 30", `| phase departure; bank 35${more}`);

/** Findings about what was sought, and about what the author expects, accepts and asks beyond the state flown. */
export const reviewFindings = {
  "no-solution": entry(
    "error",
    "no value keeps every rule",
    "A `?` asks for the steepest bank, the lowest speed, the heaviest weight or the highest altitude that keeps every rule and check of the point, and here none does. The message names what is in the way at the value that breaks least. Change something else of the point: a bank cannot mend a speed that is too low.",
    flown("| phase departure; speed 85 kt; bank ?"),
    flown("| phase departure; speed 150 kt; bank ?"),
  ),
  "gust-over-stall": entry(
    "warning",
    "a gust stalls, buffets or overloads",
    "In the stated derived gust the load factor goes beyond that at the stall, at buffet onset, or beyond the limit load factors of the card (gust load: 14 CFR 23.341 before Amendment 23-64). The message says which, for the ways out differ: flying slower spares the structure, flying faster keeps clear of the stall.",
    flown("| phase cruise; speed 120 kt; gust 50 ft/s", "| wing 32 m2, chord 2.4 m, slope 5.2 per rad\n"),
    flown("| phase cruise; speed 180 kt; gust 25 ft/s", "| wing 32 m2, chord 2.4 m, slope 5.2 per rad\n"),
  ),
  "decel-too-fast": entry(
    "warning",
    "slowing faster than stall speeds are defined for",
    "Stall speeds are defined for a deceleration of at most 1 kt/s (14 CFR 25.103(c)); slowing faster, an aeroplane stalls at another speed, and the seconds shown promise too much. In `manoeuvre` it is one step lower.",
    flown("| phase approach; decel 2 kt/s"),
    flown("| phase approach; decel 1 kt/s"),
  ),
  "over-holding-speed": entry(
    "information",
    "faster than the holding pattern is made for",
    "The airspace of a hold is protected up to a greatest indicated speed: by ICAO Doc 8168 230 kt to 14,000 ft (170 kt in categories A and B), 240 kt to 20,000 ft, 265 kt to 34,000 ft and M 0.83 above; by the FAA's Aeronautical Information Manual, 5-3-8, 200 kt to 6,000 ft, 230 kt to 14,000 ft and 265 kt above. Slow down, or ask for a hold that allows the speed.",
    flown("| phase hold; altitude 5000 ft; speed 220 kt"),
    flown("| phase hold; altitude 5000 ft; speed 165 kt"),
  ),
  "not-as-expected": entry(
    "error",
    "what was expected did not come",
    "An exercise says with `expect` which finding is meant to come, or with `expect not` which is not. Here it is the other way round, so that the exercise does not show what it is for. What says that the note or the point was not checked cannot be expected.",
    flown("| phase manoeuvre; bank 20; expect warning-in-turn"),
    flown("| phase manoeuvre; bank 60; speed 133 kt; expect warning-in-turn"),
  ),
  "accept-unused": entry(
    "warning",
    "nothing to accept",
    "An `accept` names a finding that does not come here. The point has changed since it was signed, or the code is another one: take the clause out, or check what changed.",
    takeoffBank('; accept ratio-short to 1.10 because "short runway" by "M. Roe"'),
    takeoffBank('; accept bank-over-limit to 35 because "terrain" by "M. Roe"'),
  ),
  "accept-expired": entry(
    "error",
    "accepted until a day that has passed",
    "An `accept` with `until` holds up to and including that day. Whoever accepted it looks at it again and writes a new date, or it goes.",
    takeoffBank('; accept bank-over-limit to 35 because "terrain" until 2020-01-31'),
    takeoffBank('; accept bank-over-limit to 35 because "terrain" until 2199-01-31'),
  ),
  "accept-refused": entry(
    "warning",
    "this cannot be accepted",
    "Some findings say that the note cannot be read, that the point was not checked, or that it is unsafe beyond any margin: errors of the notation, a missing value, the end of a table, a rule that was not evaluated, claims, `no-level-flight`, `over-load-limit`, `over-vne`, `contaminated-takeoff`, and a stall outside `manoeuvre`. They are mended. Where a finding has a figure, the `accept` says with `to` how far it may go, and in a unit that fits.",
    takeoffBank('; accept bank-over-limit because "terrain"'),
    takeoffBank('; accept bank-over-limit to 35 because "terrain"'),
  ),
} as const;
