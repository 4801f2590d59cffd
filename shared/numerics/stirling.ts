/**
 * Error of Stirling's formula: Γ(x) = √(2π/x) (x/e)^x e^δ(x), for x > 0.
 * Below 16 by the recurrence δ(x) = δ(x+1) + (x+½) ln(1+1/x) − 1, above by the asymptotic series.
 * Source: Abramowitz and Stegun 6.1.40, 6.1.41 (from memory; checked against the reference values of the tails).
 */
export function stirlingError(x: number): number {
  let correction = 0;
  let at = x;
  while (at < 16) {
    correction += stepTerm(at);
    at += 1;
  }
  const inverse = 1 / at;
  const square = inverse * inverse;
  const series =
    inverse *
    (1 / 12 -
      square *
        (1 / 360 -
          square *
            (1 / 1260 - square * (1 / 1680 - square * (1 / 1188 - square * (691 / 360360 - square / 156))))));
  return series + correction;
}

/** (x+½) ln(1+1/x) − 1, without cancellation: y²/3 + y⁴/5 + …, y = 1/(2x+1). */
function stepTerm(x: number): number {
  if (x < 0.4) return (x + 0.5) * Math.log1p(1 / x) - 1;
  const y = 1 / (2 * x + 1);
  const square = y * y;
  let power = square;
  let sum = 0;
  for (let odd = 3; ; odd += 2) {
    const term = power / odd;
    if (sum + term === sum) return sum;
    sum += term;
    power *= square;
  }
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
