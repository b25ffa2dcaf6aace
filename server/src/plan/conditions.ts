import { type Corners, spreadOf } from "./corners.ts";
import type { Point, Ready } from "./evaluateStated.ts";
import type { Conditions } from "./point.ts";
import { exactly, type Spread } from "./spread.ts";

/** The state the figures hold for, in SI, with the spread of every tolerance. */
export function conditionsOf(point: Point, ready: Ready, corners: Corners): Conditions {
  const { carried } = point.applied;
  const { nominal } = corners;
  const altitude = carried.altitude?.value;
  const engine = carried.engineOut?.value;
  const known = (figure: (corner: typeof nominal) => number): Spread =>
    spreadOf(corners, figure) ?? exactly(figure(nominal));
  return {
    mass: ready.mass,
    altitude: altitude?.altitude ?? ready.air.pressureAltitude,
    flightLevel: altitude?.flightLevel ?? false,
    qnh: carried.qnh?.value ?? null,
    pressureAltitude: ready.air.pressureAltitude,
    deviation: ready.air.deviation,
    air: nominal.air,
    cas: known((corner) => corner.cas),
    eas: known((corner) => corner.eas),
    tas: known((corner) => corner.tas),
    mach: known((corner) => corner.mach),
    ias: spreadOf(corners, (corner) => corner.ias),
    bank: known((corner) => corner.bank),
    bankSide: ready.turn.bankSide,
    path: known((corner) => corner.path),
    load: known((corner) => corner.load),
    loadStated: ready.turn.load !== null,
    cg: carried.cg?.value ?? null,
    liftLoss: ready.liftLoss,
    contaminant: carried.contamination?.value?.contaminant ?? null,
    cgFactor: ready.cgFactor,
    engineOut: engine === "left" || engine === "right" ? engine : null,
  };
}
