/**
 * The normal tail and Mills' ratio by Taylor series about the nearest of many nodes: a dozen products each, no
 * exponential. Both tables are made on first use from Laplace's continued fraction.
 */

/** Nodes stand 1/16 apart, so that no x is more than 1/32 from one. */
const NODES_PER_UNIT = 16;
const LAST_NODE = 128;
const TERMS = 12;
const ROOT_HALF_PI = 1.2533141373155001;
const INVERSE_ROOT_TWO_PI = 0.3989422804014327;

let tails: Float64Array | null = null;
let ratios: Float64Array | null = null;

/** P(Z > x) for 0 ≤ x < 8. */
export function tailNearZero(x: number): number {
  return taylor((tails ??= tailTable()), x);
}

/** Mills' ratio, tail over density, for x ≥ 0. */
export function millsRatio(x: number): number {
  return x < LAST_NODE / NODES_PER_UNIT ? taylor((ratios ??= ratioTable()), x) : laplaceFraction(x);
}

/** Even and odd powers apart: two short chains of products instead of one long. */
function taylor(table: Float64Array, x: number): number {
  const node = (x * NODES_PER_UNIT + 0.5) | 0;
  const h = x - node / NODES_PER_UNIT;
  const square = h * h;
  const at = node * TERMS;
  let even = table[at + TERMS - 2];
  let odd = table[at + TERMS - 1];
  for (let n = TERMS - 4; n >= 0; n -= 2) {
    even = even * square + table[at + n];
    odd = odd * square + table[at + n + 1];
  }
  return even + odd * h;
}

/** Mills' ratio at a node; at 0 it is √(π/2), near 0 the fraction takes hundreds of terms, which a table can afford. */
const ratioAt = (x: number): number => (x === 0 ? ROOT_HALF_PI : laplaceFraction(x));

/** R' = xR − 1, so R⁽ⁿ⁺¹⁾ = xR⁽ⁿ⁾ + nR⁽ⁿ⁻¹⁾. */
function ratioTable(): Float64Array {
  const table = new Float64Array((LAST_NODE + 1) * TERMS);
  for (let node = 0; node <= LAST_NODE; node++) {
    const x = node / NODES_PER_UNIT;
    let before = ratioAt(x);
    let here = x * before - 1;
    let factorial = 1;
    table[node * TERMS] = before;
    for (let n = 1; n < TERMS; n++) {
      factorial *= n;
      table[node * TERMS + n] = here / factorial;
      [before, here] = [here, x * here + n * before];
    }
  }
  return table;
}

/** Q' = −φ and the derivatives of φ are Hermite polynomials: He⁽ⁿ⁺¹⁾ = x He⁽ⁿ⁾ − n He⁽ⁿ⁻¹⁾. */
function tailTable(): Float64Array {
  const table = new Float64Array((LAST_NODE + 1) * TERMS);
  for (let node = 0; node <= LAST_NODE; node++) {
    const x = node / NODES_PER_UNIT;
    // x² has few digits and is exact.
    const density = INVERSE_ROOT_TWO_PI * Math.exp(-x * x * 0.5);
    table[node * TERMS] = density * ratioAt(x);
    let before = 0;
    let here = 1;
    let scaled = -density;
    for (let n = 1; n < TERMS; n++) {
      scaled /= n;
      table[node * TERMS + n] = here * scaled;
      scaled = -scaled;
      [before, here] = [here, x * here - (n - 1) * before];
    }
  }
  return table;
}

/**
 * Laplace's continued fraction 1/(x + 1/(x + 2/(x + 3/…))) for x > 0, from the far end. Cut at N terms its error falls
 * like exp(−2x√N), which sets N.
 */
function laplaceFraction(x: number): number {
  let fraction = x;
  for (let n = Math.ceil(450 / (x * x)) + 10; n >= 1; n--) fraction = x + n / fraction;
  return 1 / fraction;
}
