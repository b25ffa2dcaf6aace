/**
 * A root of a continuous function in a bracket, by bisection kept together with the secant
 * (Illinois variant of regula falsi), to 1e-13 relative.
 *
 * @returns the root; null where the ends do not bracket one
 */
export function bracketedRoot(f: (x: number) => number, low: number, high: number): number | null {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa * fb < 0)) return null;
  for (let i = 0; i < 200; i++) {
    let c = (a * fb - b * fa) / (fb - fa);
    // Where the secant crawls, bisection halves the bracket.
    if (!(Math.min(a, b) < c && c < Math.max(a, b)) || i % 3 === 2) c = (a + b) / 2;
    const fc = f(c);
    if (fc === 0 || Math.abs(b - a) <= 1e-13 * Math.abs(c)) return c;
    if (fa * fc < 0) {
      b = c;
      fb = fc;
    } else {
      a = c;
      fa = fc;
    }
  }
  return (a + b) / 2;
}
