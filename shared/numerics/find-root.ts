export interface RootOptions {
  /** Stops when the bracket is narrower than this share of the root; default 1e-14. */
  readonly relative?: number;
  readonly mostSteps?: number;
}

/**
 * A root of `f` between `low` and `high`, where f changes sign; NaN when it does not.
 * Brent's method (Brent 1973, Algorithms for Minimization without Derivatives, chapter 4).
 */
export function findRoot(
  f: (x: number) => number,
  low: number,
  high: number,
  { relative = 1e-14, mostSteps = 200 }: RootOptions = {},
): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa * fb < 0)) return NaN;
  let c = a;
  let fc = fa;
  let d = b - a;
  let e = d;
  for (let step = 0; step < mostSteps; step++) {
    if (Math.abs(fc) < Math.abs(fb)) [a, b, c, fa, fb, fc] = [b, c, b, fb, fc, fb];
    const tolerance = 2 * Number.EPSILON * Math.abs(b) + 0.5 * relative * Math.abs(b);
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    if (Math.abs(e) < tolerance || Math.abs(fa) <= Math.abs(fb)) {
      d = e = half;
    } else {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const r = fb / fc;
        q = fa / fc;
        p = s * (2 * half * q * (q - r) - (b - a) * (r - 1));
        q = (q - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      if (2 * p < Math.min(3 * half * q - Math.abs(tolerance * q), Math.abs(e * q))) {
        e = d;
        d = p / q;
      } else {
        d = e = half;
      }
    }
    a = b;
    fa = fb;
    b += Math.abs(d) > tolerance ? d : half > 0 ? tolerance : -tolerance;
    fb = f(b);
    if (fb > 0 === fc > 0) {
      c = a;
      fc = fa;
      d = e = b - a;
    }
  }
  return b;
}
