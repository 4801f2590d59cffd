/** The asymptotic series is exact to rounding from here on; smaller arguments are lifted to it. */
const LIFTED = 8;
/** Twice a half-integer below 8 is at most 15; whole degrees of freedom ask for no others. */
const atHalves = new Float64Array(2 * LIFTED).fill(NaN);
const RECIPROCALS = Float64Array.from({ length: 64 }, (_, index) => 1 / (2 * index + 3));

/**
 * Error of Stirling's formula: Γ(x) = √(2π/x) (x/e)^x e^δ(x), for x > 0.
 * Below 8 by the recurrence δ(x) = δ(x+1) + (x+½) ln(1+1/x) − 1, above by the asymptotic series with B₂ₖ/(2k(2k−1)).
 * Source: Abramowitz and Stegun 6.1.40, 6.1.41 (from memory; checked against the reference values of the tails).
 */
export function stirlingError(x: number): number {
  if (x >= LIFTED) return asymptotic(x);
  const twice = 2 * x;
  const whole = Math.floor(twice);
  if (whole !== twice) return lifted(x);
  if (Number.isNaN(atHalves[whole])) atHalves[whole] = lifted(x);
  return atHalves[whole];
}

function lifted(x: number): number {
  let correction = 0;
  let at = x;
  for (; at < LIFTED; at += 1) correction += stepTerm(at);
  return asymptotic(at) + correction;
}

function asymptotic(x: number): number {
  const inverse = 1 / x;
  const square = inverse * inverse;
  return (
    inverse *
    (1 / 12 -
      square *
        (1 / 360 -
          square *
            (1 / 1260 -
              square *
                (1 / 1680 -
                  square *
                    (1 / 1188 -
                      square *
                        (691 / 360360 -
                          square * (1 / 156 - square * (3617 / 122400 - square * (43867 / 244188)))))))))
  );
}

/** (x+½) ln(1+1/x) − 1, without cancellation: y²/3 + y⁴/5 + …, y = 1/(2x+1). */
function stepTerm(x: number): number {
  if (x < 0.4) return (x + 0.5) * Math.log1p(1 / x) - 1;
  const y = 1 / (2 * x + 1);
  const square = y * y;
  let power = square;
  let sum = 0;
  for (const reciprocal of RECIPROCALS) {
    const term = power * reciprocal;
    if (sum + term === sum) break;
    sum += term;
    power *= square;
  }
  return sum;
}

/** ln(1+u) − u for u > −1, without cancellation near 0. */
export function log1pMinus(u: number): number {
  if (u < -0.39 || u > 0.57) return Math.log1p(u) - u;
  // 2 artanh(r) − u with r = u/(2+u); 2r − u = −u r.
  const r = u / (2 + u);
  const square = r * r;
  let power = 1;
  let sum = 0;
  for (let odd = 3; ; odd += 2) {
    const term = power / odd;
    if (sum + term === sum) break;
    sum += term;
    power *= square;
  }
  return r * (2 * square * sum - u);
}
