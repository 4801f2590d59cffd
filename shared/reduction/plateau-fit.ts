/** An exponential approach fitted to the end of a log: rise(t) = plateau + amplitude · exp(−t/τ). */
export interface PlateauFit {
  /** °C */
  readonly plateau: number;
  /** s */
  readonly timeConstant: number;
  /** Standard deviation about the curve of the means it is fitted to, °C. */
  readonly residual: number;
}

/** The curve is fitted to means of so many stretches: three numbers need no more, and fast noise is out of the way. */
const STRETCHES = 60;
const TIME_CONSTANTS = 60;

/** For one τ the best plateau and amplitude are a straight-line fit on exp(−t/τ). */
function fitAt(t: Float64Array, y: Float64Array, tau: number): PlateauFit {
  const n = t.length;
  let e1 = 0;
  let ee = 0;
  let y1 = 0;
  let ye = 0;
  let yy = 0;
  const centre = y[n - 1];
  for (let i = 0; i < n; i += 1) {
    const e = Math.exp(-t[i] / tau);
    const v = y[i] - centre;
    e1 += e;
    ee += e * e;
    y1 += v;
    ye += v * e;
    yy += v * v;
  }
  const see = ee - (e1 * e1) / n;
  const sye = ye - (y1 * e1) / n;
  const syy = yy - (y1 * y1) / n;
  const amplitude = see > 0 ? sye / see : 0;
  const squares = Math.max(0, syy - amplitude * sye);
  return {
    plateau: centre + (y1 - amplitude * e1) / n,
    timeConstant: tau,
    residual: Math.sqrt(squares / Math.max(1, n - 3)),
  };
}

/**
 * The second opinion of `methods.md` section 6: an exponential fitted to the last two thirds of the log. Never a result,
 * only a check of the window. Usable when τ is under a third of the log and the residual under 0.3 °C, as in the table of
 * that section; else null.
 */
export function fitPlateau(seconds: Float64Array, rise: Float64Array): PlateauFit | null {
  const length = seconds[seconds.length - 1] - seconds[0];
  if (!(length > 0)) return null;
  let first = 0;
  while (seconds[first] < seconds[0] + length / 3) first += 1;
  const stride = Math.max(1, Math.ceil((seconds.length - first) / STRETCHES));
  const size = Math.floor((seconds.length - first) / stride);
  if (size < 20) return null;
  const t = new Float64Array(size);
  const y = new Float64Array(size);
  // Means of neighbours rather than every so-many-th reading; what does not divide evenly is left off at the beginning.
  first = seconds.length - size * stride;
  for (let b = 0; b < size; b += 1) {
    for (let i = 0; i < stride; i += 1) {
      t[b] += (seconds[first + b * stride + i] - seconds[first]) / stride;
      y[b] += rise[first + b * stride + i] / stride;
    }
  }
  const [shortest, longest] = [length / 300, length / 3];
  const ratio = Math.pow(longest / shortest, 1 / TIME_CONSTANTS);
  let best = fitAt(t, y, shortest);
  let bestStep = 0;
  for (let k = 1; k <= TIME_CONSTANTS; k += 1) {
    const fit = fitAt(t, y, shortest * Math.pow(ratio, k));
    if (fit.residual < best.residual) {
      best = fit;
      bestStep = k;
    }
  }
  // Best at the upper end: the approach is slower than the log can tell.
  if (bestStep === TIME_CONSTANTS || best.residual >= 0.3) return null;
  return best;
}
