/**
 * Seconds until a steady deceleration reaches a speed, (V - V_onset)/r; 0 where it is already passed.
 *
 * @param speed V, m/s CAS
 * @param onset V_onset, m/s CAS
 * @param rate r, m/s2, above 0
 *
 * Example: 160 kt to 130 kt at 1 kt/s: 30 s.
 */
export function secondsTo(speed: number, onset: number, rate: number): number {
  return Math.max(0, (speed - onset) / rate);
}
