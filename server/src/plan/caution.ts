/** Stands wherever figures leave the editor. */
export const caution =
  "A planning aid, not approved data. The aeroplane's flight manual, the operator's manuals and local regulations govern. A qualified person checks every figure. Not for use in flight.";

/** What belongs beside a number, where it applies. */
export const remarks = {
  cas: "Calibrated airspeed, not what the indicator shows.",
  steady:
    "Steady and coordinated, power off, out of ground effect; a skid stalls earlier and without warning.",
  engines: "All engines.",
  stillAir: "Still air, no wind shear.",
  contamination:
    "The contamination is the author's figure, and the warning may come after the stall or not at all.",
} as const;
