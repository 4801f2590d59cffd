const INVERSE_ROOT_TWO_PI = 0.3989422804014327;
/** Beyond this the tail is below the smallest double. */
const FARTHEST = 38.6;

/** Density of the standard normal distribution. */
export function normalDensity(x: number): number {
  // x² is split so that its rounding does not grow with the exponent (W. J. Cody 1969, Math. Comp. 23, 631–637).
  const size = Math.abs(x);
  if (size > FARTHEST + 1) return 0;
  const coarse = Math.trunc(size * 16) / 16;
  const rest = (size - coarse) * (size + coarse);
  return INVERSE_ROOT_TWO_PI * Math.exp(-coarse * coarse * 0.5) * Math.exp(-rest * 0.5);
}

/** P(Z > x). Relative error at most 1e-14 to x = 37. Right of −∞ to ∞; NaN of NaN. */
export function normalTail(x: number): number {
  if (Number.isNaN(x)) return NaN;
  if (x < 0) return 1 - normalTail(-x);
  if (x > FARTHEST) return 0;
  return normalDensity(x) * millsRatio(x);
}

/** P(Z ≤ x). */
export const normalCdf = (x: number): number => normalTail(-x);

/** Φ(x) − ½ over φ(x): x + x³/3 + x⁵/(3·5) + … */
function centreSeries(x: number): number {
  const square = x * x;
  let term = x;
  let sum = x;
  for (let odd = 3; ; odd += 2) {
    term *= square / odd;
    if (sum + term === sum) return sum;
    sum += term;
  }
}

/** Nodes of the table stand this far apart, so that no x is more than half of it from one. */
const NODE_GAP = 0.25;
const TABLE_END = 8;
const TERMS = 16;

/** Taylor coefficients of Mills' ratio at each node, made on first use. */
let table: Float64Array | null = null;

/**
 * Tail over density, R(x) for x ≥ 0. R' = xR − 1 gives all derivatives, R⁽ⁿ⁺¹⁾ = xR⁽ⁿ⁾ + nR⁽ⁿ⁻¹⁾, so a Taylor series at
 * the nearest node is exact to rounding; beyond the table Laplace's continued fraction needs few terms.
 */
function millsRatio(x: number): number {
  if (x >= TABLE_END) return laplaceFraction(x);
  table ??= makeTable();
  const node = Math.round(x / NODE_GAP);
  const h = x - node * NODE_GAP;
  let at = node * TERMS + TERMS - 1;
  let sum = table[at];
  for (let n = TERMS - 2; n >= 0; n--) sum = sum * h + table[--at];
  return sum;
}

function makeTable(): Float64Array {
  const nodes = TABLE_END / NODE_GAP + 1;
  const made = new Float64Array(nodes * TERMS);
  for (let node = 0; node < nodes; node++) {
    const x = node * NODE_GAP;
    let before = x < 1.2 ? 0.5 / normalDensity(x) - centreSeries(x) : laplaceFraction(x);
    let here = x * before - 1;
    let factorial = 1;
    made[node * TERMS] = before;
    for (let n = 1; n < TERMS; n++) {
      factorial *= n;
      made[node * TERMS + n] = here / factorial;
      [before, here] = [here, x * here + n * before];
    }
  }
  return made;
}

/**
 * Laplace's continued fraction 1/(x + 1/(x + 2/(x + 3/…))), from the far end. Cut at N terms its error falls like
 * exp(−2x√N), which sets N.
 */
function laplaceFraction(x: number): number {
  let fraction = x;
  for (let n = Math.ceil(450 / (x * x)) + 10; n >= 1; n--) fraction = x + n / fraction;
  return 1 / fraction;
}

/** x with P(Z ≤ x) = p. −∞ at 0, ∞ at 1, NaN outside. Relative error at most 1e-14. */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p === 0.5) return 0;
  // 1 − p is exact for p above a half.
  return p < 0.5 ? -upperQuantile(p, 0.5 - p) : upperQuantile(1 - p, p - 0.5);
}

/** Solves tail = `tail`, or near the middle centre = `centre`, whichever is known with more digits. */
function upperQuantile(tail: number, centre: number): number {
  let x = roughQuantile(tail);
  for (let step = 0; step < 8; step++) {
    const density = normalDensity(x);
    const move = centre < 0.25 ? density * centreSeries(x) - centre : -tailExcess(x, tail, density);
    const next = x - move / density;
    const moved = Math.abs(next - x);
    x = next > 0 ? next : x / 2;
    // Newton doubles the digits: after a step this small the next is below rounding.
    if (moved <= 1e-9 * x) break;
  }
  return x;
}

/** How far the tail at x is above `tail`, on the logarithm's scale so that far tails converge too. */
function tailExcess(x: number, tail: number, density: number): number {
  const here = density * millsRatio(x);
  return Math.abs(here - tail) < 1e-3 * tail ? here - tail : here * Math.log(here / tail);
}

/** A first guess to about 5e-4 (Abramowitz and Stegun 26.2.23). */
function roughQuantile(tail: number): number {
  const t = Math.sqrt(-2 * Math.log(tail));
  const guess =
    t - (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)));
  return Math.max(guess, tail < 0.4999 ? 1e-4 : 1e-12);
}
